#pragma once

#include <lightledger/assembly/assembly.hpp>
#include <lightledger/trace/plan.hpp>

#include <vector>

namespace lightledger::trace {

/// A measured coating at one wavelength, from its front or its back, as the points that the kernel
/// interpolates: over the angle, or, for a curve that shifts with the angle, over the wavelength.
///
/// The back transmits as the front does; its reflected phases follow from Stokes' reversal, π + 2 φ_t − φ_r,
/// where phases were measured, and are else those of an ideal coating, the same from both sides.
[[nodiscard]] std::vector<CurvePoint> curve(const assembly::Measured& measured, double wavelength_nm,
                                            bool from_back);

} // namespace lightledger::trace
