#include "csv.hpp"
#include "losses.hpp"

#include <lightledger/report/budget.hpp>

namespace lightledger::report {
namespace {

using analysis::Budget;
using analysis::StationBudget;

/// The light that a row is about; all of it where nothing is said.
struct Part {
  std::optional<double> wavelength_nm;
  std::string field; ///< by name, or by number where it has none
  std::optional<std::array<double, 2>> at;
};

void add_headings(Csv& csv) {
  for (const char* heading : {"station", "name", "does", "incident", "onward"})
    csv.cell(heading);
  for (const Loss& loss : losses)
    csv.cell(loss.name);
  for (const char* heading : {"transmittance", "pass_s", "pass_p", "incidence_min_deg", "incidence_mean_deg",
                              "incidence_max_deg", "wavelength_nm", "field", "field_x", "field_y"})
    csv.cell(heading);
  csv.end_row();
}

void end_row_of(Csv& csv, const Part& part) {
  csv.cell(part.wavelength_nm).cell(part.field);
  csv.cell(part.at ? std::optional((*part.at)[0]) : std::nullopt);
  csv.cell(part.at ? std::optional((*part.at)[1]) : std::nullopt);
  csv.end_row();
}

void add_station(Csv& csv, const StationBudget& station, std::size_t number, const Part& part) {
  csv.cell(std::to_string(number)).cell(station.name).cell(station.does);
  csv.cell(station.incident).cell(station.onward);
  for (const Loss& loss : losses)
    csv.cell(station.*loss.power);
  csv.cell(station.transmittance).cell(station.pass_s).cell(station.pass_p);
  const auto& angles = station.incidence;
  csv.cell(angles ? std::optional(angles->min_deg) : std::nullopt);
  csv.cell(angles ? std::optional(angles->mean_deg) : std::nullopt);
  csv.cell(angles ? std::optional(angles->max_deg) : std::nullopt);
  end_row_of(csv, part);
}

void add_stations(Csv& csv, const std::vector<StationBudget>& stations, const Part& part) {
  for (std::size_t k = 0; k < stations.size(); ++k)
    add_station(csv, stations[k], k + 1, part);
}

/// The detector's row of which nothing but what goes onward there, the delivered power, is known.
void add_delivered(Csv& csv, const Budget& budget, double delivered, const Part& part) {
  constexpr int unknown = 13;
  const StationBudget& detector = budget.stations.back();
  csv.cell(std::to_string(budget.stations.size())).cell(detector.name).cell(detector.does);
  csv.cell("").cell(delivered);
  for (int i = 0; i < unknown; ++i)
    csv.cell("");
  end_row_of(csv, part);
}

void add_wavelength(Csv& csv, const Budget& budget, std::size_t i) {
  const Part part{budget.by_wavelength[i].wavelength_nm, {}, {}};
  if (!budget.ledgers.empty() && budget.ledgers.front().wavelength_nm)
    add_stations(csv, budget.ledgers[i].stations, part);
  else
    add_delivered(csv, budget, budget.by_wavelength[i].delivered, part);
}

void add_field(Csv& csv, const Budget& budget, std::size_t i) {
  const analysis::FieldBudget& field = budget.by_field[i];
  const Part part{{}, field.name.value_or(std::to_string(i + 1)), field.at};
  if (!budget.ledgers.empty() && !budget.ledgers.front().wavelength_nm)
    add_stations(csv, budget.ledgers[i].stations, part);
  else
    add_delivered(csv, budget, field.delivered, part);
}

} // namespace

std::string budget_csv(const Budget& budget) {
  Csv csv;
  add_headings(csv);
  add_stations(csv, budget.stations, {});
  for (std::size_t i = 0; i < budget.by_wavelength.size(); ++i)
    add_wavelength(csv, budget, i);
  for (std::size_t i = 0; i < budget.by_field.size(); ++i)
    add_field(csv, budget, i);
  return csv.text();
}

} // namespace lightledger::report
