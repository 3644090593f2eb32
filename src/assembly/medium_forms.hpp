#pragma once

#include "reader.hpp"

#include <lightledger/optics/medium.hpp>

namespace lightledger::assembly {

/// Reads one medium: an index, a formula or a table, with what limits and completes it. The value's label is
/// its name. After a fault some medium of that name, known at every wavelength.
[[nodiscard]] optics::Medium read_medium(Reader& reader, Value value);

} // namespace lightledger::assembly
