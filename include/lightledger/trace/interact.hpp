#pragma once

#include <lightledger/optics/polarization.hpp>
#include <lightledger/trace/entry.hpp>
#include <lightledger/trace/instruction_set.hpp>
#include <lightledger/trace/operator.hpp>
#include <lightledger/trace/rays.hpp>

namespace lightledger::trace {

/// What happened to each ray at a meeting, for those who must know more than the ledger: the hit in the
/// surface's frame, the turn of the basis before the amplitudes act, and the amplitudes of the intended
/// action.
struct Tape {
  double hit[3][RayBlock::lanes];
  double cos_incident[RayBlock::lanes];
  double turn_cos[RayBlock::lanes], turn_sin[RayBlock::lanes];
  double a_s[2][RayBlock::lanes], a_p[2][RayBlock::lanes]; ///< real and imaginary parts
  std::uint64_t inside; ///< rays that met the surface inside its clear area
};

/// Where a step leaves its results; what is null is not wanted. A beam may go into the block that came in
/// where the other one is not wanted.
struct StepOut {
  RayBlock* pass = nullptr;   ///< the beam that crosses
  RayBlock* bounce = nullptr; ///< the beam that is reflected
  Tape* tape = nullptr;
  Entry* entry = nullptr; ///< set, not added to; its `turned` only where both beams are wanted
  bool bounces = false;   ///< the beam that goes onward for the tape and the entry is the reflected one
};

/// The polarized interaction of a block of rays: from the last surface along the leg to the next,
/// intersection, aperture, Fresnel or coating amplitudes in the local s, p basis, both beams, the ledger's
/// entry. Amplitudes, bases and signs are those of contract §2; Yun, Crabtree & Chipman (Appl. Opt. 50, 2855,
/// 2011) with u = s as each ray's basis behind the surface.
/// Returns the instruction set that did it.
InstructionSet interact(const PlanLeg& leg, const PlanOp& op, const optics::Coherency& coherency,
                        const RayBlock& in, const StepOut& out);

} // namespace lightledger::trace
