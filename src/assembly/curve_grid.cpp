#include "curve_grid.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <numbers>
#include <tuple>

namespace lightledger::assembly {

namespace {

using std::numbers::pi;

constexpr double radians = pi / 180.0;
constexpr double turn_deg = 360.0;
constexpr double phase_tolerance_deg = 1.0;
constexpr Measured::Phases ideal_phases{pi, 0.0, 0.0, 0.0};

std::vector<double> distinct(const std::vector<CurveRow>& rows, Column column) {
  std::vector<double> values;
  values.reserve(rows.size());
  for (const CurveRow& row : rows)
    values.push_back(row[column]);
  std::sort(values.begin(), values.end());
  values.erase(std::unique(values.begin(), values.end()), values.end());
  return values;
}

bool same_point(const CurveRow& a, const CurveRow& b) {
  return a[wavelength] == b[wavelength] && a[angle] == b[angle];
}

void check_once(const std::vector<CurveRow>& sorted, CurveFaults& faults) {
  for (std::size_t i = 1; i < sorted.size() && faults.count() < Faults::kept_at_most; ++i)
    if (same_point(sorted[i - 1], sorted[i]))
      faults.add(fmt::format(", row {}: {} nm at {} degrees stands in row {} already", sorted[i].number,
                             sorted[i][wavelength], sorted[i][angle], sorted[i - 1].number));
}

/// Sorted rows of distinct points fill the grid unless one of them is not where it would then be.
void check_complete(const std::vector<CurveRow>& sorted, const Measured& grid, CurveFaults& faults) {
  const std::size_t across = grid.angles_deg.size();
  const auto missing = [&](std::size_t i) {
    faults.add(fmt::format(" has no row for {} nm at {} degrees", grid.wavelengths_nm[i / across],
                           grid.angles_deg[i % across]),
               "the same angles at every wavelength, one row each");
  };
  for (std::size_t i = 0; i < sorted.size(); ++i)
    if (sorted[i][wavelength] != grid.wavelengths_nm[i / across] ||
        sorted[i][angle] != grid.angles_deg[i % across])
      return missing(i);
  if (sorted.size() % across != 0)
    missing(sorted.size());
}

/// At normal incidence s and p differ by their sign alone (contract §2), which tells conventions apart.
void check_normal_incidence(const CurveRow& row, CurveFaults& faults) {
  const double beyond_half_turn = row[phase_rp] - row[phase_rs] - turn_deg / 2.0;
  if (row[angle] != 0.0 || std::abs(std::remainder(beyond_half_turn, turn_deg)) <= phase_tolerance_deg)
    return;
  faults.add(fmt::format(", row {}: at 0 degrees 'phase_rp_deg' − 'phase_rs_deg' is {:.6g}, not 180",
                         row.number, row[phase_rp] - row[phase_rs]),
             "the convention r_p = −r_s at normal incidence (180 degrees apart); in a file of the convention "
             "r_p = r_s (0 degrees apart), 180 is to be added to phase_rp_deg");
}

Measured::Point point(const CurveRow& row, const CurveTable& table, double sign) {
  const auto transmit = [&row](Column t, Column r) { return std::min(row[t], 1.0 - row[r]); };
  Measured::Point point{};
  point.reflect = {row[rs], row[rp]};
  point.transmit = {transmit(ts, rs), transmit(tp, rp)};
  point.reflect_back = table.has_back ? Measured::Powers{row[rs_back], row[rp_back]} : point.reflect;
  point.phases = ideal_phases;
  if (table.has_phases)
    point.phases = {sign * row[phase_rs], sign * row[phase_rp], sign * row[phase_ts], sign * row[phase_tp]};
  return point;
}

double near(double phase, double neighbour) {
  return phase - 2.0 * pi * std::round((phase - neighbour) / (2.0 * pi));
}

void unwrap(Measured& grid) {
  const std::size_t across = grid.angles_deg.size();
  for (std::size_t i = 1; i < grid.points.size(); ++i) {
    const Measured::Phases& from = grid.points[i % across == 0 ? i - across : i - 1].phases;
    Measured::Phases& to = grid.points[i].phases;
    to = {near(to.rs, from.rs), near(to.rp, from.rp), near(to.ts, from.ts), near(to.tp, from.tp)};
  }
}

} // namespace

Measured curve_grid(CurveTable table, bool advance, CurveFaults& faults) {
  Measured grid;
  auto& rows = table.rows;
  std::sort(rows.begin(), rows.end(), [](const CurveRow& a, const CurveRow& b) {
    return std::tuple(a[wavelength], a[angle], a.number) < std::tuple(b[wavelength], b[angle], b.number);
  });
  grid.wavelengths_nm = distinct(rows, wavelength);
  grid.angles_deg = distinct(rows, angle);
  grid.has_phases = table.has_phases;
  check_once(rows, faults);
  if (faults.none())
    check_complete(rows, grid, faults);
  for (const CurveRow& row : rows) {
    if (table.has_phases && faults.count() < Faults::kept_at_most)
      check_normal_incidence(row, faults);
    grid.points.push_back(point(row, table, advance ? -radians : radians));
  }
  unwrap(grid);
  return grid;
}

} // namespace lightledger::assembly
