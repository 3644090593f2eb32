#pragma once

#include "reference/geometry.hpp"

#include <lightledger/assembly/assembly.hpp>

#include <optional>

namespace lightledger::reference {

/// Rays that come this close to an edge (mm), an equator, grazing or critical incidence are doubtful: there
/// rounding alone decides what becomes of them, or moves the result by more than the agreement asked for.
inline constexpr double doubtful_within = 1e-9;

/// Where a ray meets a surface: mm along the ray (negative: behind its start), the point and the unit normal
/// on the bench.
struct Hit {
  double distance;
  Vector point;
  Vector normal;
};

/// A hit, or none where the ray misses the surface; doubtful where rounding decides which. Steep is a meeting
/// with an asphere so far out that an iteration which does not search the whole ray may find none of its
/// points or another.
struct Meeting {
  std::optional<Hit> hit;
  bool doubtful = false;
  bool steep = false;
};

/// Meets the part of the shape that holds its vertex, up to the equator; of two such points, the one nearer
/// along the ray to the tangent plane of the vertex (contract §2, "shape").
[[nodiscard]] Meeting meet(const assembly::Shape& shape, const Frame& surface, const Ray& ray);

/// 1/R in mm⁻¹, 0 for a plane.
[[nodiscard]] double vertex_curvature(const assembly::Shape& shape);

/// Sag and slope dz/dr at a distance r from the axis of the shape (ISO 10110-12); NaN beyond the equator.
struct Sag {
  double sag, slope;
};
[[nodiscard]] Sag sag_at(const assembly::Asphere& shape, double r);

} // namespace lightledger::reference
