#pragma once

#include "options.hpp"

#include <string>
#include <variant>
#include <vector>

namespace lightledger::app {

/// What the command line asks for: the text of --help or --version, or a command. Throws InputError, with all
/// that is wrong in one report, where it cannot be understood.
[[nodiscard]] std::variant<std::string, Options> parse(const std::vector<std::string>& arguments);

} // namespace lightledger::app
