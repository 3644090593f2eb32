#pragma once

#include "reader.hpp"

#include <lightledger/assembly/assembly.hpp>

namespace lightledger::assembly {

/// Reads `{reflect: R, transmit: T}`, each a fraction or `{s: …, p: …}`; without `transmit` nothing is
/// absorbed.
[[nodiscard]] Ideal read_ideal(Reader& reader, Value value);

} // namespace lightledger::assembly
