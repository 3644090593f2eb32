#include "figures.hpp"

#include <fmt/format.h>

#include <cmath>

namespace lightledger::report {

std::string fraction(double value) {
  if (value == 0.0)
    return "-";
  if (std::abs(value) < 0.5e-4)
    return "<0.0001";
  return fmt::format("{:.4f}", value);
}

std::string decibels(double value) {
  if (!(value > 0.0))
    return "-";
  const double level = 10.0 * std::log10(value);
  return fmt::format("{:.3f}", std::abs(level) < 0.5e-3 ? 0.0 : level);
}

std::string per_cent(double value) {
  const double hundredths = 100.0 * value;
  if (std::abs(hundredths) < 0.01)
    return "<0.01 %";
  if (std::abs(hundredths) >= 9.95)
    return fmt::format("{:.1f} %", hundredths);
  return fmt::format("{:#.2g} %", hundredths);
}

std::string quantity(double value) {
  return value == 0.0 ? "0" : fmt::format("{:#.4g}", value);
}

std::string plain(double value) {
  return fmt::format("{:.6g}", value);
}

std::string error_size(double value) {
  return fmt::format("{:.1g}", value);
}

std::string count(std::uint64_t value) {
  std::string digits = std::to_string(value);
  for (int place = static_cast<int>(digits.size()) - 3; place > 0; place -= 3)
    digits.insert(static_cast<std::size_t>(place), 1, ' ');
  return digits;
}

std::string duration(double seconds) {
  return seconds < 1.0 ? fmt::format("{:.0f} ms", 1e3 * seconds) : fmt::format("{:.1f} s", seconds);
}

} // namespace lightledger::report
