#pragma once

#include <lightledger/trace/plan.hpp>

namespace lightledger::trace {

/// The sag of ISO 10110-12 at a distance from the axis, and its slope over that distance.
struct Sag {
  double z, slope_over_r;
  double terms_slope; ///< of the terms alone
  bool before_equator;
};
[[nodiscard]] Sag sag(const PlanOp& op, double r_squared);

/// o + t d in the surface's frame.
struct AsphereRay {
  double o[3], d[3];
};
struct AsphereHit {
  double t;
  bool found;
};

/// Where a ray meets an asphere: of several points the one nearest to the tangent plane along the ray.
/// Newton's iteration from the points of the base conic serves where the terms slope gently; where they do
/// not, or where it does not arrive, the ray is searched outward from the tangent plane.
[[nodiscard]] AsphereHit meet(const PlanOp& op, const AsphereRay& ray);

} // namespace lightledger::trace
