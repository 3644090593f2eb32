#include "known_media.hpp"

#include <lightledger/assembly/films.hpp>

#include <fmt/format.h>

#include <string>

namespace lightledger::analysis {

assembly::Fault unknown_medium(std::string_view name, const std::vector<std::string_view>& known) {
  return {{},
          fmt::format("there is no medium '{}'", name),
          "a name that `lightledger media` lists",
          std::string(assembly::nearest(name, known))};
}

std::optional<assembly::Fault> outside_range(const optics::Medium& medium,
                                             const std::vector<double>& wavelengths_nm) {
  for (const double wavelength : wavelengths_nm)
    if (!optics::index_at(medium, wavelength))
      return assembly::Fault{
          {}, fmt::format("{}, not at {} nm", assembly::known_range(medium), wavelength), {}, {}};
  return std::nullopt;
}

} // namespace lightledger::analysis
