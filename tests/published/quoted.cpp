#include "published/quoted.hpp"

#include <algorithm>
#include <cmath>
#include <regex>
#include <stdexcept>
#include <string>

namespace lightledger::published {
namespace {

/// Digits from the first that is not 0 up to the exponent.
int significant_digits(std::string_view text) {
  const auto mantissa = text.substr(0, text.find_first_of("e %"));
  const auto first = mantissa.find_first_of("123456789");
  if (first == std::string_view::npos)
    return 0;
  const auto is_digit = [](char letter) { return letter >= '0' && letter <= '9'; };
  return static_cast<int>(std::ranges::count_if(mantissa.substr(first), is_digit));
}

} // namespace

Quoted quoted(std::string_view text) {
  static const std::regex number{R"([+-]?\d+(?:\.(\d+))?(?:e([+-]?\d+))?( %)?)"};
  static const std::regex degrees_minutes{R"((\d+) deg (\d+)')"};
  const std::string copy{text};
  std::smatch parts;
  if (std::regex_match(copy, parts, degrees_minutes))
    return {.value = std::stod(parts[1]) + std::stod(parts[2]) / 60.0, .half_unit = 0.5 / 60.0};
  if (!std::regex_match(copy, parts, number))
    throw std::invalid_argument("not a published number: " + copy);
  const auto decimals = static_cast<int>(parts[1].length());
  const int exponent = parts[2].matched ? std::stoi(parts[2]) : 0;
  return {.value = std::stod(copy),
          .half_unit = 0.5 * std::pow(10.0, exponent - decimals),
          .scale = parts[3].matched ? 100.0 : 1.0,
          .digits = significant_digits(text)};
}

} // namespace lightledger::published
