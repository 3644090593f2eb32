#include "coating_columns.hpp"
#include "display_width.hpp"
#include "figures.hpp"
#include "prose.hpp"
#include "table.hpp"

#include <lightledger/report/coating.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <string_view>

namespace lightledger::report {
namespace {

using analysis::CoatingCurve;
using analysis::CoatingRow;

constexpr int power_width = 7;
/// Columns of a line with phases: two of 13 and 9, six of 7, four of 8, each two blanks from the next.
constexpr int width_with_phases = 120;

/// `phase_rs_deg` is headed `rs deg`.
std::string phase_heading(std::string_view name) {
  return fmt::format("{} deg", name.substr(std::string_view("phase_").size(), 2));
}

std::string rows_table(const CoatingCurve& curve, const TextStyle& style) {
  const bool with_phases = style.width >= width_with_phases;
  std::vector<Column> columns{{"wavelength nm"}, {"angle deg"}};
  for (const CoatingColumn& column : coating_powers)
    columns.push_back({column.name, Align::right, power_width});
  if (with_phases)
    for (const CoatingColumn& column : coating_phases)
      columns.push_back({phase_heading(column.name), Align::right, power_width});

  Table table(columns);
  for (const CoatingRow& row : curve.rows) {
    std::vector<Cell> cells{plain(row.wavelength_nm), plain(row.angle_deg)};
    for (const CoatingColumn& column : coating_powers)
      cells.emplace_back(style.decibels ? decibels(*column.value(row)) : fraction(*column.value(row)));
    if (with_phases)
      for (const CoatingColumn& column : coating_phases)
        cells.emplace_back(column.value(row) ? fmt::format("{:.2f}", *column.value(row)) : "-");
    table.add(std::move(cells));
  }
  return table.text(style.emphasis);
}

double unpolarized_reflectance(const CoatingRow& row) {
  return 0.5 * (row.s.reflectance + row.p.reflectance);
}

std::string place(const CoatingRow& row) {
  return fmt::format("{} at {} nm, {} deg", per_cent(unpolarized_reflectance(row)), plain(row.wavelength_nm),
                     plain(row.angle_deg));
}

/// Between which reflectances of unpolarized light the rows lie.
std::string reflectance_sentence(const CoatingCurve& curve) {
  const auto [least, most] = std::ranges::minmax_element(curve.rows, {}, unpolarized_reflectance);
  if (least == most)
    return fmt::format("Reflects {}.", place(*least));
  return fmt::format("Reflects from {} to {}.", place(*least), place(*most));
}

} // namespace

std::string coating_text(const CoatingCurve& curve, const std::vector<std::string>& warnings,
                         const TextStyle& style) {
  const std::string heading = fmt::format("{}    from {} to {}", on_one_line(curve.name),
                                          on_one_line(curve.incident), on_one_line(curve.substrate));
  return fmt::format("{}\n\n{}\n{}{}", heading, rows_table(curve, style),
                     wrapped(reflectance_sentence(curve), style.width),
                     describe_warnings(warnings, style.width));
}

} // namespace lightledger::report
