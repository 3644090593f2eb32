#include "reference/unfolded.hpp"

#include "reference/boundary.hpp"
#include "reference/reversal.hpp"

namespace lightledger::reference {
namespace {

using assembly::Side;
using assembly::Station;
using assembly::Surface;

/// A surface as this visit sees it, its vertex in the plane across the axis that arrives.
Surface own_surface(const Surface& shared, const Place& place) {
  const bool from_behind = place.from == Side::beyond;
  Surface own = from_behind ? seen_from(Side::beyond, turned_round(shared)) : shared;
  const Rotation axes = from_behind ? Rotation(place.surface.axes * about_face()) : place.surface.axes;
  const Vector vertex = place.arriving.local(place.surface.origin);
  own.tilt_deg = angles_of(place.arriving.axes.transpose() * axes);
  own.shift = {vertex.x(), vertex.y()};
  own.rear.reset(); // it stands behind the surface's first visit
  return own;
}

bool bends_the_axis(const Station& station) {
  return station.intended == assembly::Act::bounce || station.turn_deg != std::array<double, 3>{};
}

} // namespace

std::optional<assembly::Assembly> unfolded(const assembly::Assembly& assembly, const Bench& bench) {
  assembly::Assembly result = assembly;
  std::vector<double> along(bench.stations.size(), 0.0); // from the old point of the axis to the new one
  for (std::size_t i = 0; i < bench.stations.size(); ++i) {
    Station& station = result.stations[i];
    station.gap = bench.stations[i].gap;
    if (first_visit(assembly, i) == i)
      continue;
    if (bends_the_axis(station))
      return std::nullopt;
    const Place& place = bench.stations[i];
    result.surfaces.push_back(own_surface(assembly.surfaces[station.surface], place));
    station.surface = static_cast<assembly::SurfaceId>(result.surfaces.size() - 1);
    along[i] = place.arriving.local(place.surface.origin).z();
  }
  for (std::size_t i = 0; i + 1 < along.size(); ++i) {
    double& gap = std::get<double>(result.stations[i].gap);
    gap += along[i + 1] - along[i];
    if (gap < 0.0)
      return std::nullopt;
  }
  return result;
}

} // namespace lightledger::reference
