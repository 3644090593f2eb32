#include "close_look.hpp"

#include <lightledger/trace/foci.hpp>
#include <lightledger/trace/path_tree.hpp>

#include <algorithm>

namespace lightledger::analysis {
namespace {

constexpr std::size_t most_foci = 20;
constexpr std::size_t most_looked_at = 500;
constexpr int most_bounces = 2;
/// Fainter beams than this do not outshine the launched beam where they come to a focus of any size.
constexpr double faintest = 1e-9;

HotFocus named(const trace::Train& train, const trace::Focus& focus) {
  const assembly::Assembly& assembly = *train.assembly;
  const auto name = [&](trace::StationId station) { return assembly.stations[station].name; };
  HotFocus hot;
  for (const trace::State& state : focus.bounces)
    hot.bounces.push_back(trace::Routes::bounce_name(assembly, state));
  hot.field = assembly.light.fields[focus.field].name;
  hot.to = name(focus.to);
  hot.from = focus.from ? name(*focus.from) : hot.to;
  if (focus.where == trace::Focus::Where::between)
    hot.medium = assembly.media[focus.medium].name;
  else
    hot.on = focus.where == trace::Focus::Where::at_to ? hot.to : hot.from;
  hot.distance_mm = focus.distance_mm;
  hot.power = focus.power;
  hot.radius_mm = focus.radius_mm;
  hot.irradiance_ratio = focus.irradiance_ratio;
  return hot;
}

/// The same beam in the same place, of whatever field.
bool same(const HotFocus& a, const HotFocus& b) {
  return a.bounces == b.bounces && a.on == b.on && a.from == b.from && a.to == b.to;
}

} // namespace

std::vector<HotFocus> hot_places(const trace::Train& train, const GhostOptions& options) {
  const trace::PathTree tree(*train.assembly, train.routes, std::min(options.bounces, most_bounces));
  std::vector<HotFocus> places;
  for (const trace::Focus& focus :
       trace::hot_foci(train, tree, std::max(options.floor, faintest), most_looked_at)) {
    HotFocus hot = named(train, focus);
    const bool known = std::ranges::any_of(places, [&](const HotFocus& place) { return same(place, hot); });
    if (!known && places.size() < most_foci)
      places.push_back(std::move(hot));
  }
  return places;
}

} // namespace lightledger::analysis
