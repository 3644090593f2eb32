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

/// The vertex of a surface, where its first visit puts it.
Frame vertex(const assembly::Surface& surface, const Frame& arriving) {
  return {arriving.bench({surface.shift[0], surface.shift[1], 0.0}),
          arriving.axes * rotation(surface.tilt_deg)};
}

/// The back face of a plate: behind the front as the light arrives, parallel to it but for the wedge.
Frame rear_face(const assembly::Rear& rear, const Frame& front, const Frame& arriving) {
  const Vector normal = front.axes.col(2);
  const Vector inward = normal.dot(arriving.axes.col(2)) > 0.0 ? normal : Vector(-normal);
  return {front.origin + rear.thickness * inward,
          front.axes * rotation({rear.wedge_deg[0], rear.wedge_deg[1], 0.0})};
}

/// The side that an axis arrives at, by the way it crosses the surface on the first visit and on this one.
assembly::Side side(const Place& first, const Frame& arriving) {
  const Vector normal = first.surface.axes.col(2);
  const bool same = first.arriving.axes.col(2).dot(normal) * arriving.axes.col(2).dot(normal) > 0.0;
  return same ? assembly::Side::before : assembly::Side::beyond;
}

Place place(const assembly::Station& station, const Frame& arriving, const Frame& surface,
            assembly::Side from) {
  Place here;
  here.arriving = arriving;
  here.surface = surface;
  here.from = from;
  here.leaving.origin = arriving.origin;
  here.leaving.axes =
      axes_behind(arriving.axes, here.surface.axes.col(2), station.intended) * rotation(station.turn_deg);
  here.gap = 0.0;
  here.rear = {};
  return here;
}

/// The place of a station: of its own, or that of the first station with its surface.
Place place_of(const assembly::Assembly& assembly, std::size_t i, const Bench& laid_out,
               const Frame& arriving) {
  const assembly::Station& station = assembly.stations[i];
  const std::size_t first = first_visit(assembly, i);
  const assembly::Surface& surface = assembly.surfaces.at(station.surface);
  if (first == i) {
    Place here = place(station, arriving, vertex(surface, arriving), assembly::Side::before);
    if (surface.rear)
      here.rear = rear_face(*surface.rear, here.surface, arriving);
    return here;
  }
  const Place& there = laid_out.stations[first];
  Place here = place(station, arriving, there.surface, side(there, arriving));
  here.rear = there.rear;
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

/// The curvature of a vertex for light that arrives at this side.
double curvature_seen(const assembly::Surface& surface, assembly::Side from) {
  const double curvature = vertex_curvature(surface.shape);
  return from == assembly::Side::before ? curvature : -curvature;
}

/// The power n(θ in − θ out)/height of a vertex; a mirror's centre of curvature lies downstream along the
/// arriving axis where it diverges.
double power(const assembly::Station& station, double curvature, double index, double index_behind) {
  if (station.intended == assembly::Act::bounce)
    return -2.0 * index * curvature;
  return (index_behind - index) * curvature;
}

double to_image(const ParaxialRay& ray, double index, const std::string& behind) {
  const double distance = -ray.height * index / ray.reduced_slope;
  if (!(distance > 0.0 && std::isfinite(distance)))
    throw std::domain_error("no real image behind " + behind);
  return distance;
}

/// Along an axis to the plane tangent to a vertex.
double to_tangent_plane(const Frame& axis, const Frame& surface) {
  const Vector normal = surface.axes.col(2);
  const double distance = (surface.origin - axis.origin).dot(normal) / axis.axes.col(2).dot(normal);
  if (!(distance >= 0.0 && std::isfinite(distance)))
    throw std::domain_error("the axis does not come back to a surface");
  return distance;
}

void require_arrival_in(assembly::MediumId medium, const assembly::Surface& surface, assembly::Side from) {
  const bool before = from == assembly::Side::before;
  if ((before ? surface.before : surface.beyond.value_or(surface.before)) != medium)
    throw std::domain_error("the axis comes back to a surface in another medium");
  if (surface.rear && !before)
    throw std::domain_error("the axis comes back to a plate from behind");
}

} // namespace

Rotation rotation(const std::array<double, 3>& degrees) {
  const auto about = [&](int axis) {
    const double radians = degrees[static_cast<std::size_t>(axis)] * std::numbers::pi / 180.0;
    return Eigen::AngleAxisd(radians, Vector::Unit(axis)).toRotationMatrix();
  };
  return about(0) * about(1) * about(2);
}

std::size_t first_visit(const assembly::Assembly& assembly, std::size_t station) {
  std::size_t first = 0;
  while (assembly.stations.at(first).surface != assembly.stations.at(station).surface)
    ++first;
  return first;
}

Bench lay_out(const assembly::Assembly& assembly) {
  Bench bench;
  const double wavelength = assembly.light.wavelengths.front().nm;
  assembly::MediumId medium = assembly.light.medium;
  double index = index_of(assembly, medium, wavelength).n;
  ParaxialRay paraxial = from_object(assembly.light, index);
  Frame arriving;
  for (std::size_t i = 0; i < assembly.stations.size(); ++i) {
    const assembly::Station& station = assembly.stations[i];
    const assembly::Surface& surface = assembly.surfaces.at(station.surface);
    Place here = place_of(assembly, i, bench, arriving);
    require_arrival_in(medium, surface, here.from);
    medium = medium_behind(assembly, station, here.from);

    const double index_behind = index_of(assembly, medium, wavelength).n;
    paraxial.reduced_slope -=
        paraxial.height * power(station, curvature_seen(surface, here.from), index, index_behind);
    index = index_behind;
    bench.stations.push_back(here);

    double& gap = bench.stations.back().gap;
    if (const double* written = std::get_if<double>(&station.gap))
      gap = *written;
    else if (std::holds_alternative<assembly::Focus>(station.gap))
      gap = to_image(paraxial, index, station.name);
    else
      gap = to_tangent_plane(here.leaving, bench.stations.at(first_visit(assembly, i + 1)).surface);
    paraxial.height += gap * paraxial.reduced_slope / index;
    arriving = {here.leaving.bench({0.0, 0.0, gap}), here.leaving.axes};
  }
  return bench;
}

Bench moved(const Bench& bench, const Frame& motion) {
  const auto carry = [&](const Frame& frame) {
    return Frame{motion.bench(frame.origin), motion.axes * frame.axes};
  };
  Bench result;
  for (const Place& place : bench.stations)
    result.stations.push_back({carry(place.arriving), carry(place.surface), carry(place.leaving), place.from,
                               place.gap, carry(place.rear)});
  return result;
}

} // namespace lightledger::reference
