#pragma once

namespace lightledger::trace {

/// Sine and cosine of phases too large for the kernel's own reduction; compiled for every processor.
void far_phases(const double* angles, double* sines, double* cosines, int count);

} // namespace lightledger::trace
