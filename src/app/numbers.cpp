#include "numbers.hpp"

#include <charconv>
#include <cmath>

namespace lightledger::app {
namespace {

template <class Number>
std::optional<Number> number(std::string_view word) {
  Number value{};
  const char* end = word.data() + word.size();
  const auto [stop, error] = std::from_chars(word.data(), end, value);
  return error == std::errc{} && stop == end && !word.empty() ? std::optional(value) : std::nullopt;
}

std::vector<std::string_view> split_at_colons(std::string_view word) {
  std::vector<std::string_view> parts;
  while (true) {
    const std::size_t colon = word.find(':');
    parts.push_back(word.substr(0, colon));
    if (colon == std::string_view::npos)
      return parts;
    word.remove_prefix(colon + 1);
  }
}

std::optional<std::vector<double>> values(double start, double stop, double step, std::size_t most) {
  constexpr double rounding = 1e-9; // of a step
  const double intervals = std::floor((stop - start) / step + rounding);
  if (!(step > 0.0) || !(stop >= start) || !(intervals < static_cast<double>(most)))
    return std::nullopt;
  std::vector<double> list(static_cast<std::size_t>(intervals) + 1);
  for (std::size_t i = 0; i < list.size(); ++i)
    list[i] = start + static_cast<double>(i) * step;
  if (std::abs(list.back() - stop) <= rounding * step)
    list.back() = stop;
  return list;
}

} // namespace

std::optional<std::uint64_t> whole_number(std::string_view word, std::uint64_t least, std::uint64_t most) {
  const auto value = number<std::uint64_t>(word);
  return value && least <= *value && *value <= most ? value : std::nullopt;
}

std::optional<double> finite_number(std::string_view word) {
  const auto value = number<double>(word);
  return value && std::isfinite(*value) ? value : std::nullopt;
}

std::optional<std::vector<double>> steps(std::string_view word, std::size_t most) {
  std::vector<double> given;
  for (const std::string_view part : split_at_colons(word)) {
    const auto value = finite_number(part);
    if (!value)
      return std::nullopt;
    given.push_back(*value);
  }
  if (given.size() == 1)
    return given;
  return given.size() == 3 ? values(given[0], given[1], given[2], most) : std::nullopt;
}

} // namespace lightledger::app
