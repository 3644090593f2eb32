#pragma once

#include "reference/bench.hpp"

#include <optional>

namespace lightledger::reference {

/// A train in which surfaces are met again, written out: each visit has a surface of its own, which stands
/// where the shared one stands, and everything else stays where it is on the bench. None where the written
/// train would need a negative gap, or bends the axis at a surface met again (the axis would bend at another
/// point of it).
[[nodiscard]] std::optional<assembly::Assembly> unfolded(const assembly::Assembly& assembly,
                                                         const Bench& bench);

} // namespace lightledger::reference
