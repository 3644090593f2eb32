#include <lightledger/assembly/document.hpp>
#include <lightledger/assembly/films.hpp>

#include <fmt/format.h>

#include <cmath>

namespace lightledger::assembly {

namespace {

double thickness_nm(const optics::Medium& medium, const std::variant<double, Film::Waves>& thickness) {
  const auto* const waves = std::get_if<Film::Waves>(&thickness);
  if (waves == nullptr)
    return std::get<double>(thickness);
  return waves->waves * waves->at_nm / optics::index_at(medium, waves->at_nm).value().n;
}

std::optional<double> unknown_wavelength(const optics::Medium& medium, const Film& film,
                                         double wavelength_nm) {
  if (!optics::index_at(medium, wavelength_nm))
    return wavelength_nm;
  const auto* const waves = std::get_if<Film::Waves>(&film.thickness);
  if (waves != nullptr && !optics::index_at(medium, waves->at_nm))
    return waves->at_nm;
  return std::nullopt;
}

} // namespace

std::optional<optics::Medium> medium_named(const Assembly& assembly, std::string_view name) {
  for (const optics::Medium& medium : assembly.media)
    if (medium.name == name)
      return medium;
  return optics::builtin_medium(name);
}

std::optional<CoatingId> coating_named(const Assembly& assembly, std::string_view name) {
  for (std::size_t id = 0; id < assembly.coatings.size(); ++id)
    if (assembly.coatings[id].name == name)
      return static_cast<CoatingId>(id);
  return std::nullopt;
}

std::string known_range(const optics::Medium& medium) {
  const auto [from, to] = medium.range;
  if (std::isinf(to))
    return from > 0.0 ? fmt::format("{} is known from {} nm on, where its formula holds", medium.name, from)
                      : fmt::format("{} is known where its formula holds", medium.name);
  return fmt::format("{} is known from {} to {} nm", medium.name, from, to);
}

std::optional<Fault> unknown_layer(const Assembly& assembly, const Layers& layers, double wavelength_nm) {
  for (const Film& film : layers.films) {
    const optics::Medium& medium = assembly.media[film.medium];
    if (const auto unknown = unknown_wavelength(medium, film, wavelength_nm))
      return Fault{assembly.document ? assembly.document->locate(film.address) : Mark{},
                   fmt::format("{}, not at {} nm", known_range(medium), *unknown),
                   {},
                   {}};
  }
  return std::nullopt;
}

std::vector<optics::Layer> optical_layers(const Assembly& assembly, const Layers& layers,
                                          double wavelength_nm) {
  std::vector<optics::Layer> result;
  result.reserve(layers.films.size());
  for (const Film& film : layers.films) {
    const optics::Medium& medium = assembly.media[film.medium];
    result.push_back(
        {optics::index_at(medium, wavelength_nm).value().complex(), thickness_nm(medium, film.thickness)});
  }
  return result;
}

} // namespace lightledger::assembly
