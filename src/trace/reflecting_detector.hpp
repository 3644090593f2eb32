#pragma once

#include <lightledger/trace/train.hpp>

#include <vector>

namespace lightledger::trace {

/// The share of what arrives in its clear area that the detector sends back.
[[nodiscard]] double detector_reflectance(const Train& train);

/// The detector per wavelength as an operator that reflects, r_s = −√R and r_p = +√R, and yet lets all
/// through, for what is delivered counts before the reflection.
[[nodiscard]] std::vector<PlanOp> reflecting_detectors(const Train& train);

} // namespace lightledger::trace
