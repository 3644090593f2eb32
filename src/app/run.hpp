#pragma once

#include <string>
#include <vector>

namespace lightledger::app {

/// The program: from the command line to the exit code 0, or 1 where a requirement is not known to be met.
/// Throws InputError for wrong input (exit code 2), anything else for the rest (exit code 3).
[[nodiscard]] int run(const std::vector<std::string>& arguments);

} // namespace lightledger::app
