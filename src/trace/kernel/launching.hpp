#pragma once

#include <lightledger/trace/rays.hpp>

#include <cstdint>

namespace lightledger::trace {

/// What a block of scattered rays is launched from, as plain numbers.
struct Launching {
  std::uint64_t radial[RayBlock::lanes];    ///< fractions of 2⁶⁴ of the disc's area …
  std::uint64_t azimuthal[RayBlock::lanes]; ///< … and of a turn
  double inner_squared;                     ///< of the hole, relative to the radius
  double gaussian_decay;                    ///< 2 radius²/w², 0 for even irradiance
  double centre[2], first[2], second[2];    ///< of the footprint, mm
  bool finite;
  double
      object[3]; ///< direction at infinity, else the point that rays go to, or minus the one they come from
  double scale;  ///< brings a far object near; negative where rays come from it
};

} // namespace lightledger::trace
