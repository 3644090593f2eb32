#include "paraxial.hpp"

#include <lightledger/assembly/document.hpp>
#include <lightledger/trace/bench.hpp>

#include <fmt/format.h>

#include <Eigen/Geometry>
#include <algorithm>
#include <cmath>
#include <numbers>
#include <utility>

namespace lightledger::trace {
namespace {

using assembly::Act;
using assembly::Assembly;
using assembly::Side;
using assembly::Station;
using assembly::StationId;
using Eigen::Matrix3d;
using Eigen::Vector3d;

/// Below this cosine between the axis and a surface's normal the axis runs in the surface's plane.
constexpr double least_cosine = 1e-9;
/// Surfaces nearer than this, in mm, touch.
constexpr double touching = 1e-9;

std::pair<double, double> sine_cosine(double degrees) {
  const double quarters = std::round(degrees / 90.0);
  const double rest = (degrees - 90.0 * quarters) * std::numbers::pi / 180.0;
  const double sine = std::sin(rest);
  const double cosine = std::cos(rest);
  switch (static_cast<int>(std::fmod(quarters, 4.0) + 4.0) % 4) {
  case 1:
    return {cosine, -sine};
  case 2:
    return {-sine, -cosine};
  case 3:
    return {-cosine, sine};
  default:
    return {sine, cosine};
  }
}

/// The rotation about one axis; the two others follow it in cyclic order.
Matrix3d about(int axis, double degrees) {
  const auto [sine, cosine] = sine_cosine(degrees);
  const int first = (axis + 1) % 3;
  const int second = (axis + 2) % 3;
  Matrix3d turn = Matrix3d::Identity();
  turn(first, first) = turn(second, second) = cosine;
  turn(second, first) = sine;
  turn(first, second) = -sine;
  return turn;
}

/// The frame of the axis behind a mirror: z and x reflected in its plane, y = z × x.
Matrix3d reflected(const Matrix3d& axes, const Vector3d& normal) {
  const auto mirror = [&](const Vector3d& v) -> Vector3d { return v - 2.0 * v.dot(normal) * normal; };
  Matrix3d behind;
  behind.col(2) = mirror(axes.col(2)).normalized();
  behind.col(0) = mirror(axes.col(0)).normalized();
  behind.col(1) = behind.col(2).cross(behind.col(0));
  return behind;
}

/// Behind the front by the plate's thickness, as seen by light that arrives along `arrival` times the front's
/// normal; parallel to its vertex's tangent plane but for the wedge.
Frame rear_face(const assembly::Rear& rear, const Frame& front, double arrival) {
  return {front.origin + arrival * rear.thickness * front.axes.col(2),
          front.axes * rotation({rear.wedge_deg[0], rear.wedge_deg[1], 0.0})};
}

/// Walks the axis from station to station and notes where everything stands.
class Surveyor {
public:
  Surveyor(const Assembly& assembly, assembly::Faults& faults)
      : m_assembly(assembly), m_faults(faults), m_marginal(assembly), m_medium(assembly.light.medium),
        m_arrival(assembly.surfaces.size(), 0.0) {
    m_bench.surface.resize(assembly.surfaces.size());
  }

  std::optional<Bench> survey() {
    for (StationId visit = 0; visit < m_assembly.stations.size(); ++visit)
      if (!meet(visit) || !advance(visit))
        return std::nullopt;
    return std::move(m_bench);
  }

private:
  bool meet(StationId visit) {
    const Station& station = m_assembly.stations[visit];
    place(station);
    const Side from = side(station);
    if (!pass_media(visit, from))
      return false;
    m_bench.arriving.push_back(m_axis);
    m_bench.from.push_back(from);
    const Vector3d normal = m_bench.surface[station.surface].axes.col(2);
    if (station.intended == Act::bounce) {
      if (std::abs(m_axis.axes.col(2).dot(normal)) < least_cosine)
        return fault(visit, ".tilt", fmt::format("the axis runs in the plane of mirror '{}'", station.name));
      m_axis.axes = reflected(m_axis.axes, normal);
    }
    m_axis.axes = m_axis.axes * rotation(station.turn_deg);
    m_bench.leaving.push_back(m_axis);
    m_marginal.meet(station, from);
    return true;
  }

  [[nodiscard]] bool seen(assembly::SurfaceId surface) const { return m_arrival[surface] != 0.0; }

