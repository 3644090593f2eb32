#pragma once

#include <lightledger/assembly/assembly.hpp>

namespace lightledger::properties {

/// An assembly whose light, beam and train are turned about the first axis: tilts, shifts, turns, fields and
/// states of polarization change so that the whole stands on the bench as before, turned.
[[nodiscard]] assembly::Assembly rotated(assembly::Assembly assembly, double degrees);

} // namespace lightledger::properties
