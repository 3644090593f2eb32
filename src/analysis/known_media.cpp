#include "known_media.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <string>

namespace lightledger::analysis {
namespace {

std::string in_words(const optics::Range& range) {
  if (std::isinf(range.to_nm))
    return fmt::format("{} nm and longer", range.from_nm);
  return fmt::format("{} to {} nm", range.from_nm, range.to_nm);
}

} // namespace

std::optional<optics::Medium> find_medium(const assembly::Assembly& assembly, std::string_view name) {
  const auto own = std::ranges::find(assembly.media, name, &optics::Medium::name);
  return own != assembly.media.end() ? std::optional(*own) : optics::builtin_medium(name);
}

std::vector<std::string_view> medium_names(const assembly::Assembly& assembly) {
  std::vector<std::string_view> names = optics::builtin_media();
  for (const optics::Medium& medium : assembly.media)
    if (std::ranges::find(names, medium.name) == names.end())
      names.emplace_back(medium.name);
  return names;
}

assembly::Fault unknown_medium(std::string_view name, const std::vector<std::string_view>& known) {
  return {{},
          fmt::format("there is no medium '{}'", name),
          "a name that `lightledger media` lists, or a medium of the file",
          std::string(assembly::nearest(name, known))};
}

std::optional<assembly::Fault> outside_range(const optics::Medium& medium,
                                             const std::vector<double>& wavelengths_nm) {
  for (const double wavelength : wavelengths_nm)
    if (!optics::index_at(medium, wavelength))
      return assembly::Fault{
          {}, fmt::format("{} is not known at {} nm", medium.name, wavelength), in_words(medium.range), {}};
  return std::nullopt;
}

} // namespace lightledger::analysis
