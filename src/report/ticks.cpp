#include "ticks.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace lightledger::report {
namespace {

double round_step(double rough) {
  const double power = std::pow(10.0, std::floor(std::log10(rough)));
  const double ratio = rough / power;
  if (ratio < 1.5)
    return power;
  if (ratio < 3.5)
    return 2.0 * power;
  return ratio < 7.5 ? 5.0 * power : 10.0 * power;
}

std::string label_of(double value, double step, double largest) {
  const int decimals = std::max(0, -static_cast<int>(std::floor(std::log10(step) + 1e-9)));
  if (largest >= 1e6 || decimals > 5)
    return fmt::format("{:.{}g}", value, 1 + static_cast<int>(std::ceil(std::log10(largest / step))));
  return fmt::format("{:.{}f}", value + 0.0, decimals);
}

std::string power_label(int exponent) {
  if (exponent >= -3 && exponent <= 4)
    return fmt::format("{:g}", std::pow(10.0, exponent));
  return fmt::format("1e{}", exponent);
}

} // namespace

Interval drawable(Interval interval) {
  const double magnitude = std::max(std::abs(interval.from), std::abs(interval.to));
  if (!std::isfinite(interval.from) || !std::isfinite(interval.to) || magnitude > 1.5e300)
    return {0.0, 1.0};
  if (interval.length() > 1e-12 * magnitude && interval.length() > 1e-300)
    return interval;
  const double about = magnitude > 1e-290 ? 0.05 * magnitude : 1.0;
  const double middle = 0.5 * (interval.from + interval.to);
  return {middle - about, middle + about};
}

std::vector<Tick> linear_ticks(Interval interval, int about) {
  const double step = round_step(interval.length() / std::max(about, 1));
  const double largest = std::max(std::abs(interval.from), std::abs(interval.to));
  const double slack = 1e-9 * interval.length();
  std::vector<Tick> ticks;
  for (double number = std::ceil((interval.from - slack) / step);
       number * step <= interval.to + slack && ticks.size() < 100; ++number)
    ticks.push_back({number * step, label_of(number * step, step, largest)});
  return ticks;
}

std::vector<Tick> decade_ticks(Interval interval, int most) {
  const int first = static_cast<int>(std::floor(std::log10(interval.from) + 1e-9));
  const int last = static_cast<int>(std::ceil(std::log10(interval.to) - 1e-9));
  const int stride = std::max(1, (last - first + most) / std::max(most, 1));
  constexpr int few_decades = 5;
  std::vector<Tick> ticks;
  const auto add = [&](double value, std::string label) {
    if (value >= interval.from * (1.0 - 1e-9) && value <= interval.to * (1.0 + 1e-9))
      ticks.push_back({value, std::move(label)});
  };
  for (int exponent = first; exponent <= last; ++exponent) {
    const double power = std::pow(10.0, exponent);
    add(power, (last - exponent) % stride == 0 ? power_label(exponent) : std::string());
    for (int multiple = 2; multiple < 10 && last - first <= few_decades; ++multiple)
      add(multiple * power, {});
  }
  return ticks;
}

} // namespace lightledger::report
