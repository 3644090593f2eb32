#include "drawing_labels.hpp"

#include "display_width.hpp"
#include "figures.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <numbers>
#include <numeric>

namespace lightledger::report {
namespace {

using analysis::DrawnStation;
using analysis::DrawnView;

constexpr double row_above = 30.0;   ///< of names, above all that is drawn
constexpr double row_spacing = 15.5; ///< of names that lean
constexpr double lean_deg = 52.0;
constexpr double most_shift = 34.0; ///< of a name that stands upright over its station
constexpr int most_characters = 34;

std::string numbers_of(const DrawnView& view, std::size_t station) {
  std::string numbers = std::to_string(station + 1);
  for (std::size_t later = station + 1; later < view.stations.size(); ++later)
    if (view.stations[later].first_visit == station)
      numbers += fmt::format(", {}", later + 1);
  return numbers;
}

/// How far a station outside the frame lies from the nearest one of its neighbours in the train.
std::string distance_words(const DrawnView& view, std::size_t station) {
  double distance = INFINITY;
  const auto measure = [&](std::size_t other) {
    distance =
        std::min(distance, (view.stations[other].axis_point - view.stations[station].axis_point).norm());
  };
  if (station > 0)
    measure(station - 1);
  if (station + 1 < view.stations.size())
    measure(station + 1);
  return fmt::format(", {} mm on", plain(distance));
}

StationLabel named(const DrawnView& view, std::size_t station, const Sheet& sheet) {
  const std::string name = shortened(on_one_line(view.stations[station].name), most_characters);
  return {numbers_of(view, station),
          sheet.shows(station) ? name : name + distance_words(view, station),
          Vector2d::Zero(),
          0.0,
          {},
          {}};
}

double width_of(const StationLabel& label) {
  return text_width(label.number) + (label.name.empty() ? 0.0 : text_width(label.name) + 6.0);
}

/// Where the way to a station outside the frame leaves it, and which way it goes on there.
Tie tie_at_frame(const Vector2d& station, const Box& frame) {
  const Vector2d nearest = station.cwiseMax(frame.low).cwiseMin(frame.high);
  const Vector2d beyond = station - nearest;
  const int axis = std::abs(beyond[0]) >= std::abs(beyond[1]) ? 0 : 1;
  Vector2d outward = Vector2d::Zero();
  outward[axis] = std::copysign(1.0, beyond[axis]);
  return {nearest, outward};
}

/// The ends of what a station shows, from which a leader may start.
std::vector<Tie> ties(const DrawnView& view, std::size_t number, const Sheet& sheet) {
  const DrawnStation& station = view.stations[number];
  if (!sheet.shows(number))
    return {tie_at_frame(sheet(station.axis_point), sheet.frame())};
  std::vector<Tie> found;
  if (!station.section.empty() && !station.section.front().empty() && !station.section.back().empty()) {
    const Vector2d low = sheet(station.section.front().front());
    const Vector2d high = sheet(station.section.back().back());
    if (const Vector2d along = high - low; along.norm() > 1e-9) {
      const double beyond = station.does == "stop" ? 16.0 : 0.0;
      found.push_back({high + beyond * along.normalized(), along.normalized()});
      found.push_back({low - beyond * along.normalized(), -along.normalized()});
    }
  }
  Vector2d top = sheet(station.axis_point);
  for (const Vector2d& point : sheet(station.outline))
    if (point[1] < top[1])
      top = point;
  if (found.empty())
    found.push_back({top, Vector2d(0.0, -1.0)});
  return found;
}

Tie highest(const std::vector<Tie>& ties) {
  return *std::ranges::min_element(ties, {}, [](const Tie& tie) { return tie.point[1]; });
}

/// Stations that get a label of their own, in the order of the train.
std::vector<std::size_t> first_visits(const DrawnView& view) {
  std::vector<std::size_t> stations;
  for (std::size_t i = 0; i < view.stations.size(); ++i)
    if (view.stations[i].first_visit == i)
      stations.push_back(i);
  return stations;
}

/// Whether the axis runs to the right across the paper, or along the line of sight.
bool straight(const DrawnView& view, const Sheet& sheet) {
  constexpr double unseen = 1.0; // px
  for (std::size_t i = 1; i < view.stations.size(); ++i) {
    const Vector2d step = sheet(view.stations[i].axis_point) - sheet(view.stations[i - 1].axis_point);
    if (step[0] < -unseen || std::abs(step[1]) > unseen)
      return false;
  }
  return true;
}

/// Names in one row above the drawing.
class Row {
public:
  Row(const DrawnView& view, const Sheet& sheet)
      : m_view(view), m_sheet(sheet), m_stations(first_visits(view)) {
    for (const std::size_t station : m_stations)
      m_ties.push_back(highest(ties(view, station, sheet)));
    std::vector<std::size_t> order(m_stations.size());
    std::iota(order.begin(), order.end(), std::size_t{0});
    std::ranges::stable_sort(order, {}, [&](std::size_t i) { return std::round(m_ties[i].point[0]); });
    m_order = std::move(order);
    m_height = INFINITY;
    for (const Tie& tie : m_ties)
      m_height = std::min(m_height, tie.point[1]);
    m_height = std::min(m_height, m_sheet.frame().low[1]) - row_above;
  }

