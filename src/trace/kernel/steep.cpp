#include "steep.hpp"

#include <lightledger/trace/operator.hpp>

#include <algorithm>
#include <cmath>
#include <limits>
#include <utility>

namespace lightledger::trace {
namespace {

/// The sag of ISO 10110-12 at a distance from the axis, and its slope over that distance.
struct Sag {
  double z, slope_over_r;
  double terms_slope; ///< of the terms alone
  bool before_equator;
};

/// o + t d in the surface's frame.
struct AsphereRay {
  double o[3], d[3];
};

struct AsphereHit {
  double t;
  bool found;
};

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

/// The part of the ray that lies before the equator of the base conic; empty where `from` is not below `to`.
struct Interval {
  double from, to;
};

Interval before_equator(const PlanOp& op, const AsphereRay& ray) {
  constexpr double unbounded = std::numeric_limits<double>::max();
  constexpr double just_inside = 1.0 - 1e-12;
  const double closing = (1.0 + op.conic) * op.curvature * op.curvature; // 1/r² at the equator
  if (!(closing > 0.0))
    return {-unbounded, unbounded};
  const double a = ray.d[0] * ray.d[0] + ray.d[1] * ray.d[1];
  const double b = ray.o[0] * ray.d[0] + ray.o[1] * ray.d[1];
  const double c = ray.o[0] * ray.o[0] + ray.o[1] * ray.o[1] - just_inside / closing;
  const double discriminant = b * b - a * c;
  if (a == 0.0)
    return c < 0.0 ? Interval{-unbounded, unbounded} : Interval{0.0, 0.0};
  if (!(discriminant > 0.0))
    return {0.0, 0.0};
  const double half = std::sqrt(discriminant);
  return {(-b - half) / a, (-b + half) / a};
}

/// The place between two others at which the height is least in size, given that its size falls at the first
/// and grows at the second; by halving.
double lowest(const PlanOp& op, const AsphereRay& ray, double falls, double grows) {
  for (int round = 0; round < 2 * newton_cap; ++round) {
    const double middle = 0.5 * (falls + grows);
    const Height here = height(op, ray, middle);
    const double outward = grows > falls ? here.slope : -here.slope;
    (here.value * outward < 0.0 ? falls : grows) = middle;
  }
  return 0.5 * (falls + grows);
}

/// One end of the outward search.
struct Explorer {
  double t;
  Height here;

  /// One step to `next`; where the ray met the surface on it, the place, also where it only dipped into it.
  AsphereHit step(const PlanOp& op, const AsphereRay& ray, double next) {
    const double from = std::exchange(t, next);
    const Height before = std::exchange(here, height(op, ray, next));
    if (from == next)
      return {0.0, false};
    if (std::signbit(before.value) != std::signbit(here.value))
      return between(op, ray, std::min(from, next), std::max(from, next));
    const double outward = next > from ? 1.0 : -1.0;
    if (!(before.value * before.slope * outward < 0.0 && here.value * here.slope * outward > 0.0))
      return {0.0, false};
    const double dip = lowest(op, ray, from, next);
    if (std::signbit(height(op, ray, dip).value) == std::signbit(before.value))
      return {0.0, false};
    return between(op, ray, std::min(from, dip), std::max(from, dip));
  }
};

/// Outward from the tangent plane on both sides in growing steps, to the first place where the ray meets the
/// surface.
AsphereHit search(const PlanOp& op, const AsphereRay& ray) {
  const Interval allowed = before_equator(op, ray);
  if (!(allowed.from < allowed.to))
    return {0.0, false};
  const double plane = -ray.o[2] / ray.d[2];
  const double start = std::clamp(finite(plane) ? plane : 0.0, allowed.from, allowed.to);
  Explorer ahead{start, height(op, ray, start)};
  Explorer behind = ahead;
  double step = first_search_step * std::max(std::min(std::abs(ahead.here.value), ahead.here.size), 1e-9);
  for (int i = 0; i < search_steps; ++i, step *= search_growth) {
    const AsphereHit after = ahead.step(op, ray, std::min(ahead.t + step, allowed.to));
    const AsphereHit before = behind.step(op, ray, std::max(behind.t - step, allowed.from));
    if (after.found && before.found)
      return after.t - start < start - before.t ? after : before;
    if (after.found || before.found)
      return after.found ? after : before;
  }
  return {0.0, false};
}

/// Where the ray meets the base conic before its equator.
struct Starts {
  double t[2];
  int count;
};

Starts base_conic(const PlanOp& op, const AsphereRay& ray) {
  const double c = op.curvature;
  const double stretch = 1.0 + op.conic;
  const auto [ox, oy, oz] = ray.o;
  const auto [dx, dy, dz] = ray.d;
  const double a = c * (1.0 + op.conic * dz * dz);
  const double b = c * (ox * dx + oy * dy + stretch * oz * dz) - dz;
  const double rest = c * (ox * ox + oy * oy + stretch * oz * oz) - 2.0 * oz;
  const double discriminant = b * b - a * rest;
  Starts starts{{}, 0};
  if (discriminant < 0.0)
    return starts;
  const double q = -(b + std::copysign(std::sqrt(discriminant), b));
  for (const double t : {rest / q, q / a})
    if (finite(t) && stretch * c * (oz + t * dz) < 1.0)
      starts.t[starts.count++] = t;
  return starts;
}

/// Newton's root from each of the base conic's points; of two the one nearer to the tangent plane.
AsphereHit near_base_conic(const PlanOp& op, const AsphereRay& ray) {
  Starts starts = base_conic(op, ray);
  if (starts.count == 0)
    starts = {{-ray.o[2] / ray.d[2]}, 1};
  AsphereHit best{0.0, false};
  const auto off_plane = [&](double t) { return std::abs(ray.o[2] + t * ray.d[2]); };
  for (int i = 0; i < starts.count; ++i) {
    const AsphereHit hit = newton(op, ray, starts.t[i]);
    if (hit.found && (!best.found || off_plane(hit.t) < off_plane(best.t)))
      best = hit;
  }
  return best;
}

} // namespace

bool meet_steep(const PlanOp& op, const double (&o)[3], const double (&d)[3], double& t) {
  const AsphereRay ray{{o[0], o[1], o[2]}, {d[0], d[1], d[2]}};
  AsphereHit hit = near_base_conic(op, ray);
  if (!hit.found || !gentle_at(op, ray, hit.t) || !gentle_at(op, ray, -ray.o[2] / ray.d[2]))
    if (const AsphereHit careful = search(op, ray); careful.found)
      hit = careful;
  t = hit.found ? hit.t : 0.0;
  return hit.found;
}

} // namespace lightledger::trace
