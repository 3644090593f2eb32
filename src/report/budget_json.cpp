#include "json.hpp"
#include "losses.hpp"

#include <lightledger/report/budget.hpp>

namespace lightledger::report {
namespace {

using analysis::StationBudget;

Json incidence_json(const std::optional<StationBudget::Incidence>& incidence) {
  if (!incidence)
    return nullptr;
  return {{"min", number(incidence->min_deg)},
          {"mean", number(incidence->mean_deg)},
          {"max", number(incidence->max_deg)}};
}

Json station_json(const StationBudget& station) {
  Json json{{"name", station.name},
            {"does", station.does},
            {"incident", number(station.incident)},
            {"onward", number(station.onward)}};
  for (const Loss& loss : losses)
    json[loss.name] = number(station.*loss.power);
  json["transmittance"] = number(station.transmittance);
  json["pass_s"] = number(station.pass_s);
  json["pass_p"] = number(station.pass_p);
  json["incidence_deg"] = incidence_json(station.incidence);
  return json;
}

Json stations_json(const std::vector<StationBudget>& stations) {
  Json json = Json::array();
  for (const StationBudget& station : stations)
    json.push_back(station_json(station));
  return json;
}

Json by_wavelength_json(const analysis::Budget& budget) {
  Json json = Json::array();
  for (const analysis::WavelengthBudget& row : budget.by_wavelength)
    json.push_back({{"wavelength_nm", number(row.wavelength_nm)}, {"delivered", number(row.delivered)}});
  return json;
}

Json by_field_json(const analysis::Budget& budget) {
  Json json = Json::array();
  for (const analysis::FieldBudget& row : budget.by_field) {
    const Json at = Json::array({number(row.at[0]), number(row.at[1])});
    json.push_back({{"name", text_or_null(row.name)}, {"at", at}, {"delivered", number(row.delivered)}});
  }
  return json;
}

Json ledgers_json(const analysis::Budget& budget) {
  Json json = Json::array();
  for (const analysis::SplitBudget& ledger : budget.ledgers) {
    Json entry;
    if (ledger.wavelength_nm)
      entry["wavelength_nm"] = number(ledger.wavelength_nm);
    else
      entry["name"] = text_or_null(ledger.field_name);
    entry["stations"] = stations_json(ledger.stations);
    json.push_back(std::move(entry));
  }
  return json;
}

} // namespace

std::string budget_json(const Envelope& envelope, const analysis::Budget& budget) {
  Json json{{"launched", 1},
            {"delivered", number(budget.delivered)},
            {"uncertainty", number(budget.uncertainty)},
            {"rays", budget.rays},
            {"closure_error", number(budget.closure_error)},
            {"stations", stations_json(budget.stations)},
            {"by_wavelength", by_wavelength_json(budget)},
            {"by_field", by_field_json(budget)}};
  if (!budget.ledgers.empty())
    json["ledgers"] = ledgers_json(budget);
  return json_document(envelope, "budget", std::move(json));
}

} // namespace lightledger::report
