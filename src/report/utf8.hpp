#pragma once

#include <cstddef>
#include <string_view>

namespace lightledger::report {

struct Character {
  char32_t code;
  std::size_t bytes;
  bool valid; ///< false for a byte out of place, which then stands for itself
};

/// The first character of text that is not empty.
[[nodiscard]] Character first_character(std::string_view text);

} // namespace lightledger::report
