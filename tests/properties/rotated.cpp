#include "properties/rotated.hpp"

#include "reference/reversal.hpp"

#include <cmath>
#include <numbers>

namespace lightledger::properties {
namespace {

using reference::angles_of;
using reference::rotation;

constexpr double degree = std::numbers::pi / 180.0;

std::array<double, 2> turned(const std::array<double, 2>& v, double degrees) {
  const double c = std::cos(degrees * degree);
  const double s = std::sin(degrees * degree);
  return {c * v[0] - s * v[1], s * v[0] + c * v[1]};
}

void turn_light(assembly::Light& light, double degrees) {
  const auto stokes = turned({light.polarization.s1, light.polarization.s2}, 2.0 * degrees);
  light.polarization.s1 = stokes[0];
  light.polarization.s2 = stokes[1];
  light.beam.at = turned(light.beam.at, degrees);
  for (assembly::Field& field : light.fields) {
    if (light.object_distance) {
      field.at = turned(field.at, degrees);
      continue;
    }
    const auto slope = turned({std::tan(field.at[0] * degree), std::tan(field.at[1] * degree)}, degrees);
    field.at = {std::atan(slope[0]) / degree, std::atan(slope[1]) / degree};
  }
}

} // namespace

// The frame of the axis, once turned by a rotation G of the bench, is G A Rz(∓angle): its own x stays what
// the rule of the axis makes it, and every mirror changes the sense in which it lags behind.
assembly::Assembly rotated(assembly::Assembly assembly, double degrees) {
  turn_light(assembly.light, degrees);
  double lag = degrees;
  for (std::size_t i = 0; i < assembly.stations.size(); ++i) {
    assembly::Station& station = assembly.stations[i];
    assembly::Surface& surface = assembly.surfaces[station.surface];
    if (reference::first_visit(assembly, i) == i) {
      surface.shift = turned(surface.shift, lag);
      surface.tilt_deg = angles_of(rotation({0.0, 0.0, lag}) * rotation(surface.tilt_deg));
    }
    if (station.intended == assembly::Act::bounce)
      lag = -lag;
    station.turn_deg =
        angles_of(rotation({0.0, 0.0, lag}) * rotation(station.turn_deg) * rotation({0.0, 0.0, -lag}));
  }
  return assembly;
}

} // namespace lightledger::properties
