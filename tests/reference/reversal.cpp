#include "reference/reversal.hpp"

#include "reference/boundary.hpp"
#include "reference/media.hpp"

#include <cmath>
#include <numbers>
#include <utility>

namespace lightledger::reference {
namespace {

using assembly::Act;
using assembly::Station;
using assembly::Surface;

struct FromBehind {
  assembly::Shape operator()(const assembly::Plane& shape) const { return shape; }
  assembly::Shape operator()(const assembly::Sphere& shape) const { return assembly::Sphere{-shape.radius}; }
  assembly::Shape operator()(const assembly::Conic& shape) const {
    return assembly::Conic{-shape.radius, shape.conic};
  }
  assembly::Shape operator()(assembly::Asphere shape) const {
    shape.radius = -shape.radius;
    for (double& term : shape.terms)
      term = -term;
    return shape;
  }
};

void reverse_magnet(assembly::Effect& effect) {
  if (auto* rotator = std::get_if<assembly::Rotator>(&effect);
      rotator != nullptr && rotator->kind == assembly::Rotator::Kind::faraday)
    rotator->angle_deg = -rotator->angle_deg;
}

/// An axis is seen from behind at the opposite angle, and a Faraday rotator turns the other way.
void turn_element_round(assembly::Effect& effect) {
  if (auto* polarizer = std::get_if<assembly::Polarizer>(&effect))
    polarizer->axis_deg = -polarizer->axis_deg;
  if (auto* retarder = std::get_if<assembly::Retarder>(&effect))
    retarder->axis_deg = -retarder->axis_deg;
  reverse_magnet(effect);
}

Surface on_the_way_back(const Surface& surface, const Place& place, Act act) {
  const Surface round = turned_round(surface);
  Surface result = act == Act::pass ? seen_from(assembly::Side::beyond, round) : round;
  reverse_magnet(result.effect);
  result.shift[1] = -result.shift[1];
  result.tilt_deg =
      angles_of(about_face() * place.leaving.axes.transpose() * place.surface.axes * about_face());
  return result;
}

/// What turns the axis behind a station met from its other side onto the axis that arrived there.
std::array<double, 3> turn_back(const Place& place, Act act) {
  Rotation axes = place.leaving.axes * about_face();
  if (act == Act::bounce) {
    const Vector normal = place.surface.axes.col(2);
    const Rotation mirror = Rotation::Identity() - 2.0 * normal * normal.transpose();
    axes = mirror * axes * Rotation(Eigen::Vector3d(1.0, -1.0, 1.0).asDiagonal()); // y' = z' × x'
  }
  return angles_of(axes.transpose() * place.arriving.axes * about_face());
}

/// The plane of launch as a detector.
void add_detector(assembly::Assembly& assembly) {
  Surface plane;
  plane.effect = assembly::Sensor{};
  plane.before = medium_behind(assembly, assembly.stations.back(), assembly::Side::before);
  Station detector;
  detector.name = "launch";
  detector.surface = static_cast<assembly::SurfaceId>(assembly.surfaces.size());
  detector.intended = Act::detect;
  assembly.surfaces.push_back(plane);
  assembly.stations.push_back(detector);
}

} // namespace

Rotation about_face() {
  return Eigen::Vector3d(1.0, -1.0, -1.0).asDiagonal();
}

Surface turned_round(Surface surface) {
  surface.shape = std::visit(FromBehind{}, surface.shape);
  surface.clear.at[1] = -surface.clear.at[1];
  turn_element_round(surface.effect);
  if (surface.rear)
    surface.rear->wedge_deg[1] = -surface.rear->wedge_deg[1];
  return surface;
}

std::array<double, 3> angles_of(const Rotation& rotation) {
  constexpr double degree = std::numbers::pi / 180.0;
  const double across = std::hypot(rotation(1, 2), rotation(2, 2));
  return {std::atan2(-rotation(1, 2), rotation(2, 2)) / degree, std::atan2(rotation(0, 2), across) / degree,
          std::atan2(-rotation(0, 1), rotation(0, 0)) / degree};
}

Reversed reversed(const assembly::Assembly& assembly, const Bench& bench) {
  Reversed result{assembly, {}};
  result.assembly.stations.clear();
  for (std::size_t i = assembly.stations.size() - 1; i-- > 0;) {
    Station station = assembly.stations[i];
    const Place& place = bench.stations[i];
    Surface& surface = result.assembly.surfaces[station.surface];
    surface = on_the_way_back(surface, place, station.intended);
    if (surface.rear)
      result.assembly.surfaces[surface.rear->surface].clear = surface.clear;
    station.turn_deg = turn_back(place, station.intended);
    station.gap = i > 0 ? bench.stations[i - 1].gap : 0.0;
    if (result.assembly.stations.empty()) {
      result.entrance = {place.leaving.origin, place.leaving.axes * about_face()};
      result.assembly.light.medium = medium_behind(assembly, assembly.stations[i], place.from);
    }
    result.assembly.stations.push_back(station);
  }
  add_detector(result.assembly);
  return result;
}

Ray returning(const RayRecord& there, const Frame& entrance) {
  const Step& last = there.steps[there.steps.size() - 2];
  return {entrance.local(last.point + last.direction), -entrance.axes.transpose() * last.direction};
}

bool same_places(const RayRecord& there, const RayRecord& back, const Frame& entrance) {
  const std::size_t shared = there.steps.size() - 1; // all but the detectors
  for (std::size_t i = 0; i < shared; ++i)
    if (i >= back.steps.size() || !back.steps[i].hit ||
        (entrance.bench(back.steps[i].point) - there.steps[shared - 1 - i].point).norm() > 1e-6)
      return false;
  return true;
}

} // namespace lightledger::reference
