#include "csv.hpp"

#include <lightledger/report/media.hpp>

namespace lightledger::report {
namespace {

using Media = std::vector<analysis::MediumEntry>;

std::string list_csv(const Media& media) {
  Csv csv;
  csv.cell("name").cell("from_nm").cell("to_nm").cell("index_587").cell("source").end_row();
  for (const analysis::MediumEntry& medium : media) {
    csv.cell(medium.name).cell(medium.range.from_nm).cell(medium.range.to_nm);
    csv.cell(medium.index_587).cell(medium.source).end_row();
  }
  return csv.text();
}

std::string rows_csv(const Media& media) {
  Csv csv;
  csv.cell("name").cell("wavelength_nm").cell("n").cell("kappa").end_row();
  for (const analysis::MediumEntry& medium : media)
    for (const analysis::MediumRow& row : medium.rows) {
      csv.cell(medium.name).cell(row.wavelength_nm);
      csv.cell(row.index ? std::optional(row.index->n) : std::nullopt);
      csv.cell(row.index ? std::optional(row.index->kappa) : std::nullopt).end_row();
    }
  return csv.text();
}

} // namespace

std::string media_csv(const Media& media) {
  const bool with_rows = !media.empty() && !media.front().rows.empty();
  return with_rows ? rows_csv(media) : list_csv(media);
}

} // namespace lightledger::report
