#pragma once

#include <lightledger/trace/train.hpp>

#include <optional>

namespace lightledger::trace {

/// Cosines of the angles of incidence.
struct Cosines {
  double least, most;
};

/// The amplitudes of an operator with layers as polynomials over a range of angles: interpolated at Chebyshev
/// nodes, cut where the series has fallen below rounding, and verified at four times as many places to 1e-13.
/// None where the layers do not let themselves be written so, as thick films and narrow filters do not, or
/// near and beyond the critical angle.
[[nodiscard]] std::optional<AmplitudeTable> tabulate(const PlanOp& op, Cosines range);

/// Gives the operators of a train with layers their tables, where so many rays will meet them that it pays:
/// over the angles that a few rays find on the intended path, and somewhat wider ones for light from the other
/// side. What falls outside asks the layers. Which operators get one depends on the train alone.
void tabulate(Train& train);

} // namespace lightledger::trace
