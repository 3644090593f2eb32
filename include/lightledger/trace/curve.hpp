#pragma once

#include <lightledger/assembly/assembly.hpp>
#include <lightledger/trace/operator.hpp>

#include <span>
#include <vector>

namespace lightledger::trace {

/// A measured coating at one wavelength, from its front or its back, as the points to interpolate between:
/// over the angle, or, for a curve that shifts with the angle, over the wavelength.
///
/// The back transmits as the front does; its reflected phases follow from Stokes' reversal, π + 2 φ_t − φ_r,
/// where phases were measured, and are else those of an ideal coating, the same from both sides.
[[nodiscard]] std::vector<CurvePoint> curve(const assembly::Measured& measured, double wavelength_nm,
                                            bool from_back);

/// Where light reads a curve over the angle: degrees in the medium of the measurement, of index `index`, for
/// light with (n sinθ)² = `alpha_squared`; beyond all angles where there is none.
[[nodiscard]] double angle_on_curve(double alpha_squared, double index);

/// Where light reads a curve that shifts: λ/√(1 − sin²θ/n²), θ in air, n the `shift_index`.
[[nodiscard]] double wavelength_on_curve(double alpha_squared, double shift_index, double wavelength_nm);

/// Whether a place lies outside a curve by more than rounding.
[[nodiscard]] bool outside(std::span<const CurvePoint> points, double x);

/// Linear between the two points around a place; beyond the ends of the curve its last point holds.
[[nodiscard]] CurvePoint interpolate(std::span<const CurvePoint> points, double x);

} // namespace lightledger::trace
