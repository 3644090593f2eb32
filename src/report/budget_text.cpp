#include "display_width.hpp"
#include "figures.hpp"
#include "losses.hpp"
#include "prose.hpp"
#include "table.hpp"

#include <lightledger/report/budget.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <numbers>

namespace lightledger::report {
namespace {

using analysis::Budget;
using analysis::StationBudget;
using Stations = std::vector<StationBudget>;

constexpr int number_width = 3;
constexpr int column_gap = 2;
/// Wide enough for `<0.0001` and, in dB, for `-99.999`.
constexpr int figure_width = 7;

std::string power(double value, const TextStyle& style) {
  return style.decibels ? decibels(value) : fraction(value);
}

Column figures(const char* heading) {
  return {heading, Align::right, figure_width};
}

int width_of(const Loss& loss) {
  return column_gap + std::max(display_width(loss.name), figure_width);
}

int name_width(const Stations& stations, const TextStyle& style) {
  int widest = display_width("station");
  for (const StationBudget& station : stations)
    widest = std::max(widest, display_width(on_one_line(station.name)));
  return std::min(widest, style.width / 4);
}

/// Indices of the losses that get a column of their own: those that occur, the greatest first as long as they
/// fit beside `other`; in the order of `losses`.
std::vector<std::size_t> shown_losses(const Stations& stations, const TextStyle& style) {
  std::vector<std::size_t> candidates;
  for (std::size_t i = 0; i < losses.size(); ++i)
    if (total(stations, losses[i]) != 0.0)
      candidates.push_back(i);
  std::ranges::stable_sort(candidates, std::ranges::greater{},
                           [&](std::size_t i) { return total(stations, losses[i]); });

  const int plain_column = column_gap + figure_width;
  int room = style.width - number_width - column_gap - name_width(stations, style) - 3 * plain_column;
  std::vector<std::size_t> shown;
  for (const std::size_t i : candidates) {
    if (width_of(losses[i]) > room)
      continue;
    room -= width_of(losses[i]);
    shown.push_back(i);
  }
  std::ranges::sort(shown);
  return shown;
}

bool contains(const std::vector<std::size_t>& indices, std::size_t index) {
  return std::ranges::find(indices, index) != indices.end();
}

/// What a station loses in the ways that have no column of their own.
double other(const StationBudget& station, const std::vector<std::size_t>& shown) {
  double sum = 0.0;
  for (std::size_t i = 0; i < losses.size(); ++i)
    sum += contains(shown, i) ? 0.0 : station.*losses[i].power;
  return sum;
}

std::string stations_table(const Stations& stations, const TextStyle& style) {
  const std::vector<std::size_t> shown = shown_losses(stations, style);
  const bool folds = shown.size() < losses.size();
  const std::vector<LossEntry> largest = largest_losses(stations, 1);
  const int names = name_width(stations, style);

  std::vector<Column> columns{
      {"", Align::right, number_width}, {"station", Align::left}, figures("reaches"), figures("onward")};
  for (const std::size_t i : shown)
    columns.push_back(figures(losses[i].name));
  if (folds)
    columns.push_back(figures("other"));

  Table table(columns);
  for (std::size_t k = 0; k < stations.size(); ++k) {
    const StationBudget& station = stations[k];
    const bool has_largest = !largest.empty() && largest.front().station == k;
    std::vector<Cell> row{std::to_string(k + 1), shortened(on_one_line(station.name), names),
                          power(station.incident, style), power(station.onward, style)};
    for (const std::size_t i : shown)
      row.emplace_back(power(station.*losses[i].power, style), has_largest && largest.front().loss == i);
    if (folds)
      row.emplace_back(power(other(station, shown), style),
                       has_largest && !contains(shown, largest.front().loss));
    table.add(std::move(row));
  }
  return table.text(style.emphasis);
}

/// A figure to the first digit of its standard error, four decimals at least and twelve at most.
std::string figure_with_error(double value, std::optional<double> error, const char* unit) {
  constexpr int fewest = 4;
  constexpr int most = 12;
  if (!error)
    return fmt::format("{:.{}f}{}", value, fewest, unit);
  if (!(*error > 0.0))
    return fmt::format("{:.{}f}{} +- 0", value, fewest, unit);
  const int decimals = std::max(fewest, static_cast<int>(std::ceil(-std::log10(*error))));
  if (decimals > most)
    return fmt::format("{:.{}f}{} +- {}{}", value, fewest, unit, error_size(*error), unit);
  return fmt::format("{:.{}f}{} +- {:.{}f}{}", value, decimals, unit, *error, decimals, unit);
}

std::string delivered_figure(const Budget& budget, const TextStyle& style) {
  if (!style.decibels)
    return figure_with_error(budget.delivered, budget.uncertainty, "");
  if (!(budget.delivered > 0.0))
    return "-";
  const double per_fraction = 10.0 / std::numbers::ln10 / budget.delivered;
  const double level = 10.0 * std::log10(budget.delivered);
  const std::optional<double> error =
      budget.uncertainty ? std::optional(per_fraction * *budget.uncertainty) : std::nullopt;
  return figure_with_error(level, error, " dB");
}

std::string delivered_line(const Budget& budget, std::chrono::duration<double> elapsed,
                           const TextStyle& style) {
  return fmt::format("delivered  {}    closes to {}    {} rays, {}\n", delivered_figure(budget, style),
                     error_size(std::abs(budget.closure_error)), count(budget.rays),
                     duration(elapsed.count()));
}

std::string wavelengths_table(const Budget& budget, const TextStyle& style) {
  Table table({{"wavelength nm"}, {"delivered"}});
  for (const analysis::WavelengthBudget& row : budget.by_wavelength)
    table.add({plain(row.wavelength_nm), power(row.delivered, style)});
  return table.text(style.emphasis);
}

std::string fields_table(const assembly::Light& light, const Budget& budget, const TextStyle& style) {
  const std::string unit = light.object_distance ? " mm" : " deg";
  Table table({{"field", Align::left}, {"x" + unit}, {"y" + unit}, {"delivered"}});
  for (std::size_t i = 0; i < budget.by_field.size(); ++i) {
    const analysis::FieldBudget& row = budget.by_field[i];
    const std::string name = row.name ? on_one_line(*row.name) : std::to_string(i + 1);
    table.add(
        {shortened(name, style.width / 2), plain(row.at[0]), plain(row.at[1]), power(row.delivered, style)});
  }
  return table.text(style.emphasis);
}

std::string ledger_heading(const analysis::SplitBudget& ledger, std::size_t number) {
  if (ledger.wavelength_nm)
    return fmt::format("At {} nm, of what is launched there\n", plain(*ledger.wavelength_nm));
  const std::string name = ledger.field_name ? on_one_line(*ledger.field_name) : std::to_string(number);
  return fmt::format("Field {}, of what is launched from it\n", name);
}

/// The tables below the stations' one, each after an empty line.
std::string further_tables(const assembly::Light& light, const Budget& budget, const TextStyle& style) {
  std::vector<std::string> tables;
  if (budget.by_wavelength.size() > 1)
    tables.push_back(wavelengths_table(budget, style));
  if (budget.by_field.size() > 1)
    tables.push_back(fields_table(light, budget, style));
  for (std::size_t i = 0; i < budget.ledgers.size(); ++i)
    tables.push_back(ledger_heading(budget.ledgers[i], i + 1) +
                     stations_table(budget.ledgers[i].stations, style));
  return tables.empty() ? "" : fmt::format("\n{}", fmt::join(tables, "\n"));
}

std::string remedies_lines(const Stations& stations, const std::vector<analysis::Remedy>& remedies,
                           const TextStyle& style) {
  const std::string sentence = describe_remedies(stations, remedies, style.decibels);
  return sentence.empty() ? "" : wrapped(sentence, style.width);
}

} // namespace

std::string budget_text(const assembly::Assembly& assembly, const Budget& budget,
                        const std::vector<analysis::Remedy>& remedies,
                        const std::vector<std::string>& warnings, std::chrono::duration<double> elapsed,
                        const TextStyle& style) {
  const std::string tables = further_tables(assembly.light, budget, style);
  const char* const unit = style.decibels ? "Fractions in dB\n" : "";
  return fmt::format("{}{}\n{}{}\n{}{}{}{}{}", heading(assembly, style.width), unit,
                     stations_table(budget.stations, style), delivered_line(budget, elapsed, style),
                     wrapped(describe_losses(budget.stations, style.emphasis), style.width),
                     remedies_lines(budget.stations, remedies, style), tables,
                     tables.empty() || warnings.empty() ? "" : "\n",
                     describe_warnings(warnings, style.width));
}

} // namespace lightledger::report
