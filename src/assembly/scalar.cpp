#include "scalar.hpp"

#include <algorithm>
#include <array>
#include <charconv>
#include <cstdint>
#include <cstdlib>
#include <limits>
#include <string>

namespace lightledger::assembly {

namespace {

std::size_t digits(std::string_view text, std::size_t from) {
  std::size_t to = from;
  while (to < text.size() && text[to] >= '0' && text[to] <= '9')
    ++to;
  return to - from;
}

bool is_sign(char letter) {
  return letter == '-' || letter == '+';
}

std::size_t exponent_length(std::string_view text, std::size_t from) {
  if (from >= text.size() || (text[from] != 'e' && text[from] != 'E'))
    return 0;
  const std::size_t sign = from + 1 < text.size() && is_sign(text[from + 1]) ? 1 : 0;
  const std::size_t count = digits(text, from + 1 + sign);
  return count == 0 ? 0 : 1 + sign + count;
}

double decimal(std::string_view text) {
  if (text.starts_with('+'))
    text.remove_prefix(1);
  double value = 0.0;
  const auto result = std::from_chars(text.data(), text.data() + text.size(), value);
  // from_chars leaves the value alone where it overflows or underflows; strtod gives infinity or 0.
  return result.ec == std::errc{} ? value : std::strtod(std::string(text).c_str(), nullptr);
}

std::optional<double> based_integer(std::string_view text, int base) {
  std::uint64_t value = 0;
  const auto result = std::from_chars(text.data(), text.data() + text.size(), value, base);
  if (result.ptr != text.data() + text.size() || text.empty())
    return std::nullopt;
  if (result.ec == std::errc::result_out_of_range)
    return std::numeric_limits<double>::infinity();
  return static_cast<double>(value);
}

template <std::size_t N>
bool one_of(std::string_view text, const std::array<std::string_view, N>& words) {
  return std::find(words.begin(), words.end(), text) != words.end();
}

std::optional<double> not_finite(std::string_view text) {
  constexpr std::array<std::string_view, 3> nan{".nan", ".NaN", ".NAN"};
  constexpr std::array<std::string_view, 3> infinite{".inf", ".Inf", ".INF"};
  if (one_of(text, nan))
    return std::numeric_limits<double>::quiet_NaN();
  if (!text.empty() && is_sign(text[0]))
    text.remove_prefix(1);
  if (one_of(text, infinite))
    return std::numeric_limits<double>::infinity();
  return std::nullopt;
}

} // namespace

std::size_t decimal_length(std::string_view text) {
  std::size_t at = !text.empty() && is_sign(text[0]) ? 1 : 0;
  const std::size_t whole = digits(text, at);
  at += whole;
  if (at < text.size() && text[at] == '.') {
    const std::size_t part = digits(text, at + 1);
    if (whole + part == 0)
      return 0;
    at += 1 + part;
  } else if (whole == 0) {
    return 0;
  }
  return at + exponent_length(text, at);
}

std::optional<double> core_number(std::string_view text) {
  const std::size_t length = decimal_length(text);
  if (length != 0 && length == text.size())
    return decimal(text);
  if (text.starts_with("0x"))
    return based_integer(text.substr(2), 16);
  if (text.starts_with("0o"))
    return based_integer(text.substr(2), 8);
  return not_finite(text);
}

bool core_boolean(std::string_view text) {
  constexpr std::array<std::string_view, 6> words{"true", "True", "TRUE", "false", "False", "FALSE"};
  return one_of(text, words);
}

} // namespace lightledger::assembly