  Labels place() {
    Labels labels;
    labels.stations.resize(m_view.stations.size());
    if (!upright(labels))
      leaning(labels);
    return labels;
  }

private:
  [[nodiscard]] std::vector<double> wanted() const {
    std::vector<double> places;
    for (const std::size_t i : m_order)
      places.push_back(m_ties[i].point[0]);
    return places;
  }

  /// Names centred above their stations, where they find room without straying.
  bool upright(Labels& labels) {
    std::vector<double> distances;
    for (std::size_t i = 1; i < m_order.size(); ++i)
      distances.push_back(0.5 * (width_at(i - 1) + width_at(i)) + 14.0);
    const std::vector<double> places = spread(wanted(), distances);
    for (std::size_t i = 0; i < m_order.size(); ++i)
      if (std::abs(places[i] - m_ties[m_order[i]].point[0]) > most_shift)
        return false;
    for (std::size_t i = 0; i < m_order.size(); ++i) {
      StationLabel label = named(m_view, m_stations[m_order[i]], m_sheet);
      label.foot = {places[i] - 0.5 * width_of(label), m_height};
      label.box = {label.foot - Vector2d(0.0, text_height), label.foot + Vector2d(width_of(label), 3.0)};
      label.leader = leader(m_ties[m_order[i]], {places[i], m_height + 4.0});
      labels.stations[m_stations[m_order[i]]] = std::move(label);
    }
    return true;
  }

  void leaning(Labels& labels) {
    const std::vector<double> distances(m_order.size(), row_spacing);
    const std::vector<double> places = spread(wanted(), distances);
    const double lean = lean_deg * std::numbers::pi / 180.0;
    for (std::size_t i = 0; i < m_order.size(); ++i) {
      StationLabel label = named(m_view, m_stations[m_order[i]], m_sheet);
      label.turn_deg = lean_deg;
      label.foot = {places[i] + 3.0, m_height};
      const Vector2d end = width_of(label) * Vector2d(std::cos(lean), -std::sin(lean));
      label.box = {label.foot + Vector2d(-12.0, end[1] - 9.0), label.foot + Vector2d(end[0], 0.0)};
      label.leader = leader(m_ties[m_order[i]], {places[i], m_height + 3.0});
      labels.stations[m_stations[m_order[i]]] = std::move(label);
    }
  }

  /// Straight up from the station, then to the side.
  [[nodiscard]] std::vector<Vector2d> leader(const Tie& tie, const Vector2d& end) const {
    return {tie.point - Vector2d(0.0, 2.0), {tie.point[0], m_height + 0.7 * row_above}, end};
  }

  [[nodiscard]] double width_at(std::size_t i) const {
    return width_of(named(m_view, m_stations[m_order[i]], m_sheet));
  }

  const DrawnView& m_view;
  const Sheet& m_sheet;
  std::vector<std::size_t> m_stations, m_order;
  std::vector<Tie> m_ties;
  double m_height;
};

template <typename Add>
void each_segment(const std::vector<Vector2d>& points, Add add) {
  for (std::size_t i = 1; i < points.size(); ++i)
    add(Segment{points[i - 1], points[i]});
}

LabelPlacer placer_of(const DrawnView& view, const Sheet& sheet) {
  constexpr std::size_t many_stations = 80;
  LabelPlacer placer;
  if (view.stations.size() > many_stations)
    return placer;
  const auto forbid = [&](const Segment& segment) { placer.forbid(segment); };
  const auto avoid = [&](const Segment& segment) { placer.avoid(segment); };
  for (std::size_t i = 0; i < view.stations.size(); ++i)
    for (const analysis::Polyline& piece : view.stations[i].section)
      if (sheet.shows(i))
        each_segment(sheet(piece), forbid);
  for (const analysis::DrawnGlass& body : view.glass)
    each_segment(sheet(body.contour), forbid);
  for (const analysis::DrawnRay& ray : view.rays)
    each_segment(sheet(ray.points), avoid);
  return placer;
}

/// Each label near its station; none of all where one finds no room.
std::optional<Labels> scattered(const DrawnView& view, const Sheet& sheet, bool with_names) {
  LabelPlacer placer = placer_of(view, sheet);
  Labels labels;
  labels.keyed = !with_names;
  labels.stations.resize(view.stations.size());
  for (const std::size_t station : first_visits(view)) {
    StationLabel label = named(view, station, sheet);
    if (!with_names)
      label.name.clear();
    const auto placed = placer.place(ties(view, station, sheet), {width_of(label), text_height});
    if (!placed && with_names)
      return std::nullopt;
    if (!placed)
      continue;
    label.foot = {placed->box.low[0], placed->box.high[1] - 3.0};
    label.box = placed->box;
    label.leader = {placed->leader.from, placed->leader.to};
    labels.stations[station] = std::move(label);
  }
  return labels;
}

} // namespace

Labels label(const DrawnView& view, const Sheet& sheet) {
  if (straight(view, sheet))
    return Row(view, sheet).place();
  if (auto labels = scattered(view, sheet, true))
    return *std::move(labels);
  return *scattered(view, sheet, false);
}

} // namespace lightledger::report