  /// On its first visit a surface gets its place.
  void place(const Station& station) {
    if (seen(station.surface))
      return;
    const assembly::Surface& surface = m_assembly.surfaces[station.surface];
    Frame& frame = m_bench.surface[station.surface];
    frame.axes = m_axis.axes * rotation(surface.tilt_deg);
    frame.origin =
        m_axis.origin + m_axis.axes.leftCols<2>() * Eigen::Map<const Eigen::Vector2d>(surface.shift.data());
    m_arrival[station.surface] = std::copysign(1.0, m_axis.axes.col(2).dot(frame.axes.col(2)));
    if (surface.rear)
      m_bench.surface[surface.rear->surface] = rear_face(*surface.rear, frame, m_arrival[station.surface]);
  }

  [[nodiscard]] Side side(const Station& station) const {
    const double cosine = m_axis.axes.col(2).dot(m_bench.surface[station.surface].axes.col(2));
    return std::copysign(1.0, cosine) == m_arrival[station.surface] ? Side::before : Side::beyond;
  }

  /// Only a visit that comes again can find itself on the wrong side.
  bool pass_media(StationId visit, Side from) {
    const Station& station = m_assembly.stations[visit];
    const assembly::Surface& surface = m_assembly.surfaces[station.surface];
    const assembly::MediumId beyond = surface.beyond.value_or(surface.before);
    const assembly::MediumId here = from == Side::before ? surface.before : beyond;
    if (here != m_medium)
      return fault(visit, "",
                   fmt::format("'{}' is met from its side in {}, but the light arrives in {}", station.name,
                               m_assembly.media[here].name, m_assembly.media[m_medium].name));
    if (surface.rear && from == Side::beyond)
      return fault(visit, "", fmt::format("'{}' is met from behind, where its 'rear' stands", station.name));
    if (station.intended == Act::pass)
      m_medium = from == Side::before ? beyond : surface.before;
    return true;
  }

  bool advance(StationId visit) {
    double gap = 0.0;
    if (visit + 1 < m_assembly.stations.size()) {
      const auto length = length_after(visit);
      if (!length)
        return false;
      gap = *length;
    }
    m_bench.gap.push_back(gap);
    m_axis.origin += gap * m_axis.axes.col(2);
    m_marginal.advance(gap);
    return true;
  }

  std::optional<double> length_after(StationId visit) {
    const Station& station = m_assembly.stations[visit];
    if (const auto* stated = std::get_if<double>(&station.gap))
      return *stated;
    if (std::holds_alternative<assembly::UpToSurface>(station.gap))
      return up_to_surface(visit + 1);
    const auto image = m_marginal.image_distance();
    if (!image)
      fault(visit, ".gap",
            fmt::format("gap: focus behind '{}' finds no image there: it is {}", station.name,
                        m_marginal.why_no_image()));
    return image;
  }

  /// Along the axis to the plane tangent to the vertex of a surface that stands already.
  std::optional<double> up_to_surface(StationId visit) {
    const Station& station = m_assembly.stations[visit];
    const Frame& frame = m_bench.surface[station.surface];
    const double cosine = m_axis.axes.col(2).dot(frame.axes.col(2));
    const double distance = (frame.origin - m_axis.origin).dot(frame.axes.col(2)) / cosine;
    const bool meets = std::abs(cosine) >= least_cosine && distance > -touching;
    if (!meets)
      fault(visit, "",
            fmt::format("the axis does not come back to the surface of '{}': it {}", station.name,
                        std::abs(cosine) < least_cosine ? "runs along it" : "runs away from it"));
    return meets ? std::optional(std::max(distance, 0.0)) : std::nullopt;
  }

  bool fault(StationId visit, const char* key, std::string message) {
    assembly::Mark mark;
    if (m_assembly.document)
      mark = m_assembly.document->locate(fmt::format("train[{}]{}", visit, key));
    m_faults.add({mark, std::move(message), "", ""});
    return false;
  }

  const Assembly& m_assembly;
  assembly::Faults& m_faults;
  ParaxialRay m_marginal;
  assembly::MediumId m_medium;
  std::vector<double> m_arrival; ///< per surface: sign of axis · normal on the first visit, 0 before it
  Frame m_axis;
  Bench m_bench;
};

} // namespace

Matrix3d rotation(const std::array<double, 3>& degrees) {
  return about(0, degrees[0]) * about(1, degrees[1]) * about(2, degrees[2]);
}

std::optional<Bench> lay_out(const Assembly& assembly, assembly::Faults& faults) {
  return Surveyor(assembly, faults).survey();
}

} // namespace lightledger::trace
