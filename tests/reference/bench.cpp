#include "reference/bench.hpp"

#include "reference/media.hpp"
#include "reference/shape.hpp"

#include <Eigen/Geometry>
#include <numbers>
#include <stdexcept>

namespace lightledger::reference {
namespace {

/// The axis behind a station: straight on, or reflected in the tangent plane of the vertex with x following
/// it and y' = z' × x'.
Rotation axes_behind(const Rotation& arriving, const Vector& normal, assembly::Act act) {
  if (act != assembly::Act::bounce)
    return arriving;
  const Rotation mirror = Rotation::Identity() - 2.0 * normal * normal.transpose();
  Rotation axes; // made unit again, or rounding would grow from mirror to mirror
  axes.col(0) = (mirror * arriving.col(0)).normalized();
  axes.col(2) = (mirror * arriving.col(2)).normalized();
  axes.col(1) = axes.col(2).cross(axes.col(0));
  return axes;
}

Place place(const assembly::Station& station, const assembly::Surface& surface, const Frame& arriving) {
  Place here;
  here.arriving = arriving;
  here.surface.origin = arriving.bench({surface.shift[0], surface.shift[1], 0.0});
  here.surface.axes = arriving.axes * rotation(surface.tilt_deg);
  here.leaving.origin = arriving.origin;
  here.leaving.axes =
      axes_behind(arriving.axes, here.surface.axes.col(2), station.intended) * rotation(station.turn_deg);
  here.gap = 0.0;
  return here;
}

/// A paraxial ray in the meridional plane: its height, and its index times slope (positive away from the
/// axis).
struct ParaxialRay {
  double height, reduced_slope;
};

ParaxialRay from_object(const assembly::Light& light, double index) {
  return {1.0, light.object_distance ? index / *light.object_distance : 0.0};
}

/// The power n(θ in − θ out)/height of a vertex; a mirror's centre of curvature lies downstream along the
/// arriving axis where it diverges.
double power(const assembly::Station& station, double curvature, double index, double index_behind) {
  if (station.intended == assembly::Act::bounce)
    return -2.0 * index * curvature;
  return (index_behind - index) * curvature;
}

} // namespace

Rotation rotation(const std::array<double, 3>& degrees) {
  const auto about = [&](int axis) {
    const double radians = degrees[static_cast<std::size_t>(axis)] * std::numbers::pi / 180.0;
    return Eigen::AngleAxisd(radians, Vector::Unit(axis)).toRotationMatrix();
  };
  return about(0) * about(1) * about(2);
}

Bench lay_out(const assembly::Assembly& assembly) {
  Bench bench;
  const double wavelength = assembly.light.wavelengths.front().nm;
  double index = index_of(assembly, assembly.light.medium, wavelength).n;
  ParaxialRay paraxial = from_object(assembly.light, index);
  Frame arriving;
  for (const assembly::Station& station : assembly.stations) {
    const assembly::Surface& surface = assembly.surfaces.at(station.surface);
    Place here = place(station, surface, arriving);
    const double index_behind = index_of(assembly, medium_behind(assembly, station), wavelength).n;
    paraxial.reduced_slope -=
        paraxial.height * power(station, vertex_curvature(surface.shape), index, index_behind);
    index = index_behind;

    const double to_image = -paraxial.height * index / paraxial.reduced_slope;
    const double* written = std::get_if<double>(&station.gap);
    if (written == nullptr && !(to_image > 0.0 && std::isfinite(to_image)))
      throw std::domain_error("no real image behind " + station.name);
    here.gap = written != nullptr ? *written : to_image;
    paraxial.height += here.gap * paraxial.reduced_slope / index;

    arriving = {here.leaving.bench({0.0, 0.0, here.gap}), here.leaving.axes};
    bench.stations.push_back(here);
  }
  return bench;
}

Bench moved(const Bench& bench, const Frame& motion) {
  const auto carry = [&](const Frame& frame) {
    return Frame{motion.bench(frame.origin), motion.axes * frame.axes};
  };
  Bench result;
  for (const Place& place : bench.stations)
    result.stations.push_back({carry(place.arriving), carry(place.surface), carry(place.leaving), place.gap});
  return result;
}

} // namespace lightledger::reference
