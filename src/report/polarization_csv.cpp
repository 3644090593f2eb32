#include "csv.hpp"
#include "polarization_words.hpp"

#include <lightledger/report/polarization.hpp>

namespace lightledger::report {
namespace {

using analysis::Against;
using analysis::Polarization;

std::string table_csv(const analysis::PolarizationTable& table) {
  Csv csv;
  csv.cell(table.against == Against::wavelength ? "wavelength_nm" : "field");
  for (const char* heading :
       {"delivered", "dop", "azimuth_deg", "ellipticity_deg", "diattenuation", "retardance_deg"})
    csv.cell(heading);
  csv.end_row();
  for (const analysis::PolarizationRow& row : table.rows) {
    csv.cell(row.at).cell(row.delivered).cell(row.dop).cell(row.azimuth_deg).cell(row.ellipticity_deg);
    csv.cell(row.diattenuation).cell(row.retardance_deg);
    csv.end_row();
  }
  return csv.text();
}

void add_headings(Csv& csv) {
  for (const char* heading : {"station", "name", "s0", "s1", "s2", "s3", "dop", "azimuth_deg",
                              "ellipticity_deg", "diattenuation", "retardance_deg"})
    csv.cell(heading);
  for (const Blame& blame : blames)
    csv.cell(std::string("blame_") + blame.name);
  csv.end_row();
}

void add_state(Csv& csv, const analysis::ChiefStation* station) {
  constexpr int cells = 9;
  if (station == nullptr) {
    for (int i = 0; i < cells; ++i)
      csv.cell("");
    return;
  }
  for (const double parameter : station->stokes)
    csv.cell(parameter);
  csv.cell(station->dop).cell(station->azimuth_deg).cell(station->ellipticity_deg);
  csv.cell(station->diattenuation).cell(station->retardance_deg);
}

} // namespace

std::string polarization_csv(const Polarization& polarization) {
  if (polarization.table.against != Against::nothing)
    return table_csv(polarization.table);
  Csv csv;
  add_headings(csv);
  for (std::size_t i = 0; i < polarization.attribution.size(); ++i) {
    const analysis::Attribution& attribution = polarization.attribution[i];
    csv.cell(std::to_string(i + 1)).cell(attribution.name);
    add_state(csv, polarization.chief ? &polarization.chief->stations[i] : nullptr);
    for (const Blame& blame : blames)
      csv.cell(attribution.value.*blame.figure);
    csv.end_row();
  }
  return csv.text();
}

} // namespace lightledger::report
