#include "known_media.hpp"

#include <lightledger/analysis/medium_table.hpp>

#include <utility>

namespace lightledger::analysis {
namespace {

constexpr double helium_d_line_nm = 587.5618;

MediumEntry entry_of(const optics::Medium& medium, const std::vector<double>& wavelengths_nm) {
  MediumEntry entry{medium.name, medium.range, {}, medium.source, {}};
  if (const auto index = optics::index_at(medium, helium_d_line_nm))
    entry.index_587 = index->n;
  for (const double wavelength : wavelengths_nm)
    entry.rows.push_back({wavelength, optics::index_at(medium, wavelength)});
  return entry;
}

std::vector<MediumEntry> all_entries(const std::vector<double>& wavelengths_nm) {
  std::vector<MediumEntry> entries;
  for (const std::string_view name : optics::builtin_media())
    entries.push_back(entry_of(*optics::builtin_medium(name), wavelengths_nm));
  return entries;
}

} // namespace

MediumTableResult medium_table(const std::optional<std::string>& name,
                               const std::vector<double>& wavelengths_nm) {
  MediumTableResult result;
  if (!name) {
    result.media = all_entries(wavelengths_nm);
    return result;
  }
  const std::optional<optics::Medium> medium = optics::builtin_medium(*name);
  if (!medium) {
    result.faults.add(unknown_medium(*name, optics::builtin_media()));
    return result;
  }
  if (auto fault = outside_range(*medium, wavelengths_nm)) {
    result.faults.add(std::move(*fault));
    return result;
  }
  result.media = std::vector{entry_of(*medium, wavelengths_nm)};
  return result;
}

} // namespace lightledger::analysis
