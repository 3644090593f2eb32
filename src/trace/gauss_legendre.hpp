#pragma once

#include <vector>

namespace lightledger::trace {

/// A node in (−1, 1) and its weight; the weights of a rule add up to 2.
struct QuadratureNode {
  double node, weight;
};

/// The Gauss–Legendre rule of `count` nodes in ascending order, to a few units in the last place, by Newton's
/// method on the Legendre polynomial from Tricomi's estimate (Abramowitz & Stegun 25.4.29, 22.16.6). Work
/// grows with the square of the count.
[[nodiscard]] std::vector<QuadratureNode> gauss_legendre(int count);

} // namespace lightledger::trace
