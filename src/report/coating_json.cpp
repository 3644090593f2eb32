#include "coating_columns.hpp"
#include "json.hpp"

#include <lightledger/report/coating.hpp>

namespace lightledger::report {
namespace {

Json row_json(const analysis::CoatingRow& row) {
  Json json{{"wavelength_nm", number(row.wavelength_nm)}, {"angle_deg", number(row.angle_deg)}};
  for (const CoatingColumn& column : coating_powers)
    json[column.name] = number(column.value(row));
  for (const CoatingColumn& column : coating_phases)
    json[column.name] = number(column.value(row));
  return json;
}

} // namespace

std::string coating_json(const Envelope& envelope, const analysis::CoatingCurve& curve) {
  Json rows = Json::array();
  for (const analysis::CoatingRow& row : curve.rows)
    rows.push_back(row_json(row));
  Json json{{"name", curve.name},
            {"incident", curve.incident},
            {"substrate", curve.substrate},
            {"rows", std::move(rows)}};
  return json_document(envelope, "coating", std::move(json));
}

} // namespace lightledger::report
