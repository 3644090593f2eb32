#include "plain_text.hpp"

#include <fmt/format.h>

#include <algorithm>

namespace lightledger::assembly {

namespace {

struct Lead {
  std::size_t length;
  char32_t bits;
  char32_t least; ///< smallest code that needs this length
};

Lead lead(unsigned char byte) {
  if (byte < 0x80)
    return {1, byte, 0};
  if (byte >= 0xC2 && byte < 0xE0)
    return {2, byte & 0x1FU, 0x80};
  if (byte >= 0xE0 && byte < 0xF0)
    return {3, byte & 0x0FU, 0x800};
  if (byte >= 0xF0 && byte < 0xF5)
    return {4, byte & 0x07U, 0x10000};
  return {0, 0, 0};
}

bool continues(char byte) {
  return (static_cast<unsigned char>(byte) & 0xC0U) == 0x80U;
}

bool surrogate(char32_t code) {
  return code >= 0xD800 && code <= 0xDFFF;
}

} // namespace

Character first_character(std::string_view text) {
  if (text.empty())
    return {};
  auto [length, code, least] = lead(static_cast<unsigned char>(text[0]));
  if (length == 0 || text.size() < length)
    return {};
  for (const char byte : text.substr(1, length - 1)) {
    if (!continues(byte))
      return {};
    code = (code << 6U) | (static_cast<unsigned char>(byte) & 0x3FU);
  }
  if (code < least || code > 0x10FFFF || surrogate(code))
    return {};
  return {code, length};
}

bool steers_terminal(char32_t code) {
  const auto within = [code](char32_t from, char32_t to) { return code >= from && code <= to; };
  return code < 0x20 || within(0x7F, 0x9F) || within(0x200B, 0x200F) || within(0x2028, 0x202E) ||
         within(0x2060, 0x206F) || code == 0xFEFF || within(0xE0000, 0xE007F);
}

std::size_t count_characters(std::string_view text) {
  return static_cast<std::size_t>(
      std::count_if(text.begin(), text.end(), [](char byte) { return !continues(byte); }));
}

std::string printable(std::string_view text, std::size_t limit) {
  std::string result;
  for (std::size_t count = 0; !text.empty(); ++count) {
    if (count == limit)
      return result + "…";
    const Character character = first_character(text);
    const std::size_t length = std::max<std::size_t>(character.length, 1);
    if (text[0] == '\t')
      result += ' ';
    else if (character.length == 0 || steers_terminal(character.code))
      result += '?';
    else
      result += text.substr(0, length);
    text.remove_prefix(length);
  }
  return result;
}

std::string quoted(std::string_view text) {
  constexpr std::size_t longest_name = 48;
  return fmt::format("'{}'", printable(text, longest_name));
}

Mark mark_at(std::string_view text, std::size_t offset) {
  const std::string_view before = text.substr(0, offset);
  const std::size_t line_start = before.rfind('\n') + 1; // npos + 1 is 0
  return {static_cast<int>(std::count(before.begin(), before.end(), '\n')) + 1,
          static_cast<int>(offset - line_start) + 1};
}

} // namespace lightledger::assembly
