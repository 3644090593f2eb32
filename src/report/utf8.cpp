#include "utf8.hpp"

namespace lightledger::report {
namespace {

std::size_t sequence_length(unsigned char lead) {
  if (lead >= 0xF0 && lead < 0xF8)
    return 4;
  if (lead >= 0xE0 && lead < 0xF0)
    return 3;
  return lead >= 0xC0 && lead < 0xE0 ? 2 : 1;
}

} // namespace

Character first_character(std::string_view text) {
  const auto byte = [&](std::size_t i) { return static_cast<unsigned char>(text[i]); };
  const std::size_t length = sequence_length(byte(0));
  if (length == 1 || length > text.size())
    return {byte(0), 1, byte(0) < 0x80};
  char32_t code = byte(0) & (0xFFU >> (length + 1));
  for (std::size_t i = 1; i < length; ++i) {
    if ((byte(i) & 0xC0U) != 0x80U)
      return {byte(0), 1, false};
    code = (code << 6U) | (byte(i) & 0x3FU);
  }
  return {code, length, true};
}

} // namespace lightledger::report
