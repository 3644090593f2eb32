#pragma once

#include <lightledger/assembly/assembly.hpp>
#include <lightledger/assembly/diagnostics.hpp>

#include <optional>
#include <string_view>
#include <vector>

/// Media asked for by name, and the faults of asking.
namespace lightledger::analysis {

/// A medium of the assembly or a built-in one.
[[nodiscard]] std::optional<optics::Medium> find_medium(const assembly::Assembly& assembly,
                                                        std::string_view name);

/// The names that `find_medium` knows.
[[nodiscard]] std::vector<std::string_view> medium_names(const assembly::Assembly& assembly);

[[nodiscard]] assembly::Fault unknown_medium(std::string_view name,
                                             const std::vector<std::string_view>& known);

/// The fault of the first wavelength at which the medium is not known; it names the range.
[[nodiscard]] std::optional<assembly::Fault> outside_range(const optics::Medium& medium,
                                                           const std::vector<double>& wavelengths_nm);

} // namespace lightledger::analysis
