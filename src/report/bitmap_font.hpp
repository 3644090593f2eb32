#pragma once

#include <array>
#include <cstdint>
#include <string_view>

namespace lightledger::report {

/// A small typeface for pictures: capitals seven dots high, two more below the line.
struct Glyph {
  static constexpr int height = 9;
  static constexpr int above_line = 7;
  static constexpr int most_width = 5;

  int width;                             ///< dots from its first inked column to its last
  std::array<std::uint8_t, height> rows; ///< the bit 1 << (width − 1 − column) is a dot
};

/// Latin letters, digits and signs; an empty box for what the typeface lacks.
[[nodiscard]] const Glyph& glyph(char32_t character);

/// Dots that a line of UTF-8 text takes, one between two glyphs.
[[nodiscard]] int dots_across(std::string_view text);

} // namespace lightledger::report
