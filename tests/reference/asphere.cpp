#include "reference/conicoid.hpp"

#include <algorithm>
#include <cmath>
#include <limits>

namespace lightledger::reference {
namespace {

struct Interval {
  double from, to;
};

/// A ray in the coordinates of an asphere, and its height above it: positive on the side of +z.
struct Approach {
  const assembly::Asphere& shape;
  Vector start, direction;

  [[nodiscard]] Vector at(double t) const { return start + t * direction; }
  [[nodiscard]] double radius(double t) const { return at(t).head<2>().norm(); }
  [[nodiscard]] double height(double t) const { return at(t).z() - sag_at(shape, radius(t)).sag; }
  [[nodiscard]] double climb(double t) const {
    const double r = radius(t);
    const double outward = r > 0.0 ? at(t).head<2>().dot(direction.head<2>()) / r : 0.0;
    return direction.z() - sag_at(shape, r).slope * outward;
  }
};

/// The part of the ray that lies within the equator of the base conic; empty (from > to) where there is none.
Interval within_equator(const Approach& ray) {
  constexpr double infinity = std::numeric_limits<double>::infinity();
  const double c = 1.0 / ray.shape.radius;
  const double closing = (1.0 + ray.shape.conic) * c * c; // 1/r² at the equator
  if (!(closing > 0.0))
    return {-infinity, infinity};
  const auto p = ray.start.head<2>();
  const auto d = ray.direction.head<2>();
  constexpr double just_inside = 1.0 - 1e-12;
  const double excess = p.squaredNorm() - just_inside / closing;
  if (d.squaredNorm() == 0.0)
    return excess < 0.0 ? Interval{-infinity, infinity} : Interval{infinity, -infinity};
  const double discriminant = p.dot(d) * p.dot(d) - d.squaredNorm() * excess;
  if (!(discriminant > 0.0))
    return {infinity, -infinity};
  const double half = std::sqrt(discriminant) / d.squaredNorm();
  const double middle = -p.dot(d) / d.squaredNorm();
  return {middle - half, middle + half};
}

/// Where the height has its extremum between two places with slopes of different sign, by halving.
double extremum(const Approach& ray, double from, double to) {
  const double climb_from = ray.climb(from);
  for (int i = 0; i < 60; ++i) {
    const double middle = 0.5 * (from + to);
    (ray.climb(middle) * climb_from > 0.0 ? from : to) = middle;
  }
  return 0.5 * (from + to);
}

/// The part of a step in which the height first changes its sign, be it once or twice.
std::optional<Interval> crossing(const Approach& ray, double from, double to) {
  const double height = ray.height(from);
  if (height * ray.height(to) <= 0.0)
    return Interval{std::min(from, to), std::max(from, to)};
  const bool comes_nearer = height * ray.climb(from) * (to - from) < 0.0;
  if (!comes_nearer || ray.climb(from) * ray.climb(to) >= 0.0)
    return std::nullopt;
  const double turn = extremum(ray, from, to);
  if (height * ray.height(turn) > 0.0)
    return std::nullopt;
  return Interval{std::min(from, turn), std::max(from, turn)};
}

/// Walks from the tangent plane (or from the equator, where that comes before it) outward on both sides, in
/// growing steps, until the height changes its sign.
std::optional<Interval> nearest_crossing(const Approach& ray, double tangent_plane, const Interval& allowed) {
  const double start = std::clamp(tangent_plane, allowed.from, allowed.to);
  const double scale = std::min(std::abs(ray.height(start)), ray.radius(start));
  const double first_step = std::max(scale, 1e-12) / 50.0;
  constexpr int steps = 200;
  constexpr double growth = 1.05;
  double ahead = start;
  double behind = start;
  for (int i = 0; i < steps; ++i) {
    const double step = first_step * std::pow(growth, i);
    const double further = std::min(ahead + step, allowed.to);
    if (const auto found = crossing(ray, ahead, further))
      return found;
    const double nearer = std::max(behind - step, allowed.from);
    if (const auto found = crossing(ray, behind, nearer))
      return found;
    ahead = further;
    behind = nearer;
  }
  return std::nullopt;
}

/// Newton's iteration that halves the bracket whenever a step would leave it.
double root_within(const Approach& ray, Interval bracket) {
  const bool rising = ray.height(bracket.to) > 0.0 || ray.height(bracket.from) < 0.0;
  double t = 0.5 * (bracket.from + bracket.to);
  for (int i = 0; i < 200; ++i) {
    const double height = ray.height(t);
    (height > 0.0) == rising ? bracket.to = t : bracket.from = t;
    double next = t - height / ray.climb(t);
    if (!(next >= bracket.from && next <= bracket.to))
      next = 0.5 * (bracket.from + bracket.to);
    const double moved_by = std::abs(next - t);
    t = next;
    if (moved_by <= std::numeric_limits<double>::epsilon() * std::max(1.0, std::abs(t)))
      break;
  }
  return t;
}

/// Whether the surface is so steep, or met so obliquely, that rounding moves the hit by more than the
/// agreement.
bool steep(const Approach& ray, double hit, double cosine) {
  return std::abs(sag_at(ray.shape, ray.radius(hit)).slope) > 5.0 || cosine < 0.1;
}

Vector unit_normal(const assembly::Asphere& shape, const Vector& hit) {
  const double r = hit.head<2>().norm();
  if (r == 0.0)
    return Vector::UnitZ();
  const double slope = sag_at(shape, r).slope;
  return Vector(-slope * hit.x() / r, -slope * hit.y() / r, 1.0).normalized();
}

} // namespace

Meeting meet_asphere(const assembly::Asphere& shape, const Frame& surface, const Ray& ray) {
  const Vector direction = surface.axes.transpose() * ray.direction;
  const double to_nearest = (surface.origin - ray.point).dot(ray.direction); // to the vertex
  const Approach approach{shape, surface.local(ray.point + to_nearest * ray.direction), direction};
  const double tangent_plane = -approach.start.z() / direction.z();

  const Interval allowed = within_equator(approach);
  if (!std::isfinite(tangent_plane) || allowed.from > allowed.to)
    return {};
  const auto bracket = nearest_crossing(approach, tangent_plane, allowed);
  if (!bracket)
    return {};
  const double t = root_within(approach, *bracket);
  const Vector hit = approach.at(t);
  const Vector normal = unit_normal(shape, hit);

  Meeting meeting;
  meeting.hit = Hit{to_nearest + t, surface.bench(hit), surface.axes * normal};
  const double cosine = std::abs(normal.dot(direction));
  const double c = 1.0 / shape.radius;
  const double before_equator = 1.0 - (1.0 + shape.conic) * c * c * hit.head<2>().squaredNorm();
  meeting.doubtful = cosine * cosine < doubtful_within || before_equator < doubtful_within;
  meeting.steep = steep(approach, t, cosine);
  return meeting;
}

} // namespace lightledger::reference
