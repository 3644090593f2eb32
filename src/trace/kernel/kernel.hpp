#pragma once

#include "launching.hpp"
#include "meeting.hpp"

#include <lightledger/trace/entry.hpp>
#include <lightledger/trace/instruction_set.hpp>

namespace lightledger::trace {

/// The launch of rays and the passes of one step, compiled for one instruction set.
///
/// `arrive` brings rays onto the surface and sends their directions, points and bases out; `respond` finds
/// the amplitudes that are asked for; `settle` makes Jones matrices, weights and the ledger's entry. Between
/// them goes a Meeting whose `count` and `alive` are set and whose other bits are 0.
struct Kernel {
  void (*launch)(const Launching&, RayBlock&); ///< of a block whose `count` is set
  void (*arrive)(const PlanLeg&, const PlanOp&, const RayBlock&, const Departing&, Meeting&);
  void (*respond)(const PlanOp&, Asked, Meeting&);
  void (*settle)(const PlanLeg&, const PlanOp&, const Launched&, const RayBlock&, const Meeting&,
                 const Departing&, bool bounces, Entry&);
  InstructionSet compiled_for;
};

/// The kernel for an instruction set; null where the program holds none or this machine does not run it.
[[nodiscard]] const Kernel* kernel_for(InstructionSet set);

/// That of the instruction set in use.
[[nodiscard]] const Kernel& kernel();

} // namespace lightledger::trace
