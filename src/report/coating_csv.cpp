#include "coating_columns.hpp"
#include "csv.hpp"

#include <lightledger/report/coating.hpp>

namespace lightledger::report {

std::string coating_csv(const analysis::CoatingCurve& curve) {
  Csv csv;
  csv.cell("wavelength_nm").cell("angle_deg");
  for (const CoatingColumn& column : coating_powers)
    csv.cell(column.name);
  for (const CoatingColumn& column : coating_phases)
    csv.cell(column.name);
  csv.end_row();
  for (const analysis::CoatingRow& row : curve.rows) {
    csv.cell(row.wavelength_nm).cell(row.angle_deg);
    for (const CoatingColumn& column : coating_powers)
      csv.cell(column.value(row));
    for (const CoatingColumn& column : coating_phases)
      csv.cell(column.value(row));
    csv.end_row();
  }
  return csv.text();
}

} // namespace lightledger::report
