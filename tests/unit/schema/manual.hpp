#pragma once

#include "samples.hpp"

#include <map>
#include <string>
#include <vector>

/// The fenced blocks of docs/assembly-file.md. What follows `yaml` on the fence says how a block is to be
/// run: nothing, a whole file; `part`, sections of a file, completed by a plain light and detector; an
/// address, values of which each line may stand there in the first example; `curves.csv`, the curves that
/// parts refer to.
namespace lightledger::schema {

/// Blocks by what stands on their fence, in order.
[[nodiscard]] std::multimap<std::string, std::string> manual_blocks();

/// Whole files: the examples, and the parts as completed.
[[nodiscard]] std::vector<Sample> manual_examples();

/// Single values with the addresses where they may stand.
[[nodiscard]] std::vector<assembly::Change> manual_values();

} // namespace lightledger::schema
