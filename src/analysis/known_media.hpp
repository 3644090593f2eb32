#pragma once

#include <lightledger/assembly/diagnostics.hpp>
#include <lightledger/optics/medium.hpp>

#include <optional>
#include <string_view>
#include <vector>

/// The faults of asking for media by name.
namespace lightledger::analysis {

/// The fault of a name that is none of the known ones.
[[nodiscard]] assembly::Fault unknown_medium(std::string_view name,
                                             const std::vector<std::string_view>& known);

/// The fault of the first wavelength at which the medium is not known; it names the range.
[[nodiscard]] std::optional<assembly::Fault> outside_range(const optics::Medium& medium,
                                                           const std::vector<double>& wavelengths_nm);

} // namespace lightledger::analysis
