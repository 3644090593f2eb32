#pragma once

#include "commands.hpp"

#include <string>

namespace lightledger::app {

/// The help of the program and of one command, each with an example.
[[nodiscard]] std::string program_help();
[[nodiscard]] std::string command_help(const CommandInfo& command);

/// One line: how the program, or a command, is called.
[[nodiscard]] std::string program_usage();
[[nodiscard]] std::string command_usage(const CommandInfo& command);

} // namespace lightledger::app
