#include "curve_table.hpp"

#include "csv.hpp"
#include "plain_text.hpp"
#include "scalar.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <utility>

namespace lightledger::assembly {

namespace {

constexpr std::array<std::string_view, column_count> names{
    "wavelength_nm", "angle_deg", "Rs",           "Rp",           "Ts",           "Tp",
    "Rs_back",       "Rp_back",   "phase_rs_deg", "phase_rp_deg", "phase_ts_deg", "phase_tp_deg"};
constexpr std::string_view columns_text =
    "wavelength_nm, angle_deg, Rs, Rp, Ts, Tp, and if known Rs_back, Rp_back, phase_rs_deg, phase_rp_deg, "
    "phase_ts_deg, phase_tp_deg; powers in per cent as 'Rs %'; commas between";
constexpr std::string_view per_cent = " %";
/// Decimal fractions that add up to 1 on paper may miss it by rounding.
constexpr double rounding = 1e-9;

std::string_view trimmed(std::string_view text) {
  const std::size_t first = text.find_first_not_of(" \t");
  if (first == std::string_view::npos)
    return {};
  return text.substr(first, text.find_last_not_of(" \t") - first + 1);
}

bool is_power(Column column) {
  return column >= rs && column <= rp_back;
}

/// One column of the file: what it holds, and what its numbers are divided by.
struct Heading {
  Column column;
  double divisor;
};

std::optional<Heading> heading(std::string_view written) {
  const std::string_view name = trimmed(written);
  const bool in_per_cent = name.ends_with(per_cent);
  const std::string_view bare = in_per_cent ? trimmed(name.substr(0, name.size() - per_cent.size())) : name;
  const auto* const found = std::find(names.begin(), names.end(), bare);
  if (found == names.end())
    return std::nullopt;
  const auto column = static_cast<Column>(found - names.begin());
  if (in_per_cent && !is_power(column))
    return std::nullopt;
  return Heading{column, in_per_cent ? 100.0 : 1.0};
}

/// The columns that are read from each row, once their names are known to be good.
class Headings {
public:
  Headings(const std::vector<std::string>& line, CurveFaults& faults) : m_faults(faults) {
    for (const std::string& name : line)
      add(name);
    if (m_headings.size() != line.size())
      return; // what is missing may stand there in other words
    for (const Column column : {wavelength, angle, rs, rp, ts, tp})
      if (!has(column))
        m_faults.add(fmt::format(" has no column '{}'", column_name(column)), std::string(columns_text));
    all_or_none({rs_back, rp_back});
    all_or_none({phase_rs, phase_rp, phase_ts, phase_tp});
  }

  [[nodiscard]] bool has(Column column) const { return m_present[column]; }
  [[nodiscard]] const std::vector<Heading>& all() const { return m_headings; }

private:
  void add(const std::string& name) {
    const auto known = heading(name);
    if (!known) {
      const std::vector<std::string_view> among(names.begin(), names.end());
      return m_faults.add(fmt::format(": {} is not a column of measured curves", quoted(trimmed(name))),
                          std::string(columns_text), m_faults.suggest(trimmed(name), among));
    }
    if (std::exchange(m_present[known->column], true))
      m_faults.add(fmt::format(" has two columns '{}'", column_name(known->column)));
    m_headings.push_back(*known);
  }

  void all_or_none(std::initializer_list<Column> group) {
    const auto present = [this](Column column) { return has(column); };
    if (std::none_of(group.begin(), group.end(), present))
      return;
    const auto* const missing = std::find_if_not(group.begin(), group.end(), present);
    if (missing != group.end())
      m_faults.add(fmt::format(" has no column '{}', though others of its kind", column_name(*missing)),
                   group.size() == 2 ? "both back columns, or none" : "all four phases, or none");
  }

  CurveFaults& m_faults;
  std::vector<Heading> m_headings;
  std::array<bool, column_count> m_present{};
};

/// Why a number makes no sense in its column; empty where it does.
std::string_view objection(Heading heading, double value) {
  if (!std::isfinite(value))
    return "not a finite number";
  if (heading.column == wavelength && value <= 0.0)
    return "not above 0";
  if (heading.column == angle && (value < 0.0 || value > 90.0))
    return "not between 0 and 90 degrees";
  if (is_power(heading.column) && (value < 0.0 || value > heading.divisor))
    return heading.divisor == 1.0 ? "not between 0 and 1" : "not between 0 and 100 %";
  return {};
}

void read_cell(CurveRow& row, Heading heading, std::string_view cell, CurveFaults& faults) {
  const std::string_view text = trimmed(cell);
  const bool is_number = !text.empty() && decimal_length(text) == text.size();
  const double value = is_number ? core_number(text).value_or(0.0) : 0.0;
  const std::string_view wrong = is_number ? objection(heading, value) : "not a number";
  if (!wrong.empty())
    return faults.add(fmt::format(", row {}, column '{}': {} is {}", row.number, column_name(heading.column),
                                  quoted(text), wrong));
  row.values[heading.column] = value / heading.divisor;
}

void check_sum(const CurveRow& row, Column reflect, Column transmit, CurveFaults& faults) {
  const double sum = row[reflect] + row[transmit];
  if (sum > 1.0 + rounding)
    faults.add(fmt::format(", row {}, columns '{}' and '{}': they add up to {:.6g}, more than 1", row.number,
                           column_name(reflect), column_name(transmit), sum));
}

void read_row(const std::vector<std::string>& cells, const Headings& headings, CurveRow& row,
              CurveFaults& faults) {
  const auto& columns = headings.all();
  if (cells.size() != columns.size())
    return faults.add(fmt::format(", row {}: {} cells, where there are {} columns", row.number, cells.size(),
                                  columns.size()));
  const std::size_t before = faults.count();
  for (std::size_t i = 0; i < columns.size(); ++i)
    read_cell(row, columns[i], cells[i], faults);
  if (faults.count() != before)
    return;
  check_sum(row, rs, ts, faults);
  check_sum(row, rp, tp, faults);
  check_sum(row, rs_back, ts, faults);
  check_sum(row, rp_back, tp, faults);
}

} // namespace

std::string_view column_name(Column column) {
  return names[column];
}

void CurveFaults::add(std::string_view message, std::string accepted, std::string suggestion) {
  m_reader.fault(m_mark, fmt::format("{}{}", quoted(m_file), message), std::move(accepted),
                 std::move(suggestion));
}

CurveTable read_curve_table(std::string_view text, CurveFaults& faults) {
  CurveTable table;
  CsvRows rows(text);
  const auto* const first = rows.next();
  if (first == nullptr && !rows.broken()) {
    faults.add(" is empty", std::string(columns_text));
    return table;
  }
  const Headings headings(first == nullptr ? std::vector<std::string>{} : *first, faults);
  table.has_back = headings.has(rs_back);
  table.has_phases = headings.has(phase_rs);
  if (!faults.none())
    return table;
  for (const auto* cells = rows.next(); cells != nullptr; cells = rows.next()) {
    CurveRow& row = table.rows.emplace_back();
    row.number = rows.row();
    read_row(*cells, headings, row, faults);
    if (faults.count() >= Faults::kept_at_most)
      return table;
  }
  if (rows.broken())
    faults.add(fmt::format(", row {}: a quote is not closed, or text follows it", rows.row()));
  else if (table.rows.empty())
    faults.add(" has names of columns but no rows");
  return table;
}

} // namespace lightledger::assembly
