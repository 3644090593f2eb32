#include "reference/ghosts.hpp"

#include "reference/disc.hpp"
#include "reference/launch.hpp"

#include <numeric>

namespace lightledger::reference {
namespace {

using assembly::Act;
using assembly::Assembly;
using assembly::Side;
using assembly::Station;
using assembly::Surface;

Side other(Side side) {
  return side == Side::before ? Side::beyond : Side::before;
}

double reflectance(const Assembly& assembly) {
  return std::get<assembly::Sensor>(assembly.surfaces[assembly.stations.back().surface].effect).reflectance;
}

/// The detector as an interface between equal media, coated to reflect.
assembly::SurfaceId add_reflecting_detector(Assembly& assembly) {
  const double reflect = reflectance(assembly);
  Surface twin = assembly.surfaces[assembly.stations.back().surface];
  twin.effect = assembly::Interface{};
  twin.beyond = twin.before;
  twin.coating = {static_cast<assembly::CoatingId>(assembly.coatings.size()), Side::beyond};
  assembly.coatings.push_back(
      {"detector", assembly::Ideal{{reflect, 1.0 - reflect}, {reflect, 1.0 - reflect}}});
  assembly.surfaces.push_back(twin);
  return static_cast<assembly::SurfaceId>(assembly.surfaces.size() - 1);
}

/// Walks the train in all ways.
class Explorer {
public:
  Explorer(GhostPaths& all, const Bench& bench) : m_all(all), m_bench(bench) {
    m_reflecting_detector = add_reflecting_detector(m_all.assembly);
  }

  void explore(int station, int heading, int left) {
    if (station < 0 || station >= static_cast<int>(m_bench.stations.size()))
      return;
    const auto i = static_cast<std::size_t>(station);
    const Station& visit = m_all.assembly.stations[i];
    const Place& place = m_bench.stations[i];
    const Surface& surface = m_all.assembly.surfaces[visit.surface];
    const bool mirror = visit.intended == Act::bounce;
    const Side side = heading > 0 || mirror ? place.from : other(place.from);
    const Encounter here{visit.surface, place.surface, side, visit.intended};
    if (visit.intended == Act::detect) {
      with(here, [&] {
        if (!m_path.bounces.empty())
          m_all.paths.push_back(m_path);
      });
      if (left > 0 && reflectance(m_all.assembly) > 0.0)
        bouncing(visit.name, {m_reflecting_detector, place.surface, side, Act::bounce},
                 [&] { explore(station - heading, -heading, left - 1); });
      return;
    }
    with(here, [&] { explore(station + heading, heading, left); });
    if (mirror && surface.rear)
      with({visit.surface, place.surface, side, Act::pass}, [&] { in_plate(station, heading, left); });
    if (!mirror && left > 0 && std::holds_alternative<assembly::Interface>(surface.effect))
      bouncing(visit.name, {visit.surface, place.surface, side, Act::bounce},
               [&] { explore(station - heading, -heading, left - 1); });
  }

private:
  /// From behind a front to the rear face, and from there to the front.
  void in_plate(int station, int heading, int left) {
    if (left == 0)
      return;
    const Station& visit = m_all.assembly.stations[static_cast<std::size_t>(station)];
    const Place& place = m_bench.stations[static_cast<std::size_t>(station)];
    const assembly::Rear rear = *m_all.assembly.surfaces[visit.surface].rear;
    const Side inside = other(place.from);
    bouncing(visit.name + " rear", {rear.surface, place.rear, Side::before, Act::bounce}, [&] {
      with({visit.surface, place.surface, inside, Act::pass},
           [&] { explore(station + heading, heading, left - 1); });
      if (left > 1)
        bouncing(visit.name, {visit.surface, place.surface, inside, Act::bounce},
                 [&] { in_plate(station, heading, left - 2); });
    });
  }

  template <class Further>
  void with(const Encounter& encounter, Further further) {
    m_path.encounters.push_back(encounter);
    further();
    m_path.encounters.pop_back();
  }

  template <class Further>
  void bouncing(const std::string& name, const Encounter& encounter, Further further) {
    m_path.bounces.push_back(name);
    with(encounter, further);
    m_path.bounces.pop_back();
  }

  GhostPaths& m_all;
  const Bench& m_bench;
  assembly::SurfaceId m_reflecting_detector;
  GhostPath m_path;
};

template <class List>
double weights(const List& list) {
  return std::accumulate(list.begin(), list.end(), 0.0,
                         [](double sum, const auto& item) { return sum + item.weight; });
}

/// ⟨E E†⟩ of an arriving ray of this power in its double-pole basis about the axis.
Eigen::Matrix2cd arriving(const Step& step, const Ray& launched, const optics::State& state,
                          const Frame& axis) {
  const auto entrance = double_pole_basis(launched.direction);
  const Eigen::Matrix3cd light = entrance * coherency_matrix(state) * entrance.transpose();
  const Eigen::Matrix<double, 3, 2> exit =
      axis.axes * double_pole_basis(axis.axes.transpose() * step.direction);
  const Eigen::Matrix2cd field = exit.transpose() * step.P * light * step.P.adjoint() * exit;
  return field / field.trace().real() * step.onward;
}

} // namespace

GhostPaths ghost_paths(const Assembly& assembly, const Bench& bench, int bounces) {
  GhostPaths all{assembly, {}};
  Explorer(all, bench).explore(0, 1, bounces);
  return all;
}

GhostSums ghost_sums(const GhostPaths& all, const GhostPath& path, const Bench& bench) {
  const assembly::Light& light = all.assembly.light;
  const double launched = weights(light.wavelengths) * weights(light.fields);
  GhostSums sums;
  for (const assembly::Wavelength& wavelength : light.wavelengths)
    for (const assembly::Field& field : light.fields)
      for (const DiscPoint& point : disc_points(light.beam, light.sampling)) {
        const Ray ray = launch(light, field, point.at);
        const RayRecord record = follow(path.encounters, all.assembly, wavelength.nm, ray);
        sums.comparable = sums.comparable && record.comparable();
        if (!(record.delivered > 0.0))
          continue;
        const Step& end = record.steps.back();
        const double share = wavelength.weight * field.weight / launched * point.share;
        const Eigen::Matrix2cd light_there =
            share * arriving(end, ray, light.polarization, bench.stations.back().arriving);
        const double power = share * record.delivered;
        sums.power += power;
        sums.s1 += (light_there(0, 0) - light_there(1, 1)).real();
        sums.s2 += 2.0 * light_there(0, 1).real();
        sums.s3 -= 2.0 * light_there(0, 1).imag();
        sums.x += power * end.local_point.x();
        sums.y += power * end.local_point.y();
        sums.optical_path += power * end.optical_path;
      }
  return sums;
}

} // namespace lightledger::reference
