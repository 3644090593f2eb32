#include "polarization_advice.hpp"

#include <algorithm>
#include <cmath>
#include <limits>
#include <numbers>
#include <utility>

namespace lightledger::analysis {
namespace {

using assembly::Assembly;
using optics::PauliVector;

constexpr double degrees = 180.0 / std::numbers::pi;
constexpr double noticeable_deg = 0.1;
constexpr double as_good_deg = 1e-6;
constexpr double coarse_deg = 1.0;
constexpr int halvings = 40;

/// K seen from a basis that is turned by an angle.
PauliVector turned(const PauliVector& k, double angle_deg) {
  const double c = std::cos(2.0 * angle_deg / degrees);
  const double s = std::sin(2.0 * angle_deg / degrees);
  return {k[0], c * k[1] - s * k[2], s * k[1] + c * k[2], k[3]};
}

double retardance_deg(const PauliVector& k) {
  const auto found = optics::retardance(k);
  return found ? found->size : std::numeric_limits<double>::infinity();
}

bool is_interface(const Assembly& assembly, std::size_t station) {
  const assembly::Surface& surface = assembly.surfaces[assembly.stations[station].surface];
  return std::holds_alternative<assembly::Interface>(surface.effect);
}

/// The retardance of mirrors and lenses when all from one station on is turned about the axis that arrives
/// there.
class Turning {
public:
  Turning(const Assembly& assembly, const ChiefWalk& walk, std::size_t station)
      : m_sense(station == 0 ? 1.0 : walk.parity[station - 1]) {
    for (std::size_t i = 0; i < walk.did.size(); ++i) {
      PauliVector& part = i < station ? m_before : m_behind;
      if (is_interface(assembly, i))
        part = optics::product(walk.did[i], part);
    }
  }

  [[nodiscard]] double operator()(double angle_deg) const {
    return retardance_deg(optics::product(turned(m_behind, m_sense * angle_deg), m_before));
  }

  /// The angle in (−90, 90] of the least retardance; of two as good, the smaller turn.
  [[nodiscard]] double best() const {
    double best = 0.0;
    for (double size = coarse_deg; size <= 90.0; size += coarse_deg)
      for (const double angle : {size, -size})
        if (angle > -90.0 && (*this)(angle) < (*this)(best)-1e-9)
          best = angle;
    double step = coarse_deg;
    for (int round = 0; round < halvings; ++round, step *= 0.5)
      for (const double angle : {best + step, best - step})
        if ((*this)(angle) < (*this)(best))
          best = angle;
    return best > 90.0 ? best - 180.0 : best;
  }

private:
  double m_sense;
  PauliVector m_before{1.0, 0.0, 0.0, 0.0}, m_behind{1.0, 0.0, 0.0, 0.0};
};

/// The angles of Rx(a) Ry(b) Rz(c).
std::array<double, 3> angles_of(const Eigen::Matrix3d& r) {
  return {degrees * std::atan2(-r(1, 2), r(2, 2)), degrees * std::asin(std::clamp(r(0, 2), -1.0, 1.0)),
          degrees * std::atan2(-r(0, 1), r(0, 0))};
}

std::array<double, 3> turned_first(double angle_deg, const std::array<double, 3>& angles_deg) {
  return angles_of(trace::rotation({0.0, 0.0, angle_deg}) * trace::rotation(angles_deg));
}

bool met_once(const Assembly& assembly, std::size_t station) {
  return std::ranges::count(assembly.stations, assembly.stations[station].surface,
                            &assembly::Station::surface) == 1;
}

} // namespace

std::optional<FoldTurn> fold_turn(const trace::Train& train, const ChiefWalk& walk) {
  const Assembly& assembly = *train.assembly;
  const double now = Turning(assembly, walk, 0)(0.0);
  if (!(now > noticeable_deg && std::isfinite(now)))
    return std::nullopt;
  std::optional<FoldTurn> best;
  bool folded = false; // the first fold has nothing to be turned against
  for (std::size_t i = 0; i < walk.did.size(); ++i) {
    if (assembly.stations[i].intended != assembly::Act::bounce)
      continue;
    if (std::exchange(folded, true) == false || !met_once(assembly, i))
      continue;
    const Turning turning(assembly, walk, i);
    const double angle = turning.best();
    const double left = turning(angle);
    if (left > 0.5 * now || (best && left > best->retardance_deg - as_good_deg))
      continue;
    const assembly::Station& station = assembly.stations[i];
    // The frame behind keeps its x by the rule of the axis; to turn along, it must be turned back.
    best = {i,
            angle,
            turned_first(angle, assembly.surfaces[station.surface].tilt_deg),
            turned_first(-angle, station.turn_deg),
            left,
            now};
  }
  return best;
}

} // namespace lightledger::analysis
