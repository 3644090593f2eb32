#pragma once

#include <lightledger/analysis/polarization.hpp>
#include <lightledger/trace/train.hpp>

#include <vector>

namespace lightledger::analysis {

/// The detector's figures at a row of wavelengths (from the light's shortest to its longest, or 5 % about its
/// only one, where all media and measured curves are known), each by itself; or at a row of field angles
/// (from the axis to the light's outermost field, or to 1 degree), all wavelengths together.
[[nodiscard]] PolarizationTable polarization_table(const assembly::Assembly& assembly, Against against,
                                                   int threads);

/// What happens to the rays of each field at the first wavelength, on a grid over the launch plane.
[[nodiscard]] std::vector<PupilMap> pupil_maps(const trace::Train& train);

} // namespace lightledger::analysis
