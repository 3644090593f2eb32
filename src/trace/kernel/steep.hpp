#pragma once

namespace lightledger::trace {

struct PlanOp;

/// Where the ray o + t d meets an asphere that Newton's iteration in lanes does not settle; sets t, or
/// returns false. One ray, compiled for every processor.
bool meet_steep(const PlanOp& op, const double (&o)[3], const double (&d)[3], double& t);

} // namespace lightledger::trace
