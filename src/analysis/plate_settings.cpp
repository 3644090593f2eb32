#include "polarization_advice.hpp"

#include <Eigen/Geometry>
#include <algorithm>
#include <cmath>
#include <numbers>

namespace lightledger::analysis {
namespace {

using assembly::Assembly;
using optics::PauliVector;

constexpr double degrees = 180.0 / std::numbers::pi;
constexpr double coarse_deg = 5.0;
constexpr double noticeable = 1e-4;
/// Leakages this near each other are equally good.
constexpr double as_good = 1e-9;
constexpr int halvings = 40;

using Axes = std::array<double, 2>; ///< degrees; the second without meaning where there is one plate

const assembly::Retarder* retarder(const Assembly& assembly, std::size_t station) {
  return std::get_if<assembly::Retarder>(&assembly.surfaces[assembly.stations[station].surface].effect);
}

std::vector<std::size_t> plates_of(const Assembly& assembly) {
  std::vector<std::size_t> plates;
  for (std::size_t i = 0; i < assembly.stations.size(); ++i)
    if (retarder(assembly, i) != nullptr)
      plates.push_back(i);
  return plates;
}

/// A plate as the chief ray sees it, at any setting of its axis.
struct Plate {
  PauliVector did; ///< at the present setting
  double axis_deg, sense;
  Eigen::Vector3d direction;

  [[nodiscard]] Eigen::Vector3d projected(double angle_deg) const {
    const Eigen::Vector3d axis(std::cos(angle_deg / degrees), std::sin(angle_deg / degrees), 0.0);
    return (axis - axis.dot(direction) * direction).normalized();
  }

  [[nodiscard]] PauliVector at(double angle_deg) const {
    const Eigen::Vector3d from = projected(axis_deg);
    const Eigen::Vector3d to = projected(angle_deg);
    const double turn = 2.0 * sense * std::atan2(direction.dot(from.cross(to)), from.dot(to));
    const double c = std::cos(turn);
    const double s = std::sin(turn);
    return {did[0], c * did[1] - s * did[2], s * did[1] + c * did[2], did[3]};
  }
};

/// Cross leakage of the chief ray as a function of the plates' axes.
class Bench {
public:
  Bench(const trace::Train& train, const ChiefWalk& walk, const std::vector<std::size_t>& stations)
      : m_crossing(optics::crossing(train.assembly->light.polarization)), m_parts(1, identity) {
    for (std::size_t i = 0; i < walk.did.size(); ++i) {
      if (!std::ranges::binary_search(stations, i)) {
        m_parts.back() = optics::product(walk.did[i], m_parts.back());
        continue;
      }
      const auto& d = walk.direction[i];
      m_plates.push_back(
          {walk.did[i], retarder(*train.assembly, i)->axis_deg, walk.parity[i], {d[0], d[1], d[2]}});
      m_parts.push_back(identity);
    }
    m_state = train.assembly->light.polarization;
  }

  [[nodiscard]] double leakage(const Axes& axes) const {
    PauliVector k = m_parts.front();
    for (std::size_t i = 0; i < m_plates.size(); ++i)
      k = optics::product(m_parts[i + 1], optics::product(m_plates[i].at(axes[i]), k));
    const optics::Complex crossed = m_crossing[0] * k[1] + m_crossing[1] * k[2] + m_crossing[2] * k[3];
    const double power = optics::through(optics::mueller(k), optics::stokes(m_state))[0];
    return power > 0.0 ? std::norm(crossed) / power : 1.0;
  }

  [[nodiscard]] Axes now() const {
    return {m_plates[0].axis_deg, m_plates.size() > 1 ? m_plates[1].axis_deg : 0.0};
  }

  /// How far the plates must be turned to get there, a plate being the same after half a turn.
  [[nodiscard]] double effort(const Axes& axes) const {
    double sum = 0.0;
    for (std::size_t i = 0; i < m_plates.size(); ++i)
      sum += std::abs(std::remainder(axes[i] - m_plates[i].axis_deg, 180.0));
    return sum;
  }

  [[nodiscard]] Axes refined(Axes axes) const {
    double step = coarse_deg;
    for (int round = 0; round < halvings; ++round) {
      bool moved = false;
      for (std::size_t i = 0; i < m_plates.size(); ++i)
        for (const double move : {step, -step}) {
          Axes next = axes;
          next[i] += move;
          if (leakage(next) < leakage(axes)) {
            axes = next;
            moved = true;
          }
        }
      if (!moved)
        step *= 0.5;
    }
    return axes;
  }

  /// From every dip of a coarse search; the least leakage, of those as good the least effort.
  [[nodiscard]] Axes best() const {
    const bool two = m_plates.size() > 1;
    Axes best = refined(now());
    for (double first = -90.0; first < 90.0; first += coarse_deg)
      for (double second = -90.0; second < 90.0; second += two ? coarse_deg : 180.0) {
        const Axes start{now()[0] + first, now()[1] + (two ? second : 0.0)};
        if (!is_dip(start, two))
          continue;
        const Axes found = refined(start);
        const double gain = leakage(best) - leakage(found);
        if (gain > as_good || (gain > -as_good && effort(found) < effort(best) - 1e-6))
          best = found;
      }
    return best;
  }

private:
  static constexpr PauliVector identity{1.0, 0.0, 0.0, 0.0};

  [[nodiscard]] bool is_dip(const Axes& at, bool two) const {
    const double here = leakage(at);
    for (const double step : {coarse_deg, -coarse_deg}) {
      if (leakage({at[0] + step, at[1]}) < here)
        return false;
      if (two && leakage({at[0], at[1] + step}) < here)
        return false;
    }
    return true;
  }

  std::array<optics::Complex, 3> m_crossing;
  optics::State m_state;
  std::vector<PauliVector> m_parts; ///< products between the plates
  std::vector<Plate> m_plates;
};

/// In (−90, 90].
double as_axis(double degrees_turned) {
  const double axis = std::remainder(degrees_turned, 180.0);
  return axis <= -90.0 ? 90.0 : axis;
}

} // namespace

std::optional<PlateSettings> plate_settings(const trace::Train& train, const ChiefWalk& walk) {
  const optics::State& state = train.assembly->light.polarization;
  const std::vector<std::size_t> stations = plates_of(*train.assembly);
  const bool polarized = std::hypot(state.s1, state.s2, state.s3) > 1.0 - 1e-9;
  if (!polarized || stations.empty() || stations.size() > 2)
    return std::nullopt;
  const Bench bench(train, walk, stations);
  const double now = bench.leakage(bench.now());
  if (!(now > noticeable))
    return std::nullopt;
  const Axes axes = bench.best();
  PlateSettings settings{{}, bench.leakage(axes), now};
  if (!(settings.cross_leakage < 0.5 * now))
    return std::nullopt;
  for (std::size_t i = 0; i < stations.size(); ++i)
    settings.plates.push_back({stations[i], as_axis(axes[i]), bench.now()[i]});
  return settings;
}

} // namespace lightledger::analysis
