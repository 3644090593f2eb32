#pragma once

#include "reader.hpp"

#include <lightledger/assembly/assembly.hpp>

namespace lightledger::assembly {

/// Reads `{axis: A, pass: 1, block: 0}`.
[[nodiscard]] Polarizer read_polarizer(Reader& reader, Value value);

/// Reads `{axis: A, waves: 0.25, at: 532}`, or with `degrees` in place of `waves`.
[[nodiscard]] Retarder read_retarder(Reader& reader, Value value);

/// Reads `{angle: A, kind: active}` or `faraday`.
[[nodiscard]] Rotator read_rotator(Reader& reader, Value value);

} // namespace lightledger::assembly
