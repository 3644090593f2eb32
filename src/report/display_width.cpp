#include "display_width.hpp"

#include "utf8.hpp"

#include <algorithm>
#include <array>
#include <cstddef>
#include <span>

namespace lightledger::report {
namespace {

struct Span {
  char32_t first, last;
};

// Unicode 15: general categories Mn, Me and Cf, as far as names of things are likely to use them.
constexpr std::array<Span, 15> zero_width{{{0x300, 0x36F},
                                           {0x483, 0x489},
                                           {0x591, 0x5BD},
                                           {0x610, 0x61A},
                                           {0x64B, 0x65F},
                                           {0x93C, 0x93C},
                                           {0x94D, 0x94D},
                                           {0xE31, 0xE31},
                                           {0xE34, 0xE3A},
                                           {0x1AB0, 0x1AFF},
                                           {0x1DC0, 0x1DFF},
                                           {0x200B, 0x200F},
                                           {0x20D0, 0x20FF},
                                           {0xFE00, 0xFE0F},
                                           {0xFE20, 0xFE2F}}};

// Unicode Standard Annex 11: East Asian width W and F.
constexpr std::array<Span, 13> double_width{{{0x1100, 0x115F},
                                             {0x231A, 0x231B},
                                             {0x2E80, 0x303E},
                                             {0x3041, 0x4DBF},
                                             {0x4E00, 0xA4CF},
                                             {0xAC00, 0xD7A3},
                                             {0xF900, 0xFAFF},
                                             {0xFE30, 0xFE6F},
                                             {0xFF01, 0xFF60},
                                             {0xFFE0, 0xFFE6},
                                             {0x1F300, 0x1F64F},
                                             {0x1F680, 0x1FAFF},
                                             {0x20000, 0x3FFFD}}};

bool holds(std::span<const Span> spans, char32_t character) {
  return std::ranges::any_of(
      spans, [=](const Span& span) { return span.first <= character && character <= span.last; });
}

int columns(char32_t character) {
  if (character < 0x300)
    return 1;
  if (holds(zero_width, character))
    return 0;
  return holds(double_width, character) ? 2 : 1;
}

/// C0 and C1 controls and the line and paragraph separators.
bool breaks_the_line(char32_t character) {
  return character < 0x20 || (0x7F <= character && character < 0xA0) || character == 0x2028 ||
         character == 0x2029;
}

} // namespace

int display_width(std::string_view text) {
  int width = 0;
  while (!text.empty()) {
    const Character next = first_character(text);
    width += columns(next.code);
    text.remove_prefix(next.bytes);
  }
  return width;
}

std::string shortened(std::string_view text, int width) {
  constexpr std::string_view mark = "...";
  if (display_width(text) <= width)
    return std::string(text);
  int room = width - static_cast<int>(mark.size());
  std::size_t kept = 0;
  while (kept < text.size()) {
    const Character next = first_character(text.substr(kept));
    room -= columns(next.code);
    if (room < 0)
      break;
    kept += next.bytes;
  }
  return std::string(text.substr(0, kept)).append(mark);
}

std::string on_one_line(std::string_view text) {
  std::string line;
  while (!text.empty()) {
    const Character next = first_character(text);
    line += breaks_the_line(next.code) ? std::string_view(" ") : text.substr(0, next.bytes);
    text.remove_prefix(next.bytes);
  }
  return line;
}

} // namespace lightledger::report
