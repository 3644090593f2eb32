#include "framing.hpp"

#include <algorithm>
#include <numeric>

namespace lightledger::report {
namespace {

using analysis::DrawnStation;
using analysis::DrawnView;

/// An empty way of more than this share of the whole is left out.
constexpr double mostly_empty = 0.9;
/// What is kept, beside fewer stations than this, would say little.
constexpr std::size_t least_kept = 3;
/// Free room around what is kept, as a share of its size.
constexpr double room = 0.1;

Extent extent_of(analysis::View view, const DrawnStation& station) {
  Extent extent;
  const auto add = [&](const analysis::Polyline& line) {
    for (const Eigen::Vector3d& point : line)
      extent.add(seen(view, point));
  };
  extent.add(seen(view, station.axis_point));
  for (const analysis::Polyline& piece : station.section)
    add(piece);
  for (const analysis::Polyline& piece : station.rear)
    add(piece);
  add(station.outline);
  return extent;
}

Extent extent_of(const DrawnView& view) {
  Extent extent;
  const auto add = [&](const analysis::Polyline& line) {
    for (const Eigen::Vector3d& point : line)
      extent.add(seen(view.along, point));
  };
  for (const DrawnStation& station : view.stations)
    extent.add(extent_of(view.along, station).box);
  for (const analysis::DrawnGlass& body : view.glass)
    add(body.contour);
  for (const analysis::DrawnRay& ray : view.rays)
    add(ray.points);
  return extent;
}

/// The larger of the two groups that an almost empty way along an axis of the paper keeps apart; all where
/// there is none.
std::vector<std::size_t> crowd(std::vector<std::size_t> stations, const std::vector<Box>& boxes, int axis) {
  std::ranges::sort(stations, {}, [&](std::size_t i) { return boxes[i].low[axis]; });
  double reach = boxes[stations.front()].high[axis];
  double widest = 0.0;
  std::size_t cut = 0;
  for (std::size_t i = 1; i < stations.size(); ++i) {
    if (const double gap = boxes[stations[i]].low[axis] - reach; gap > widest) {
      widest = gap;
      cut = i;
    }
    reach = std::max(reach, boxes[stations[i]].high[axis]);
  }
  if (widest <= mostly_empty * (reach - boxes[stations.front()].low[axis]))
    return stations;
  const auto middle = stations.begin() + static_cast<std::ptrdiff_t>(cut);
  return 2 * cut >= stations.size() ? std::vector<std::size_t>(stations.begin(), middle)
                                    : std::vector<std::size_t>(middle, stations.end());
}

Extent grown(const Extent& extent) {
  const Vector2d more = Vector2d::Constant(room * extent.size().maxCoeff());
  return {{extent.box.low - more, extent.box.high + more}};
}

} // namespace

void Extent::add(const Vector2d& point) {
  box.low = box.low.cwiseMin(point);
  box.high = box.high.cwiseMax(point);
}

void Extent::add(const Box& other) {
  add(other.low);
  add(other.high);
}

Vector2d seen(analysis::View view, const Eigen::Vector3d& point) {
  switch (view) {
  case analysis::View::x:
    return {point[2], -point[1]};
  case analysis::View::y:
    return {point[2], -point[0]};
  case analysis::View::z:
    break;
  }
  return {point[0], -point[1]};
}

Framing framing(const DrawnView& view) {
  std::vector<Box> boxes;
  for (const DrawnStation& station : view.stations)
    boxes.push_back(extent_of(view.along, station).box);
  std::vector<std::size_t> kept(boxes.size());
  std::iota(kept.begin(), kept.end(), std::size_t{0});
  for (const int axis : {0, 1, 0, 1})
    kept = crowd(std::move(kept), boxes, axis);
  if (kept.size() == boxes.size() || kept.size() < least_kept)
    return {extent_of(view), std::vector<bool>(boxes.size(), true), false};
  Framing framing{{}, std::vector<bool>(boxes.size(), false), true};
  for (const std::size_t station : kept) {
    framing.inside[station] = true;
    framing.extent.add(boxes[station]);
  }
  framing.extent = grown(framing.extent);
  return framing;
}

} // namespace lightledger::report
