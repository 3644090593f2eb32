#pragma once

#include "reference/shape.hpp"

namespace lightledger::reference {

/// A surface of revolution of the second degree through its vertex: c (x² + y² + (1 + K) z²) = 2 z.
struct Conicoid {
  double c, K;
};

/// Meets planes (c = 0), spheres (K = 0) and conics in closed form.
[[nodiscard]] Meeting meet_conicoid(const Conicoid& shape, const Frame& surface, const Ray& ray);

/// Meets an asphere by a bracketed Newton iteration.
[[nodiscard]] Meeting meet_asphere(const assembly::Asphere& shape, const Frame& surface, const Ray& ray);

} // namespace lightledger::reference
