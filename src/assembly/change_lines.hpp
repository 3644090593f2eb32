#pragma once

#include <string_view>

namespace lightledger::assembly {

/// Changes by `--set` are kept as lines behind the file's own text, so that a fault in one has a place like
/// any other. They begin with a zero byte, which no line of a file can; columns do not count it.
inline constexpr char change_line_start = '\0';

[[nodiscard]] inline bool is_change_line(std::string_view line) {
  return line.starts_with(change_line_start);
}

} // namespace lightledger::assembly
