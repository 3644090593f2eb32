#include "colour_scale.hpp"

#include "figures.hpp"

#include <algorithm>
#include <cmath>

namespace lightledger::report {
namespace {

/// Greater magnitudes are shown as this one, so that differences of two are finite.
constexpr double most_magnitude = 1e300;
constexpr int most_decades = 9;
/// A scale of positive values starts at zero where the least is below this share of the greatest.
constexpr double near_zero = 0.3;

struct Extremes {
  double least = INFINITY, least_positive = INFINITY, greatest = -INFINITY;
};

Extremes extremes(std::span<const double> values) {
  Extremes found;
  for (const double value : values) {
    if (!std::isfinite(value))
      continue;
    found.least = std::max(std::min(found.least, value), -most_magnitude);
    found.greatest = std::min(std::max(found.greatest, value), most_magnitude);
    if (value > 0.0)
      found.least_positive = std::min(found.least_positive, value);
  }
  return found;
}

Interval linear_range(const Extremes& found) {
  if (found.greatest == found.least && found.greatest > 0.0)
    return {0.0, found.greatest};
  const bool from_zero = found.least > 0.0 && found.least < near_zero * found.greatest;
  return {from_zero ? 0.0 : found.least, found.greatest};
}

Interval decades(const Extremes& found) {
  constexpr double least_exponent = -300.0;
  if (!(found.greatest > 0.0))
    return {0.1, 1.0};
  const double last = std::max(std::ceil(std::log10(found.greatest) - 1e-9), least_exponent);
  const double first = std::floor(std::log10(found.least_positive) + 1e-9);
  return {std::pow(10.0, std::clamp(first, last - most_decades, last - 1.0)), std::pow(10.0, last)};
}

Interval symmetric(const Extremes& found) {
  const double most = std::max(std::abs(found.least), std::abs(found.greatest));
  return most > 0.0 && std::isfinite(most) ? Interval{-most, most} : Interval{-1.0, 1.0};
}

Interval circle(const Extremes& found) {
  for (const double half : {90.0, 180.0})
    if (found.least >= -half && found.greatest <= half)
      return {-half, half};
  return {0.0, 360.0};
}

Interval range_of(Scale scale, const Extremes& found) {
  switch (scale) {
  case Scale::logarithmic:
    return decades(found);
  case Scale::diverging:
    return symmetric(found);
  case Scale::cyclic:
    return circle(found);
  case Scale::linear:
    break;
  }
  return drawable(linear_range(found));
}

const ColourMap& map_of(Scale scale) {
  if (scale == Scale::diverging)
    return diverging_map();
  return scale == Scale::cyclic ? cyclic_map() : sequential_map();
}

/// Eighths of the circle.
std::vector<Tick> circle_ticks(Interval range) {
  std::vector<Tick> ticks;
  for (int eighth = 0; eighth <= 8; ++eighth) {
    const double value = range.from + range.length() * eighth / 8.0;
    ticks.push_back({value, eighth % 2 == 0 ? plain(value) : std::string()});
  }
  return ticks;
}

} // namespace

ColourScale::ColourScale(Scale scale, std::span<const double> values)
    : m_scale(scale), m_range(range_of(scale, extremes(values))), m_map(&map_of(scale)) {}

double ColourScale::place(double value) const {
  if (m_scale == Scale::cyclic) {
    const double turns = (value - m_range.from) / m_range.length();
    return turns - std::floor(turns);
  }
  const double inside = std::clamp(value, m_range.from, m_range.to);
  if (m_scale == Scale::logarithmic)
    return std::log(inside / m_range.from) / std::log(m_range.to / m_range.from);
  return (inside - m_range.from) / m_range.length();
}

std::vector<Tick> ColourScale::ticks(int about) const {
  if (m_scale == Scale::logarithmic)
    return decade_ticks(m_range, about);
  if (m_scale == Scale::cyclic)
    return circle_ticks(m_range);
  return linear_ticks(m_range, about);
}

} // namespace lightledger::report
