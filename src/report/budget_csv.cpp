#include "csv.hpp"
#include "losses.hpp"

#include <lightledger/report/budget.hpp>

namespace lightledger::report {
namespace {

using analysis::SplitBudget;
using analysis::StationBudget;

void add_headings(Csv& csv, const std::vector<SplitBudget>& ledgers) {
  if (!ledgers.empty())
    csv.cell(ledgers.front().wavelength_nm ? "wavelength_nm" : "field");
  for (const char* heading : {"station", "name", "does", "incident", "onward"})
    csv.cell(heading);
  for (const Loss& loss : losses)
    csv.cell(loss.name);
  for (const char* heading :
       {"transmittance", "pass_s", "pass_p", "incidence_min_deg", "incidence_mean_deg", "incidence_max_deg"})
    csv.cell(heading);
  csv.end_row();
}

void add_station(Csv& csv, const StationBudget& station, std::size_t number) {
  csv.cell(std::to_string(number)).cell(station.name).cell(station.does);
  csv.cell(station.incident).cell(station.onward);
  for (const Loss& loss : losses)
    csv.cell(station.*loss.power);
  csv.cell(station.transmittance).cell(station.pass_s).cell(station.pass_p);
  const auto& angles = station.incidence;
  csv.cell(angles ? std::optional(angles->min_deg) : std::nullopt);
  csv.cell(angles ? std::optional(angles->mean_deg) : std::nullopt);
  csv.cell(angles ? std::optional(angles->max_deg) : std::nullopt);
  csv.end_row();
}

void add_split_cell(Csv& csv, const SplitBudget& ledger, std::size_t number) {
  if (ledger.wavelength_nm)
    csv.cell(ledger.wavelength_nm);
  else
    csv.cell(ledger.field_name.value_or(std::to_string(number)));
}

} // namespace

std::string budget_csv(const analysis::Budget& budget) {
  Csv csv;
  add_headings(csv, budget.ledgers);
  for (std::size_t k = 0; k < budget.stations.size(); ++k) {
    if (!budget.ledgers.empty())
      csv.cell("");
    add_station(csv, budget.stations[k], k + 1);
  }
  for (std::size_t i = 0; i < budget.ledgers.size(); ++i)
    for (std::size_t k = 0; k < budget.ledgers[i].stations.size(); ++k) {
      add_split_cell(csv, budget.ledgers[i], i + 1);
      add_station(csv, budget.ledgers[i].stations[k], k + 1);
    }
  return csv.text();
}

} // namespace lightledger::report
