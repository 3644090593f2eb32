#include "asphere.hpp"

#include <algorithm>
#include <cmath>
#include <limits>

namespace lightledger::trace {
namespace {

/// Newton stops at this many units in the last place of the largest coordinate; if rounding keeps it from
/// there, the cap ends it and the looser bound decides whether it had arrived.
constexpr double newton_ulps = 4.0 * std::numeric_limits<double>::epsilon();
constexpr double newton_arrived = 1e-12;
constexpr int newton_cap = 40;

/// With terms that slope less than this at the hit and at the tangent plane, Newton's root is the nearest.
constexpr double gentle = 0.3;

constexpr int search_steps = 240;
constexpr double search_growth = 1.05;
constexpr double first_search_step = 1.0 / 64.0; ///< of the height over the tangent plane

/// The ray's height over the surface at a place, and how fast that grows.
struct Height {
  double value, slope;
  double size; ///< largest coordinate
  double terms_slope;
  bool before_equator;
};

Height height(const PlanOp& op, const AsphereRay& ray, double t) {
  const double x = ray.o[0] + t * ray.d[0];
  const double y = ray.o[1] + t * ray.d[1];
  const double z = ray.o[2] + t * ray.d[2];
  const Sag surface = sag(op, x * x + y * y);
  return {z - surface.z, ray.d[2] - surface.slope_over_r * (x * ray.d[0] + y * ray.d[1]),
          std::max({std::abs(x), std::abs(y), std::abs(z), std::abs(t)}), surface.terms_slope,
          surface.before_equator};
}

bool finite(double value) {
  return std::abs(value) < std::numeric_limits<double>::max();
}

AsphereHit newton(const PlanOp& op, const AsphereRay& ray, double t) {
  double step = std::numeric_limits<double>::infinity();
  double size = 0.0;
  bool inside = false;
  for (int round = 0; round < newton_cap; ++round) {
    const Height here = height(op, ray, t);
    step = -here.value / here.slope;
    size = here.size;
    inside = here.before_equator;
    if (!finite(step))
      return {0.0, false};
    t += step;
    if (std::abs(step) <= newton_ulps * size)
      break;
  }
  return {t, inside && std::abs(step) <= newton_arrived * size};
}

bool gentle_at(const PlanOp& op, const AsphereRay& ray, double t) {
  return finite(t) && std::abs(height(op, ray, t).terms_slope) < gentle;
}

/// The root between two places whose heights differ in sign, by Newton's steps where they stay between and
/// halving where they do not.
AsphereHit between(const PlanOp& op, const AsphereRay& ray, double low, double high) {
  const bool rises = height(op, ray, low).value < 0.0;
  double t = 0.5 * (low + high);
  for (int round = 0; round < 2 * newton_cap; ++round) {
    const Height here = height(op, ray, t);
    ((here.value < 0.0) == rises ? low : high) = t;
    double next = t - here.value / here.slope;
    if (!(next > std::min(low, high) && next < std::max(low, high)))
      next = 0.5 * (low + high);
    const double step = next - t;
    t = next;
    if (std::abs(step) <= newton_ulps * here.size)
      break;
  }
  return {t, height(op, ray, t).before_equator};
}

/// One side of the outward search: where it stands, and on which side of the surface.
struct Scout {
  double t;
  Height at;
};

/// Advances a scout; true where the ray crossed the surface on the way. A scout beyond the equator stays
/// blind until it comes back before it.
bool crosses(const PlanOp& op, const AsphereRay& ray, double step, Scout& scout) {
  const Scout before = scout;
  scout.t += step;
  scout.at = height(op, ray, scout.t);
  const bool seen = before.at.before_equator && scout.at.before_equator;
  return seen && std::signbit(before.at.value) != std::signbit(scout.at.value);
}

/// Outward from the tangent plane on both sides in growing steps, to the first crossing.
AsphereHit search(const PlanOp& op, const AsphereRay& ray) {
  const double plane = -ray.o[2] / ray.d[2];
  const double origin = finite(plane) ? plane : 0.0;
  const Height start = height(op, ray, origin);
  double step = first_search_step * std::max(std::min(std::abs(start.value), start.size), 1e-9);
  Scout ahead{origin, start};
  Scout behind{origin, start};
  for (int i = 0; i < search_steps; ++i, step *= search_growth) {
    if (crosses(op, ray, step, ahead))
      return between(op, ray, ahead.t - step, ahead.t);
    if (crosses(op, ray, -step, behind))
      return between(op, ray, behind.t, behind.t + step);
  }
  return {0.0, false};
}

} // namespace

Sag sag(const PlanOp& op, double r_squared) {
  const double c = op.curvature;
  const double e = 1.0 - (1.0 + op.conic) * c * c * r_squared;
  const double root = std::sqrt(std::max(e, std::numeric_limits<double>::min()));
  const double r = std::sqrt(r_squared);
  double terms = 0.0;  // Σ A_i r^(i−3)
  double slopes = 0.0; // Σ i A_i r^(i−3)
  for (int k = PlanOp::terms - 1; k >= 0; --k) {
    terms = terms * r + op.a[k];
    slopes = slopes * r + (k + PlanOp::lowest_power) * op.a[k];
  }
  return {c * r_squared / (1.0 + root) + terms * r_squared * r, c / root + slopes * r, slopes * r_squared,
          e > 0.0};
}

AsphereHit meet(const PlanOp& op, const AsphereRay& ray, double start) {
  const AsphereHit quick = newton(op, ray, start);
  if (quick.found && gentle_at(op, ray, quick.t) && gentle_at(op, ray, -ray.o[2] / ray.d[2]))
    return quick;
  const AsphereHit careful = search(op, ray);
  return careful.found ? careful : quick;
}

} // namespace lightledger::trace
