#pragma once

#include <cstdint>

namespace lightledger::trace {

/// Up to 64 rays as a structure of arrays that stays in the first-level cache; aligned to its lines.
///
/// A ray stands at p (mm, in the frame of the surface it met last) and runs along the unit vector d. The unit
/// vector u ⟂ d and v = d × u are its transverse basis; J, with row index u, v and column index x, y of the
/// entrance basis, is its Jones matrix in flux-normalised amplitudes (J[4·row + 2·column] the real part, the
/// imaginary one next to it). `w` is its weight: what scatter, loss and bulk left of the launched share. Its
/// power is w · tr(J Φ J†) for a launched coherency matrix Φ of trace 1.
struct alignas(64) RayBlock {
  static constexpr int lanes = 64;

  double p[3][lanes];
  double d[3][lanes];
  double u[3][lanes];
  double J[8][lanes];
  double opl[lanes]; ///< optical path length since launch, mm
  double w[lanes];
  std::uint64_t alive; ///< one bit a lane; the other lanes hold anything
  std::uint64_t first; ///< number of lane 0 in its set of rays
  int count;           ///< lanes in use
};

} // namespace lightledger::trace
