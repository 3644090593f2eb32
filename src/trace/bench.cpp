#include "paraxial.hpp"

#include <lightledger/assembly/document.hpp>
#include <lightledger/trace/bench.hpp>

#include <fmt/format.h>

#include <Eigen/Geometry>
#include <cmath>
#include <numbers>
#include <utility>

namespace lightledger::trace {
namespace {

using assembly::Act;
using assembly::Assembly;
using assembly::Station;
using assembly::StationId;
using Eigen::Matrix3d;
using Eigen::Vector3d;

/// Below this cosine between the axis and a mirror's normal the axis runs in the mirror's plane.
constexpr double least_mirror_cosine = 1e-9;

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

/// Walks the axis from station to station and notes where everything stands.
class Surveyor {
public:
  Surveyor(const Assembly& assembly, assembly::Faults& faults)
      : m_assembly(assembly), m_faults(faults), m_marginal(assembly) {
    m_bench.surface.resize(assembly.surfaces.size());
  }

  std::optional<Bench> survey() {
    for (StationId visit = 0; visit < m_assembly.stations.size(); ++visit)
      if (!pass(visit))
        return std::nullopt;
    return std::move(m_bench);
  }

private:
  bool pass(StationId visit) {
    const Station& station = m_assembly.stations[visit];
    const assembly::Surface& surface = m_assembly.surfaces[station.surface];
    Frame& frame = m_bench.surface[station.surface];
    frame.axes = m_axis.axes * rotation(surface.tilt_deg);
    frame.origin =
        m_axis.origin + m_axis.axes.leftCols<2>() * Eigen::Map<const Eigen::Vector2d>(surface.shift.data());
    m_bench.arriving.push_back(m_axis);
    if (station.intended == Act::bounce) {
      if (std::abs(m_axis.axes.col(2).dot(frame.axes.col(2))) < least_mirror_cosine)
        return fault(visit, ".tilt", fmt::format("the axis runs in the plane of mirror '{}'", station.name));
      m_axis.axes = reflected(m_axis.axes, frame.axes.col(2));
    }
    m_axis.axes = m_axis.axes * rotation(station.turn_deg);
    m_bench.leaving.push_back(m_axis);
    m_marginal.meet(station);
    return advance(visit);
  }

  bool advance(StationId visit) {
    const bool last = visit + 1 == m_assembly.stations.size();
    double gap = 0.0;
    if (!last) {
      const auto* stated = std::get_if<double>(&m_assembly.stations[visit].gap);
      const auto length = stated != nullptr ? std::optional(*stated) : m_marginal.image_distance();
      if (!length)
        return fault(visit, ".gap",
                     fmt::format("gap: focus behind '{}' finds no image there: it is {}",
                                 m_assembly.stations[visit].name, m_marginal.why_no_image()));
      gap = *length;
    }
    m_bench.gap.push_back(gap);
    m_axis.origin += gap * m_axis.axes.col(2);
    m_marginal.advance(gap);
    return true;
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
