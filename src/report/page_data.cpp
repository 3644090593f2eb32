#include "page_data.hpp"

#include "base64.hpp"
#include "prose.hpp"

#include <lightledger/report/budget.hpp>
#include <lightledger/report/check.hpp>
#include <lightledger/report/coating.hpp>
#include <lightledger/report/drawing.hpp>

#include <cmath>
#include <numbers>
#include <variant>

namespace lightledger::report {
namespace {

using assembly::Assembly;
using assembly::Clear;

constexpr double degrees = 180.0 / std::numbers::pi;
/// The file stays light: ghosts beyond what fits are left to their command, pictures of them to `draw`.
constexpr std::size_t most_ghost_bytes = 350'000;
constexpr std::size_t most_picture_bytes = 180'000;

Envelope envelope_for(const PageContent& content, const char* command) {
  Envelope envelope = content.envelope;
  envelope.command = command;
  return envelope;
}

Json optional_document(const std::optional<std::string>& document) {
  return document ? Json::parse(*document) : Json(nullptr);
}

/// How many entries from the first on take no more than some bytes.
std::size_t fitting(const Json& list, std::size_t most_bytes) {
  std::size_t bytes = 0;
  for (std::size_t i = 0; i < list.size(); ++i) {
    bytes += list[i].dump(-1, ' ', false, Json::error_handler_t::replace).size();
    if (bytes > most_bytes)
      return i;
  }
  return list.size();
}

/// Takes what does not fit off a list, and tells how much that was.
std::size_t cut(Json& list, std::size_t most_bytes) {
  const std::size_t all = list.size();
  const std::size_t kept = fitting(list, most_bytes);
  list.erase(list.begin() + static_cast<std::ptrdiff_t>(kept), list.end());
  return all - kept;
}

Json coatings_json(const PageContent& content) {
  Json list = Json::array();
  for (const analysis::OccurringCoating& coating : content.coatings) {
    Json stations = Json::array();
    for (const std::size_t station : coating.stations)
      stations.push_back(station + 1);
    list.push_back(
        {{"stations", std::move(stations)},
         {"document", Json::parse(coating_json(envelope_for(content, "coating"), coating.curve))}});
  }
  return list;
}

Json media_json(const Assembly& assembly) {
  Json list = Json::array();
  for (const optics::Medium& medium : assembly.media) {
    const auto index = optics::index_at(medium, assembly.light.wavelengths.front().nm);
    list.push_back({{"name", medium.name},
                    {"range_nm", {number(medium.range.from_nm), number(medium.range.to_nm)}},
                    {"n", index ? number(index->n) : Json(nullptr)},
                    {"kappa", index ? number(index->kappa) : Json(nullptr)},
                    {"source", medium.source}});
  }
  return list;
}

/// The detector's outline; null where it is unlimited.
Json sensor_json(const Assembly& assembly) {
  const Clear& clear = assembly.surfaces[assembly.stations.back().surface].clear;
  const auto outline = [](double x, double y, bool round) {
    return Json{{"half_x", number(x)}, {"half_y", number(y)}, {"round", round}};
  };
  if (const auto* disc = std::get_if<Clear::Disc>(&clear.opening))
    return outline(disc->radius, disc->radius, true);
  if (const auto* rectangle = std::get_if<Clear::Rectangle>(&clear.opening))
    return outline(rectangle->half_width, rectangle->half_height, false);
  if (const auto* ellipse = std::get_if<Clear::Ellipse>(&clear.opening))
    return outline(ellipse->semi_x, ellipse->semi_y, true);
  return nullptr;
}

Json launched_json(const optics::State& state) {
  constexpr double negligible = 1e-9;
  const double dop = std::hypot(state.s1, state.s2, state.s3);
  const bool defined = dop > negligible;
  return {{"stokes", {1.0, number(state.s1), number(state.s2), number(state.s3)}},
          {"dop", number(dop)},
          {"azimuth_deg", defined ? number(0.5 * degrees * std::atan2(state.s2, state.s1)) : Json(nullptr)},
          {"ellipticity_deg", defined
                                  ? number(0.5 * degrees * std::asin(std::clamp(state.s3 / dop, -1.0, 1.0)))
                                  : Json(nullptr)}};
}

Json spot_json(const std::vector<Eigen::Vector2d>& spot) {
  const auto rounded = [](double mm) { return number(std::round(mm * 1e5) / 1e5); };
  Json json = Json::array();
  for (const Eigen::Vector2d& point : spot)
    json.push_back({rounded(point[0]), rounded(point[1])});
  return json;
}

Json ghost_picture_json(const PageContent& content, const analysis::PathPicture& picture) {
  Json rays = Json::array();
  for (const analysis::DrawnRay& ray : picture.rays)
    if (ray.end == analysis::RayEnd::arrived)
      rays.push_back(ray_path(content.drawing, content.drawing.views.front(), ray));
  return {{"rays", std::move(rays)}, {"spot", spot_json(picture.spot)}};
}

Json pictures_json(const Assembly& assembly, const PageContent& content) {
  Json wavelengths = Json::array();
  for (const assembly::Wavelength& wavelength : assembly.light.wavelengths)
    wavelengths.push_back(number(wavelength.nm));
  Json ghosts = Json::array();
  for (std::size_t i = 1; i < content.paths.size(); ++i)
    ghosts.push_back(ghost_picture_json(content, content.paths[i]));
  cut(ghosts, most_picture_bytes);
  Json maps = Json::array();
  for (const PageMap& map : content.maps)
    maps.push_back({{"png", "data:image/png;base64," + base64(map.png)}, {"words", map.words}});
  return {{"wavelengths", std::move(wavelengths)},
          {"launched", launched_json(assembly.light.polarization)},
          {"sensor", sensor_json(assembly)},
          {"image", content.paths.empty() ? Json::array() : spot_json(content.paths.front().spot)},
          {"ghosts", std::move(ghosts)},
          {"maps", std::move(maps)}};
}

} // namespace

Json page_data(const Assembly& assembly, const PageContent& content) {
  Json ghosts = optional_document(content.ghosts);
  Json pictures = pictures_json(assembly, content);
  if (ghosts.is_object())
    pictures["left_out"] = cut(ghosts["ghosts"]["paths"], most_ghost_bytes);
  return {{"check", Json::parse(check_json(envelope_for(content, "check"), content.verdicts))},
          {"budget", Json::parse(budget_json(envelope_for(content, "budget"), content.budget))},
          {"ghosts", std::move(ghosts)},
          {"polarization", optional_document(content.polarization)},
          {"coatings", coatings_json(content)},
          {"media", media_json(assembly)},
          {"input", {{"file", content.file}, {"light", describe_light(assembly.light)}}},
          {"pictures", std::move(pictures)}};
}

} // namespace lightledger::report
