#include "colour.hpp"

#include <algorithm>
#include <cmath>
#include <vector>

namespace lightledger::report {
namespace {

double to_linear(std::uint8_t channel) {
  const double value = channel / 255.0;
  return value <= 0.04045 ? value / 12.92 : std::pow((value + 0.055) / 1.055, 2.4);
}

/// IEC 61966-2-1.
std::uint8_t from_linear(double value) {
  const double inside = std::clamp(value, 0.0, 1.0);
  const double coded = inside <= 0.0031308 ? 12.92 * inside : 1.055 * std::pow(inside, 1.0 / 2.4) - 0.055;
  return static_cast<std::uint8_t>(std::lround(255.0 * coded));
}

double cubed(double value) {
  return value * value * value;
}

double distance(const Oklab& one, const Oklab& other) {
  return std::hypot(one.lightness - other.lightness, one.a - other.a, one.b - other.b);
}

Oklab combined(double weight_one, const Oklab& one, double weight_other, const Oklab& other) {
  return {weight_one * one.lightness + weight_other * other.lightness,
          weight_one * one.a + weight_other * other.a, weight_one * one.b + weight_other * other.b};
}

/// The curve through the anchors at t from 0 to 1; its ends run straight on.
Oklab on_curve(std::span<const Oklab> anchors, double t) {
  const auto last = static_cast<int>(anchors.size()) - 1;
  const int segment = std::min(static_cast<int>(t * last), last - 1);
  const auto anchor = [&](int i) {
    if (i < 0)
      return combined(2.0, anchors[0], -1.0, anchors[1]);
    if (i > last)
      return combined(2.0, anchors[static_cast<std::size_t>(last)], -1.0,
                      anchors[static_cast<std::size_t>(last - 1)]);
    return anchors[static_cast<std::size_t>(i)];
  };
  const double u = t * last - segment;
  const double before = 0.5 * u * (u * (2.0 - u) - 1.0);
  const double first = 0.5 * (u * u * (3.0 * u - 5.0) + 2.0);
  const double second = 0.5 * u * (u * (4.0 - 3.0 * u) + 1.0);
  const double after = 0.5 * u * u * (u - 1.0);
  return combined(1.0, combined(before, anchor(segment - 1), first, anchor(segment)), 1.0,
                  combined(second, anchor(segment + 1), after, anchor(segment + 2)));
}

constexpr std::array<Oklab, 6> sequential{{{0.190, -0.005, -0.070},
                                           {0.360, 0.015, -0.125},
                                           {0.530, 0.065, -0.065},
                                           {0.700, 0.070, 0.045},
                                           {0.850, 0.015, 0.100},
                                           {0.975, -0.008, 0.045}}};

constexpr std::array<Oklab, 7> diverging{{{0.340, -0.020, -0.105},
                                          {0.560, -0.035, -0.125},
                                          {0.780, -0.025, -0.070},
                                          {0.965, 0.000, 0.000},
                                          {0.780, 0.055, 0.070},
                                          {0.560, 0.090, 0.105},
                                          {0.340, 0.075, 0.068}}};

constexpr std::array<Oklab, 9> cyclic{{{0.340, 0.000, 0.000},
                                       {0.440, -0.020, -0.085},
                                       {0.640, -0.030, -0.110},
                                       {0.830, -0.020, -0.055},
                                       {0.920, 0.000, 0.015},
                                       {0.810, 0.040, 0.075},
                                       {0.620, 0.065, 0.100},
                                       {0.440, 0.045, 0.060},
                                       {0.340, 0.000, 0.000}}};

} // namespace

Colour to_srgb(const Oklab& colour) {
  const auto [lightness, a, b] = colour;
  const double l = cubed(lightness + 0.3963377774 * a + 0.2158037573 * b);
  const double m = cubed(lightness - 0.1055613458 * a - 0.0638541728 * b);
  const double s = cubed(lightness - 0.0894841775 * a - 1.2914855480 * b);
  return {from_linear(4.0767416621 * l - 3.3077115913 * m + 0.2309699292 * s),
          from_linear(-1.2684380046 * l + 2.6097574011 * m - 0.3413193965 * s),
          from_linear(-0.0041960863 * l - 0.7034186147 * m + 1.7076147010 * s)};
}

Oklab to_oklab(const Colour& colour) {
  const double red = to_linear(colour.red);
  const double green = to_linear(colour.green);
  const double blue = to_linear(colour.blue);
  const double l = std::cbrt(0.4122214708 * red + 0.5363325363 * green + 0.0514459929 * blue);
  const double m = std::cbrt(0.2119034982 * red + 0.6806995451 * green + 0.1073969566 * blue);
  const double s = std::cbrt(0.0883024619 * red + 0.2817188376 * green + 0.6299787005 * blue);
  return {0.2104542553 * l + 0.7936177850 * m - 0.0040720468 * s,
          1.9779984951 * l - 2.4285922050 * m + 0.4505937099 * s,
          0.0259040371 * l + 0.7827717662 * m - 0.8086757660 * s};
}

ColourMap::ColourMap(std::span<const Oklab> anchors) {
  constexpr std::size_t samples = 4 * steps;
  std::vector<Oklab> curve;
  std::vector<double> length{0.0};
  for (std::size_t i = 0; i <= samples; ++i) {
    curve.push_back(on_curve(anchors, static_cast<double>(i) / samples));
    if (i > 0)
      length.push_back(length.back() + distance(curve[i - 1], curve[i]));
  }
  std::size_t next = 1;
  for (std::size_t i = 0; i < steps; ++i) {
    const double wanted = length.back() * static_cast<double>(i) / (steps - 1);
    while (next < samples && length[next] < wanted)
      ++next;
    const double share = (wanted - length[next - 1]) / (length[next] - length[next - 1]);
    m_colours[i] = to_srgb(combined(1.0 - share, curve[next - 1], share, curve[next]));
  }
}

Colour ColourMap::at(double place) const {
  return m_colours[static_cast<std::size_t>(std::lround(std::clamp(place, 0.0, 1.0) * (steps - 1)))];
}

const ColourMap& sequential_map() {
  static const ColourMap map(sequential);
  return map;
}

const ColourMap& diverging_map() {
  static const ColourMap map(diverging);
  return map;
}

const ColourMap& cyclic_map() {
  static const ColourMap map(cyclic);
  return map;
}

} // namespace lightledger::report
