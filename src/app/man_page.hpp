#pragma once

#include <string>

namespace lightledger::app {

/// The program's page for man(1), section 1, from the same tables as the help.
[[nodiscard]] std::string man_page();

} // namespace lightledger::app
