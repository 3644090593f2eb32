#pragma once

#include "mapping.hpp"

#include <lightledger/assembly/assembly.hpp>

namespace lightledger::assembly {

/// Reads `radius`, `conic` and `asphere` of a station, where they stand.
[[nodiscard]] Shape read_shape(Reader& reader, Mapping& station);

} // namespace lightledger::assembly
