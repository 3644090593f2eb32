#pragma once

#include "reader.hpp"

#include <lightledger/assembly/assembly.hpp>

#include <vector>

namespace lightledger::assembly {

/// Reads the section `requirements`. Whether a quantity exists is known only to the commands.
[[nodiscard]] std::vector<Requirement> read_requirements(Reader& reader, Value section);

} // namespace lightledger::assembly
