#include "bounce_path.hpp"
#include "drawn_rays.hpp"
#include "profile.hpp"

#include <lightledger/trace/tracer.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cmath>
#include <utility>

namespace lightledger::analysis {
namespace {

using assembly::Assembly;
using assembly::StationId;
using Eigen::Vector3d;
using trace::Train;

/// Rays are seen for this share of the train's size before they reach it.
constexpr double lead_share = 0.08;
/// How far beyond its rays a surface without limits is drawn, and the least half length, in mm.
constexpr double beyond_rays = 1.15;
constexpr double least_reach = 1.0;

/// The longest of the bench's extents, along the axis of the train and across its largest surface.
double size_of(const Train& train) {
  Vector3d least = Vector3d::Constant(INFINITY);
  Vector3d most = -least;
  for (std::size_t visit = 0; visit < train.bench.arriving.size(); ++visit) {
    const assembly::SurfaceId surface = train.assembly->stations[visit].surface;
    const trace::Frame& frame = train.bench.surface[surface];
    for (const Vector3d& point : outline(train.assembly->surfaces[surface], frame)) {
      least = least.cwiseMin(point);
      most = most.cwiseMax(point);
    }
    least = least.cwiseMin(train.bench.arriving[visit].origin);
    most = most.cwiseMax(train.bench.arriving[visit].origin);
  }
  return std::max((most - least).maxCoeff(), least_reach);
}

/// The view along which the axis runs least; between equals the one that shows how the fields spread.
View best_view(const Train& train) {
  Vector3d hidden = Vector3d::Zero();
  for (std::size_t i = 1; i < train.bench.arriving.size(); ++i)
    hidden += (train.bench.arriving[i].origin - train.bench.arriving[i - 1].origin).cwiseAbs();
  Vector3d spread = Vector3d::Zero();
  for (const assembly::Field& field : train.assembly->light.fields)
    spread += Vector3d(std::abs(field.at[0]), std::abs(field.at[1]), 0.0);
  const double total = std::max(hidden.sum(), 1e-12);
  const Vector3d cost = hidden / total + 1e-3 * spread / std::max(spread.sum(), 1e-12);
  const int least =
      static_cast<int>(std::min_element(cost.data(), cost.data() + 3,
                                        [](double one, double other) { return one < other - 1e-9; }) -
                       cost.data());
  return static_cast<View>(least);
}

bool glass(const Train& train, assembly::MediumId medium) {
  const auto index = optics::index_at(train.assembly->media[medium], train.plans.front().wavelength_nm);
  return index && !optics::gas(*index);
}

/// The section of a body's face from one edge to the other.
Polyline whole(const std::vector<Polyline>& section) {
  Polyline line;
  for (const Polyline& piece : section)
    line.insert(line.end(), piece.begin(), piece.end());
  return line;
}

/// The contour of a body between two faces. The edge of the smaller face goes on flat until it is as high as
/// that of the larger one; from there the rim runs straight.
Polyline joined(const std::vector<Polyline>& front, const std::vector<Polyline>& rear) {
  Polyline first = whole(front);
  Polyline second = whole(rear);
  if (first.size() < 2 || second.size() < 2)
    return {};
  if ((first.back() - second.back()).norm() + (first.front() - second.front()).norm() <
      (first.back() - second.front()).norm() + (first.front() - second.back()).norm())
    std::ranges::reverse(second);
  const auto grow = [](Polyline& face, double to) {
    const Vector3d chord = face.back() - face.front();
    const Vector3d more = 0.5 * (to - chord.norm()) * chord.normalized();
    face.insert(face.begin(), face.front() - more);
    face.push_back(face.back() + more);
  };
  const double height = (first.back() - first.front()).norm();
  const double other = (second.back() - second.front()).norm();
  if (height < other)
    grow(first, other);
  else if (other < height)
    grow(second, height);
  first.insert(first.end(), second.begin(), second.end());
  return first;
}

class ViewMaker {
public:
  ViewMaker(const Train& train, View view) : m_train(train), m_view{view, {}, {}, {}, {}} {}

