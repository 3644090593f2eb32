#pragma once

#include <string>
#include <string_view>

namespace lightledger::report {

/// Columns that UTF-8 text takes on a terminal: two for East Asian wide characters and emoji, none for
/// combining marks. A byte that is no UTF-8 counts one.
[[nodiscard]] int display_width(std::string_view text);

/// The text cut to at most `width` columns; a cut one ends in "...".
[[nodiscard]] std::string shortened(std::string_view text, int width);

/// The text on one line: control characters, line breaks and escapes become blanks.
[[nodiscard]] std::string on_one_line(std::string_view text);

} // namespace lightledger::report
