#include "json.hpp"
#include "polarization_words.hpp"

#include <lightledger/report/polarization.hpp>

#include <utility>

namespace lightledger::report {
namespace {

using analysis::AttributionFigures;
using analysis::ChiefRay;
using analysis::ChiefStation;
using analysis::DetectorFigures;
using analysis::Polarization;
using assembly::Assembly;

template <class List>
Json numbers(const List& list) {
  Json json = Json::array();
  for (const double value : list)
    json.push_back(number(value));
  return json;
}

Json matrix(const optics::Mueller& mueller) {
  Json json = Json::array();
  for (const auto& row : mueller)
    json.push_back(numbers(row));
  return json;
}

Json complex(optics::Complex value) {
  return Json::array({number(value.real()), number(value.imag())});
}

Json jones_json(const optics::Jones& jones) {
  return Json::array({Json::array({complex(jones.xx), complex(jones.xy)}),
                      Json::array({complex(jones.yx), complex(jones.yy)})});
}

Json station_json(const ChiefStation& station) {
  return {{"name", station.name},
          {"stokes", numbers(station.stokes)},
          {"dop", number(station.dop)},
          {"azimuth_deg", number(station.azimuth_deg)},
          {"ellipticity_deg", number(station.ellipticity_deg)},
          {"diattenuation", number(station.diattenuation)},
          {"retardance_deg", number(station.retardance_deg)}};
}

Json chief_json(const std::optional<ChiefRay>& chief) {
  if (!chief)
    return nullptr;
  Json stations = Json::array();
  for (const ChiefStation& station : chief->stations)
    stations.push_back(station_json(station));
  return {{"wavelength_nm", number(chief->wavelength_nm)},
          {"field", text_or_null(chief->field)},
          {"at", numbers(chief->at)},
          {"jones", jones_json(chief->jones)},
          {"mueller", matrix(chief->mueller)},
          {"diattenuation", number(chief->diattenuation)},
          {"retardance_deg", number(chief->retardance_deg)},
          {"rotation_deg", number(chief->rotation_deg)},
          {"stations", std::move(stations)}};
}

/// Of values and of their standard errors alike.
Json figures_json(const DetectorFigures& figures) {
  return {{"stokes", numbers(figures.stokes)},
          {"dop", number(figures.dop)},
          {"azimuth_deg", number(figures.azimuth_deg)},
          {"ellipticity_deg", number(figures.ellipticity_deg)},
          {"mueller", matrix(figures.mueller)},
          {"depolarization_index", number(figures.depolarization_index)},
          {"depolarization", number(figures.depolarization)},
          {"diattenuation", number(figures.diattenuation)},
          {"polarizance", number(figures.polarizance)},
          {"retardance_deg", number(figures.retardance_deg)},
          {"rotation_deg", number(figures.rotation_deg)},
          {"linear_extinction", number(figures.linear_extinction)},
          {"extinction", number(figures.extinction)},
          {"cross_leakage", number(figures.cross_leakage)},
          {"coherent_share", number(figures.coherent_share)}};
}

Json detector_json(const Polarization& polarization) {
  Json json = figures_json(polarization.detector);
  json["x_axis"] = numbers(polarization.detector_axes[0]);
  json["y_axis"] = numbers(polarization.detector_axes[1]);
  json["uncertainty"] = number(polarization.uncertainty);
  json["standard_errors"] = polarization.uncertainty ? figures_json(polarization.error) : Json(nullptr);
  json["rays"] = polarization.rays;
  return json;
}

Json attribution_json(const Assembly& assembly, const std::vector<analysis::Attribution>& attributions,
                      bool with_stations) {
  Json json = Json::array();
  for (const analysis::Attribution& attribution : attributions) {
    Json row{{"name", attribution.name}};
    if (with_stations) {
      row["stations"] = Json::array();
      for (const std::size_t station : attribution.stations)
        row["stations"].push_back(assembly.stations[station].name);
    }
    for (const Blame& blame : blames)
      row[blame.name] = number(attribution.value.*blame.figure);
    json.push_back(std::move(row));
  }
  return json;
}

Json cancelling_json(const Assembly& assembly, const Polarization& polarization) {
  Json json = Json::array();
  for (const analysis::CancellingPair& pair : polarization.cancelling)
    json.push_back(
        {{"names", Json::array({assembly.stations[pair.first].name, assembly.stations[pair.second].name})},
         {"retardances_deg", Json::array({number(pair.first_deg), number(pair.second_deg)})},
         {"together_deg", number(pair.together_deg)}});
  return json;
}

Json fold_json(const Assembly& assembly, const std::optional<analysis::FoldTurn>& turn) {
  if (!turn)
    return nullptr;
  return {{"name", assembly.stations[turn->station].name},
          {"turn_deg", number(turn->turn_deg)},
          {"tilt_deg", numbers(turn->tilt_deg)},
          {"turn_after_deg", numbers(turn->turn_after_deg)},
          {"retardance_deg", number(turn->retardance_deg)},
          {"retardance_now_deg", number(turn->retardance_now_deg)}};
}

Json plates_json(const Assembly& assembly, const std::optional<analysis::PlateSettings>& settings) {
  if (!settings)
    return nullptr;
  Json plates = Json::array();
  for (const auto& plate : settings->plates)
    plates.push_back({{"name", assembly.stations[plate.station].name},
                      {"axis_deg", number(plate.axis_deg)},
                      {"axis_now_deg", number(plate.axis_now_deg)}});
  return {{"settings", std::move(plates)},
          {"cross_leakage", number(settings->cross_leakage)},
          {"cross_leakage_now", number(settings->cross_leakage_now)}};
}

Json table_json(const analysis::PolarizationTable& table) {
  Json rows = Json::array();
  for (const analysis::PolarizationRow& row : table.rows)
    rows.push_back({{"at", number(row.at)},
                    {"delivered", number(row.delivered)},
                    {"dop", number(row.dop)},
                    {"azimuth_deg", number(row.azimuth_deg)},
                    {"ellipticity_deg", number(row.ellipticity_deg)},
                    {"diattenuation", number(row.diattenuation)},
                    {"retardance_deg", number(row.retardance_deg)}});
  const char* const against = table.against == analysis::Against::wavelength ? "wavelength" : "angle";
  return {{"against", against}, {"rows", std::move(rows)}};
}

} // namespace

std::string polarization_json(const Envelope& envelope, const Assembly& assembly,
                              const Polarization& polarization) {
  Json json{{"chief", chief_json(polarization.chief)},
            {"detector", detector_json(polarization)},
            {"attribution", attribution_json(assembly, polarization.attribution, false)},
            {"attribution_by_element", attribution_json(assembly, polarization.by_element, true)},
            {"attribution_by_coating", attribution_json(assembly, polarization.by_coating, true)},
            {"cancelling", cancelling_json(assembly, polarization)},
            {"fold_turn", fold_json(assembly, polarization.fold_turn)},
            {"wave_plates", plates_json(assembly, polarization.plates)}};
  if (polarization.table.against != analysis::Against::nothing)
    json["table"] = table_json(polarization.table);
  return json_document(envelope, "polarization", std::move(json));
}

} // namespace lightledger::report
