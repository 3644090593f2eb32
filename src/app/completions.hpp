#pragma once

#include <string>

namespace lightledger::app {

/// Scripts that complete commands, options and their values in a shell, from the same tables as the help.
[[nodiscard]] std::string bash_completion();
[[nodiscard]] std::string zsh_completion();
[[nodiscard]] std::string fish_completion();

} // namespace lightledger::app
