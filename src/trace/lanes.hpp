#pragma once

#include <lightledger/trace/interact.hpp>

#include <cmath>
#include <cstdint>

/// What the passes of one step hand to each other: one array a quantity, one element a ray.
namespace lightledger::trace {

using Lanes = double[RayBlock::lanes];
using Mask = std::uint64_t[RayBlock::lanes]; ///< all bits set, or none

struct Meeting {
  int count;
  Mask alive;  ///< came in
  Mask hit;    ///< of those, met the surface
  Mask inside; ///< of those, inside the clear area

  Lanes p[3], d[3], u[3]; ///< arriving, in this surface's frame; p at the hit after `meet`
  Lanes normal[3];        ///< unit, on the side toward which the ray goes
  Lanes path;             ///< length of the leg, negative where the ray runs backwards
  Lanes cos1;
  Lanes sin1_squared;

  Lanes s[3];               ///< unit(k × N), or u where that vanishes
  Lanes turn_cos, turn_sin; ///< from (u, v) to (s, p)
  Mask crosses;             ///< a passed beam exists: not totally reflected, not swallowed
  Lanes cos2;

  Lanes r_s[2], r_p[2], t_s[2], t_p[2]; ///< flux-normalised, real and imaginary part
  Mask extrapolated;                    ///< outside a measured curve, whose last point then holds
  Lanes reflected_s, reflected_p, crossed_s, crossed_p, absorbed_s, absorbed_p; ///< powers
};

inline double select(std::uint64_t mask, double yes, double no) {
  return mask != 0 ? yes : no;
}

inline std::uint64_t mask_of(bool condition) {
  return condition ? ~std::uint64_t{0} : std::uint64_t{0};
}

/// Brings the rays into the surface's frame and onto the surface; sets hit, p, path, normal, cos1,
/// sin1_squared.
void intersect(const PlanLeg& leg, const PlanOp& op, const RayBlock& in, Meeting& meeting);

/// Sets `inside` from the clear area.
void clip(const PlanOp& op, Meeting& meeting);

/// The basis s, p, the turn into it, and the direction cosine beyond.
void orient(const PlanOp& op, Meeting& meeting);

/// All four amplitudes and the powers, each from its own expression.
void respond(const PlanOp& op, Meeting& meeting);

} // namespace lightledger::trace
