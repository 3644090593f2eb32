#pragma once

#include <lightledger/assembly/diagnostics.hpp>
#include <lightledger/optics/medium.hpp>

#include <optional>
#include <string>
#include <vector>

namespace lightledger::analysis {

struct MediumRow {
  double wavelength_nm;
  std::optional<optics::Index> index; ///< none outside the medium's range
};

/// One medium known by name.
struct MediumEntry {
  std::string name;
  optics::Range range;
  std::optional<double> index_587; ///< real index at the helium d line; none outside the range
  std::string source;
  std::vector<MediumRow> rows; ///< one a wavelength asked for
};

struct MediumTableResult {
  std::optional<std::vector<MediumEntry>> media; ///< none where there are faults
  assembly::Faults faults;
};

/// All built-in media, or the one of a name (contract §5, media). A wavelength outside the range of a medium
/// asked for by name is a fault; in the list of all it leaves the index empty.
[[nodiscard]] MediumTableResult medium_table(const std::optional<std::string>& name,
                                             const std::vector<double>& wavelengths_nm);

} // namespace lightledger::analysis
