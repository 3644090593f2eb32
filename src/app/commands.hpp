#pragma once

#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace lightledger::app {

enum class Command { check, budget, ghosts, polarization, coating, media, draw, report };

/// A command as the user sees it.
struct CommandInfo {
  Command command;
  const char* name;
  const char* arguments; ///< what follows the name in the usage line
  const char* purpose;   ///< one sentence
  const char* example;
};

[[nodiscard]] const std::vector<CommandInfo>& commands();
[[nodiscard]] const CommandInfo& info(Command command);

/// The command of a name, none for anything else.
[[nodiscard]] const CommandInfo* find_command(std::string_view name);

/// All names, for suggestions.
[[nodiscard]] std::vector<std::string_view> command_names();

} // namespace lightledger::app
