#include "reference/boundary.hpp"

#include <Eigen/Core>
#include <algorithm>
#include <cmath>
#include <numbers>

namespace lightledger::reference {
namespace {

using assembly::Measured;

/// All columns of the file at one place, in this order: powers reflected, transmitted and reflected from
/// behind, s and p of each, then the phases of r_s, r_p, t_s, t_p.
using Row = Eigen::Array<double, 10, 1>;
constexpr int first_phase = 6;

Row row_of(const Measured::Point& point) {
  Row row;
  row << point.reflect.s, point.reflect.p, point.transmit.s, point.transmit.p, point.reflect_back.s,
      point.reflect_back.p, point.phases.rs, point.phases.rp, point.phases.ts, point.phases.tp;
  return row;
}

/// The row with its phases in the turn that is nearest to a neighbour's.
Row beside(const Row& neighbour, Row row) {
  constexpr double turn = 2.0 * std::numbers::pi;
  for (int i = first_phase; i < row.size(); ++i)
    row[i] -= turn * std::round((row[i] - neighbour[i]) / turn);
  return row;
}

/// The two points of a grid around a place, and how far from the lower to the upper it lies.
struct Bracket {
  std::size_t low, high;
  double share;
};

Bracket bracket(const std::vector<double>& grid, double place) {
  const auto above = std::find_if(grid.begin(), grid.end(), [&](double at) { return at > place; });
  const auto high = static_cast<std::size_t>(above - grid.begin());
  if (high == 0)
    return {0, 0, 0.0};
  if (high == grid.size())
    return {high - 1, high - 1, 0.0};
  return {high - 1, high, (place - grid[high - 1]) / (grid[high] - grid[high - 1])};
}

Row read(const Measured& coating, double wavelength_nm, double angle_deg) {
  const Bracket w = bracket(coating.wavelengths_nm, wavelength_nm);
  const Bracket a = bracket(coating.angles_deg, angle_deg);
  const auto written = [&](std::size_t wavelength, std::size_t angle) {
    return row_of(coating.points.at(wavelength * coating.angles_deg.size() + angle));
  };
  const Row corner = written(w.low, a.low);
  const Row redder = beside(corner, written(w.high, a.low));
  const Row steeper = beside(corner, written(w.low, a.high));
  const Row both = beside(corner, written(w.high, a.high));
  return (1.0 - a.share) * ((1.0 - w.share) * corner + w.share * redder) +
         a.share * ((1.0 - w.share) * steeper + w.share * both);
}

/// The row for the light: by its angle, or by the wavelength to which its angle shifts the curve.
Row row_at(const Measured& coating, const MeasuredAt& at) {
  if (!coating.shift_index) {
    const double sine = at.sine_in_air / at.index;
    return read(coating, at.wavelength_nm, sine < 1.0 ? std::asin(sine) * 180.0 / std::numbers::pi : 90.0);
  }
  const double sine_in_films = at.sine_in_air / *coating.shift_index;
  const double shifted = sine_in_films < 1.0
                             ? at.wavelength_nm / std::sqrt(1.0 - sine_in_films * sine_in_films)
                             : coating.wavelengths_nm.back();
  return read(coating, shifted, coating.angles_deg.front());
}

Channel channel(double reflect, double transmit, double phase_r, double phase_t, bool total_reflection) {
  const double absorbed = std::max(0.0, 1.0 - reflect - transmit);
  const double reflected = total_reflection ? 1.0 - absorbed : reflect;
  const double transmitted = total_reflection ? 0.0 : transmit;
  return {std::polar(std::sqrt(reflected), phase_r), std::polar(std::sqrt(transmitted), phase_t), reflected,
          transmitted, absorbed};
}

} // namespace

Boundary measured(const Measured& coating, const MeasuredAt& at) {
  const Row row = row_at(coating, at);
  const auto polarized = [&](int s_or_p) {
    const double front_phase = row[first_phase + s_or_p];
    const double phase_t = row[first_phase + 2 + s_or_p];
    const double back_phase =
        coating.has_phases ? std::numbers::pi + 2.0 * phase_t - front_phase : front_phase;
    return channel(row[at.from_behind ? 4 + s_or_p : s_or_p], row[2 + s_or_p],
                   at.from_behind ? back_phase : front_phase, phase_t, at.total_reflection);
  };
  return {polarized(0), polarized(1)};
}

} // namespace lightledger::reference
