#include "drawing_words.hpp"
#include "json.hpp"

#include <lightledger/report/drawing.hpp>

namespace lightledger::report {
namespace {

using namespace analysis;

Json line_json(const Polyline& line) {
  Json json = Json::array();
  for (const Eigen::Vector3d& point : line)
    json.push_back({number(point[0]), number(point[1]), number(point[2])});
  return json;
}

Json station_json(const DrawnStation& station) {
  Json section = Json::array();
  for (const Polyline& piece : station.section)
    section.push_back(line_json(piece));
  return {{"name", station.name},
          {"does", station.does},
          {"axis_mm", line_json({station.axis_point})[0]},
          {"section_mm", std::move(section)},
          {"outline_mm", line_json(station.outline)}};
}

std::string rear_name(const DrawnView& view, const DrawnGlass& body) {
  const std::string& name = view.stations[body.rear].name;
  return body.front == body.rear ? name + " rear" : name;
}

Json rays_json(const std::vector<DrawnRay>& rays) {
  Json json = Json::array();
  for (const DrawnRay& ray : rays)
    json.push_back(
        {{"field", ray.field + 1}, {"end", name_of(ray.end)}, {"points_mm", line_json(ray.points)}});
  return json;
}

Json view_json(const DrawnView& view) {
  Json stations = Json::array();
  for (const DrawnStation& station : view.stations)
    stations.push_back(station_json(station));
  Json glass = Json::array();
  for (const DrawnGlass& body : view.glass)
    glass.push_back({{"between", {view.stations[body.front].name, rear_name(view, body)}},
                     {"contour_mm", line_json(body.contour)}});
  Json json{{"along", name_of(view.along)},
            {"stations", std::move(stations)},
            {"glass", std::move(glass)},
            {"rays", rays_json(view.rays)}};
  if (!view.ghost_rays.empty())
    json["ghost_rays"] = rays_json(view.ghost_rays);
  return json;
}

} // namespace

std::string drawing_json(const Envelope& envelope, const Drawing& drawing) {
  Json views = Json::array();
  for (const DrawnView& view : drawing.views)
    views.push_back(view_json(view));
  return json_document(envelope, "draw",
                       {{"wavelength_nm", number(drawing.wavelength_nm)}, {"views", std::move(views)}});
}

} // namespace lightledger::report
