#include "json.hpp"

#include <lightledger/report/ghosts.hpp>

namespace lightledger::report {
namespace {

using analysis::Ghost;
using analysis::Ghosts;
using analysis::GhostSpot;

Json pair_json(const std::array<double, 2>& pair) {
  return Json::array({number(pair[0]), number(pair[1])});
}

Json ledger_json(const analysis::GhostLedger& ledger) {
  return {{"detector", number(ledger.detector)},   {"returned", number(ledger.returned)},
          {"leaked", number(ledger.leaked)},       {"absorbed", number(ledger.absorbed)},
          {"clipped", number(ledger.clipped)},     {"missed", number(ledger.missed)},
          {"scattered", number(ledger.scattered)}, {"extra", number(ledger.extra)},
          {"bulk", number(ledger.bulk)},           {"not_followed", number(ledger.not_followed)}};
}

Json by_field_json(const Ghost& ghost) {
  Json json = Json::array();
  for (const analysis::GhostField& field : ghost.by_field) {
    const std::optional<GhostSpot>& spot = field.spot;
    json.push_back({{"name", text_or_null(field.name)},
                    {"at", pair_json(field.at)},
                    {"power", number(field.power)},
                    {"relative_power", number(field.relative_power)},
                    {"centroid_mm", spot ? pair_json(spot->centroid_mm) : Json(nullptr)},
                    {"rms_radius_mm", spot ? number(spot->rms_radius_mm) : Json(nullptr)}});
  }
  return json;
}

Json ghost_json(const Ghost& ghost) {
  Json stokes = Json::array();
  for (const double s : ghost.stokes)
    stokes.push_back(number(s));
  Json reflectances = Json::array();
  Json needed = Json::array();
  for (const analysis::GhostBounce& bounce : ghost.cure) {
    reflectances.push_back(number(bounce.reflectance));
    needed.push_back(number(bounce.needed_reflectance));
  }
  return {{"bounces", ghost.bounces},
          {"power", number(ghost.power)},
          {"uncertainty", number(ghost.uncertainty)},
          {"relative_power", number(ghost.relative_power)},
          {"centroid_mm", pair_json(ghost.spot.centroid_mm)},
          {"rms_radius_mm", number(ghost.spot.rms_radius_mm)},
          {"path_excess_mm", number(ghost.path_excess_mm)},
          {"peak_ratio", number(ghost.peak_ratio)},
          {"stokes", std::move(stokes)},
          {"dop", number(ghost.dop)},
          {"fringe_modulation", number(ghost.fringe_modulation)},
          {"by_field", by_field_json(ghost)},
          {"stations", ghost.stations},
          {"defocus_mm", number(ghost.defocus_mm)},
          {"reflectances", std::move(reflectances)},
          {"needed_reflectances", std::move(needed)}};
}

Json culprit_json(const std::optional<analysis::GhostCulprit>& culprit) {
  if (!culprit)
    return nullptr;
  return {{"name", culprit->name},
          {"power", number(culprit->power)},
          {"reflectance", number(culprit->reflectance)},
          {"needed_reflectance", number(culprit->needed_reflectance)}};
}

Json foci_json(const Ghosts& ghosts) {
  Json json = Json::array();
  for (const analysis::HotFocus& focus : ghosts.foci)
    json.push_back({{"bounces", focus.bounces},
                    {"field", text_or_null(focus.field)},
                    {"from", focus.from},
                    {"to", focus.to},
                    {"medium", text_or_null(focus.medium)},
                    {"on", text_or_null(focus.on)},
                    {"distance_mm", number(focus.distance_mm)},
                    {"power", number(focus.power)},
                    {"radius_mm", number(focus.radius_mm)},
                    {"irradiance_ratio", number(focus.irradiance_ratio)}});
  return json;
}

Json returned_json(const Ghosts& ghosts) {
  Json json = Json::array();
  for (const analysis::ReturnedPath& path : ghosts.returned_paths)
    json.push_back({{"bounces", path.bounces}, {"power", number(path.power)}});
  return json;
}

} // namespace

std::string ghosts_json(const Envelope& envelope, const Ghosts& ghosts, bool with_returned) {
  Json json{{"bounces", ghosts.bounces},
            {"paths_considered", ghosts.paths_considered},
            {"paths_traced", ghosts.paths_traced},
            {"total", number(ghosts.total)},
            {"uncertainty", number(ghosts.uncertainty)},
            {"returned", number(ghosts.returned)},
            {"not_followed", number(ghosts.not_followed)},
            {"ledger", ledger_json(ghosts.ledger)},
            {"closure_error", number(ghosts.closure_error)}};
  Json paths = Json::array();
  for (const Ghost& ghost : ghosts.paths)
    paths.push_back(ghost_json(ghost));
  json["paths"] = std::move(paths);
  json["delivered"] = number(ghosts.delivered);
  json["rays"] = ghosts.rays;
  json["brightest"] = number(ghosts.paths.empty() ? 0.0 : ghosts.paths.front().power);
  json["unlisted"] = {{"paths", ghosts.unlisted_paths}, {"power", number(ghosts.unlisted)}};
  json["foci"] = foci_json(ghosts);
  json["limit"] = number(ghosts.limit);
  json["culprit"] = culprit_json(ghosts.culprit);
  if (with_returned)
    json["returned_paths"] = returned_json(ghosts);
  return json_document(envelope, "ghosts", std::move(json));
}

} // namespace lightledger::report