  DrawnView make(const std::optional<trace::Path>& ghost_path) {
    const double lead = lead_share * size_of(m_train);
    Fan direct = fan(m_train, m_train.path, m_view.along, lead);
    if (ghost_path) {
      Fan ghost = fan(m_train, *ghost_path, m_view.along, lead);
      m_view.ghost_rays = std::move(ghost.rays);
      for (std::size_t i = 0; i < direct.reach.size(); ++i)
        direct.reach[i] = std::max(direct.reach[i], ghost.reach[i]);
    }
    m_view.rays = std::move(direct.rays);
    for (StationId visit = 0; visit < m_train.assembly->stations.size(); ++visit)
      m_view.stations.push_back(station(visit, direct.reach));
    for (StationId visit = 0; visit < m_view.stations.size(); ++visit) {
      add_plate(visit);
      if (visit > 0)
        add_glass(visit);
    }
    return std::move(m_view);
  }

private:
  [[nodiscard]] DrawnStation station(StationId visit, const std::vector<double>& reach) const {
    const Assembly& assembly = *m_train.assembly;
    const assembly::Station& station = assembly.stations[visit];
    const assembly::Surface& surface = assembly.surfaces[station.surface];
    const trace::Frame& frame = m_train.bench.surface[station.surface];
    const trace::Frame& arriving = m_train.bench.arriving[visit];
    const Vector3d direction = across(frame, m_view.along);
    const double toward = arriving.axes.col(2).dot(frame.axes.col(2));
    return {station.name,
            assembly::does(assembly, station),
            first_visit(station.surface),
            arriving.origin,
            direction,
            std::copysign(1.0, toward) * frame.axes.col(2),
            section(surface, frame, direction, std::max(beyond_rays * reach[station.surface], least_reach)),
            rear_section(surface, reach[station.surface]),
            outline(surface, frame)};
  }

  /// The plane rear face of a plate, as large as its front.
  [[nodiscard]] std::vector<Polyline> rear_section(const assembly::Surface& front, double reach) const {
    if (!front.rear)
      return {};
    assembly::Surface face = m_train.assembly->surfaces[front.rear->surface];
    face.clear = front.clear;
    const trace::Frame& frame = m_train.bench.surface[front.rear->surface];
    return section(face, frame, across(frame, m_view.along), std::max(beyond_rays * reach, least_reach));
  }

  void add_plate(StationId visit) {
    const DrawnStation& station = m_view.stations[visit];
    Polyline contour = joined(station.section, station.rear);
    if (station.first_visit == visit && !contour.empty())
      m_view.glass.push_back({visit, visit, std::move(contour)});
  }

  [[nodiscard]] std::size_t first_visit(assembly::SurfaceId surface) const {
    const auto& stations = m_train.assembly->stations;
    return static_cast<std::size_t>(std::ranges::find(stations, surface, &assembly::Station::surface) -
                                    stations.begin());
  }

  /// What fills the leg that leads to a visit, unless the same two surfaces hold it already.
  void add_glass(StationId visit) {
    if (!glass(m_train, m_train.routes.legs()[visit].medium))
      return;
    const auto faces = [&](std::size_t front, std::size_t rear) -> std::pair<std::size_t, std::size_t> {
      return std::minmax(m_view.stations[front].first_visit, m_view.stations[rear].first_visit);
    };
    const std::size_t front = visit - 1;
    for (const DrawnGlass& body : m_view.glass)
      if (faces(body.front, body.rear) == faces(front, visit))
        return;
    Polyline contour = joined(m_view.stations[front].section, m_view.stations[visit].section);
    if (!contour.empty())
      m_view.glass.push_back({front, visit, std::move(contour)});
  }

  const Train& m_train;
  DrawnView m_view;
};

} // namespace

std::vector<PathPicture> path_pictures(const Assembly& assembly, View view,
                                       const std::vector<Bounces>& ghosts) {
  assembly::Faults faults;
  const auto train = trace::prepare(assembly, faults);
  if (!train)
    return {};
  const double lead = lead_share * size_of(*train);
  const auto picture = [&](const trace::Path& path) {
    return PathPicture{fan(*train, path, view, lead).rays, spot(*train, path)};
  };
  std::vector<PathPicture> pictures{picture(train->path)};
  for (const Bounces& ghost : ghosts) {
    const auto path = path_of_bounces(assembly, train->routes, ghost);
    pictures.push_back(path ? picture(*path) : PathPicture{});
  }
  return pictures;
}

DrawingResult drawing(const Assembly& assembly, const DrawingOptions& options) {
  DrawingResult result;
  const auto train = trace::prepare(assembly, result.faults);
  if (!train)
    return result;
  std::optional<trace::Path> ghost;
  if (options.ghost && !(ghost = path_of_bounces(assembly, train->routes, *options.ghost))) {
    result.faults.add(
        {{}, fmt::format("no path bounces at {}", fmt::join(*options.ghost, ", then ")), "", ""});
    return result;
  }
  Drawing drawing{{}, {}, train->plans.front().wavelength_nm};
  for (const assembly::Field& field : assembly.light.fields)
    drawing.fields.push_back(field.name);
  const std::vector<View> views =
      options.views.empty() ? std::vector<View>{best_view(*train)} : options.views;
  for (const View view : views)
    drawing.views.push_back(ViewMaker(*train, view).make(ghost));
  result.drawing = std::move(drawing);
  return result;
}

} // namespace lightledger::analysis
