#pragma once

#include "reference/tracer.hpp"

#include <lightledger/assembly/assembly.hpp>

namespace lightledger::reference {

/// Half a turn about x: y and z change their sign.
[[nodiscard]] Rotation about_face();

/// The same surface described in its own axes after half a turn about x; media and coating stay as they are.
[[nodiscard]] assembly::Surface turned_round(assembly::Surface surface);

/// A train met from its other end.
struct Reversed {
  assembly::Assembly assembly; ///< the stations in reverse order, and a detector where the light was launched
  Frame entrance;              ///< the reversed train's bench, as it lies on the bench of the train
};

/// Turns a train round so that the same ray runs back through the same places. Shifts must stand where the
/// axis leaves as it arrived (Variety::reversible), for a station is shifted across the axis that arrives,
/// and no surface may be met again. The magnets of Faraday rotators are reversed: only so do matrices
/// transpose.
[[nodiscard]] Reversed reversed(const assembly::Assembly& assembly, const Bench& bench);

/// A ray that reached the detector, sent back from behind the last station before it, on the reversed train's
/// bench.
[[nodiscard]] Ray returning(const RayRecord& there, const Frame& entrance);

/// Whether a ray that runs back meets the surfaces where it met them on the way there. Behind a strongly
/// curved mirror it may meet another point of it that is nearer to the tangent plane, and so goes astray by
/// the rule of the contract.
[[nodiscard]] bool same_places(const RayRecord& there, const RayRecord& back, const Frame& entrance);

/// The angles a, b, c of a rotation Rx(a) Ry(b) Rz(c), in degrees.
[[nodiscard]] std::array<double, 3> angles_of(const Rotation& rotation);

} // namespace lightledger::reference
