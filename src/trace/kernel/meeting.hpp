#pragma once

#include <lightledger/trace/operator.hpp>
#include <lightledger/trace/rays.hpp>

#include <cstdint>

/// What the passes of one step hand to each other: one array a quantity, one element a ray, one bit a ray for
/// what is true or not. Plain numbers, for every instruction set.
namespace lightledger::trace {

using Lanes = double[RayBlock::lanes];

struct alignas(64) Meeting {
  Lanes d[3], u[3]; ///< arriving, in this surface's frame, where the leg turned it
  Lanes normal[3];  ///< unit, on the side toward which the ray goes
  Lanes path;       ///< length of the leg, negative where the ray runs backwards
  Lanes cos1, sin_squared;
  Lanes normal_part;        ///< n2 cosθ2, or its imaginary part under total reflection
  Lanes turn_cos, turn_sin; ///< from (u, v) to (s, p)

  Lanes t_s[2], t_p[2], r_s[2],
      r_p[2]; ///< flux-normalised, real and imaginary part; those that were asked for
  Lanes crossed_s, crossed_p, reflected_s, reflected_p, absorbed_s,
      absorbed_p; ///< powers, of lossy operators

  int count;
  std::uint64_t alive;        ///< came in
  std::uint64_t hit;          ///< of those, met the surface
  std::uint64_t inside;       ///< of those, inside the clear area
  std::uint64_t crosses;      ///< a passed beam exists: not totally reflected, not swallowed
  std::uint64_t extrapolated; ///< outside a measured curve, whose last point then holds

  bool lossy;     ///< the powers stand in their arrays; else what does not cross is reflected
  bool complex_t; ///< the imaginary parts of t stand in their arrays; else they are 0
  bool complex_r;
};

/// Which amplitudes are wanted.
struct Asked {
  bool t, r;
};

/// The blocks that a step sends out; what is null is not wanted. `hit` is for the tape.
struct Departing {
  RayBlock* pass;
  RayBlock* bounce;
  double (*hit)[3][RayBlock::lanes];
};

/// The launched state: Φ of trace 1, in the entrance basis.
struct Launched {
  double xx, yy, xy_re, xy_im;
};

} // namespace lightledger::trace
