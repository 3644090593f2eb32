#pragma once

#include <lightledger/assembly/assembly.hpp>

namespace lightledger::reference {

/// The index of a medium of the assembly; throws std::out_of_range where it is not known.
[[nodiscard]] optics::Index index_of(const assembly::Assembly& assembly, assembly::MediumId medium,
                                     double wavelength_nm);

/// The medium in which the intended light leaves a station that it meets from this side.
[[nodiscard]] assembly::MediumId medium_behind(const assembly::Assembly& assembly,
                                               const assembly::Station& station, assembly::Side from);

} // namespace lightledger::reference
