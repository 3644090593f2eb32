#pragma once

#include "reference/bench.hpp"

#include <lightledger/assembly/assembly.hpp>

namespace lightledger::reference {

/// A train met from its other end.
struct Reversed {
  assembly::Assembly assembly; ///< the stations before the detector in reverse order, without a detector
  Frame entrance;              ///< the reversed train's bench, as it lies on the bench of the train
};

/// Turns a train round so that the same ray runs back through the same places. Shifts must stand where the
/// axis leaves as it arrived (Variety::reversible), for a station is shifted across the axis that arrives.
[[nodiscard]] Reversed reversed(const assembly::Assembly& assembly, const Bench& bench);

/// The angles a, b, c of a rotation Rx(a) Ry(b) Rz(c), in degrees.
[[nodiscard]] std::array<double, 3> angles_of(const Rotation& rotation);

} // namespace lightledger::reference
