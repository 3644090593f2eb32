#pragma once

#include "reader.hpp"

#include <lightledger/assembly/assembly.hpp>

namespace lightledger::assembly {

/// Reads `clear`: what of a surface is open.
[[nodiscard]] Clear read_clear(Reader& reader, Value value);

} // namespace lightledger::assembly
