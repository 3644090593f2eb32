#pragma once

#include <lightledger/assembly/assembly.hpp>

#include <array>
#include <vector>

namespace lightledger::reference {

/// A point of the disc of launch in mm and the share of the power that starts there.
struct DiscPoint {
  std::array<double, 2> at;
  double share;
};

/// The points of a pattern of `rings` or a `grid`; shares add up to 1. Throws std::invalid_argument for
/// others.
[[nodiscard]] std::vector<DiscPoint> disc_points(const assembly::Beam& beam,
                                                 const assembly::Sampling& pattern);

/// Nodes and weights of Gauss–Legendre quadrature on [0, 1], from the eigenvalues of the Jacobi matrix (Golub
/// & Welsch, Math. Comp. 23, 221 (1969)).
struct Node {
  double at, weight;
};
[[nodiscard]] std::vector<Node> gauss_legendre(int count);

} // namespace lightledger::reference
