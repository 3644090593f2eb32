#include "polarization_table.hpp"
#include "proper_walk.hpp"

#include <algorithm>
#include <cmath>

namespace lightledger::analysis {
namespace {

using optics::PauliVector;
using trace::RayBlock;

constexpr std::size_t across = 101;

PauliVector lane_of(const PauliLanes& k, int lane) {
  PauliVector vector;
  for (std::size_t j = 0; j < 4; ++j)
    vector[j] = {k.re[j][lane], k.im[j][lane]};
  return vector;
}

/// The part of the launch plane that a footprint covers.
PupilMap empty_map(const trace::Train& train, std::size_t field) {
  const trace::Footprint& footprint = train.footprints[field];
  PupilMap map{};
  map.field = field;
  map.wavelength_nm = train.plans.front().wavelength_nm;
  const auto half = [&](std::size_t axis) {
    return std::hypot(footprint.first[axis], footprint.second[axis]);
  };
  map.x_from = footprint.centre[0] - half(0);
  map.x_to = footprint.centre[0] + half(0);
  map.y_from = footprint.centre[1] - half(1);
  map.y_to = footprint.centre[1] + half(1);
  map.columns = map.rows = across;
  map.points.resize(across * across);
  return map;
}

/// Fills a map block by block.
class Mapper {
public:
  Mapper(const trace::Train& train, std::size_t field)
      : m_train(train), m_source(train.assembly->light, train.assembly->light.fields[field]),
        m_footprint(train.footprints[field]), m_map(empty_map(train, field)) {
    const assembly::Beam& beam = train.assembly->light.beam;
    const double inner = beam.fill_stop ? 0.0 : beam.inner / beam.radius;
    m_inner_squared = inner * inner;
  }

  PupilMap map() && {
    RayBlock block{};
    for (std::size_t cell = 0; cell < m_map.points.size(); ++cell) {
      add(block, cell);
      if (block.count == RayBlock::lanes)
        follow(block);
    }
    follow(block);
    return std::move(m_map);
  }

private:
  void add(RayBlock& block, std::size_t cell) {
    const double column = (static_cast<double>(cell % across) + 0.5) / static_cast<double>(across);
    const double row = (static_cast<double>(cell / across) + 0.5) / static_cast<double>(across);
    const double x = m_map.x_from + column * (m_map.x_to - m_map.x_from);
    const double y = m_map.y_from + row * (m_map.y_to - m_map.y_from);
    if (!is_lit(x, y))
      return;
    const int lane = block.count++;
    m_cell[lane] = cell;
    block.p[0][lane] = x;
    block.p[1][lane] = y;
    block.p[2][lane] = block.opl[lane] = 0.0;
    block.w[lane] = 1.0;
    block.alive |= std::uint64_t{1} << lane;
    m_source.aim(block, lane);
  }

  /// Whether a point lies on the footprint's ellipse, and outside its hole.
  [[nodiscard]] bool is_lit(double x, double y) const {
    const auto& [centre, first, second] = m_footprint;
    const double determinant = first[0] * second[1] - first[1] * second[0];
    if (determinant == 0.0)
      return false;
    const double dx = x - centre[0];
    const double dy = y - centre[1];
    const double a = (dx * second[1] - dy * second[0]) / determinant;
    const double b = (dy * first[0] - dx * first[1]) / determinant;
    const double r_squared = a * a + b * b;
    return r_squared <= 1.0 && r_squared >= m_inner_squared;
  }

  void follow(RayBlock& block) {
    m_rays.follow(m_train, Optics(m_train.plans.front()), block);
    for (int ray = 0; ray < m_rays.arrived; ++ray) {
      PauliVector k{1.0, 0.0, 0.0, 0.0};
      for (const PauliLanes& did : m_rays.did)
        k = optics::product(lane_of(did, ray), k);
      m_map.points[m_cell[m_rays.lane[ray]]] = point(k, m_rays.arrival.weight[ray]);
    }
    block.count = 0;
    block.alive = 0;
  }

  [[nodiscard]] std::optional<PupilMap::Point> point(const PauliVector& k, double weight) const {
    const optics::State& state = m_train.assembly->light.polarization;
    const optics::Mueller m = optics::mueller(k);
    const auto diattenuation = optics::diattenuation(k);
    if (!diattenuation)
      return std::nullopt;
    PupilMap::Point point{weight * m[0][0],
                          diattenuation->size,
                          optics::azimuth_of(diattenuation->axis[0], diattenuation->axis[1]),
                          {},
                          {},
                          {}};
    if (const auto retardance = optics::retardance(k)) {
      point.retardance_deg = retardance->size;
      point.retardance_axis_deg = optics::azimuth_of(retardance->axis[0], retardance->axis[1]);
    }
    const double power = optics::through(m, optics::stokes(state))[0];
    if (std::hypot(state.s1, state.s2, state.s3) > 1.0 - 1e-9 && power > 0.0) {
      const auto t = optics::crossing(state);
      point.cross_leakage = std::norm(t[0] * k[1] + t[1] * k[2] + t[2] * k[3]) / power;
    }
    return point;
  }

  const trace::Train& m_train;
  trace::Source m_source;
  const trace::Footprint& m_footprint;
  PupilMap m_map;
  double m_inner_squared;
  ProperRays m_rays;
  std::size_t m_cell[RayBlock::lanes];
};

} // namespace

std::vector<PupilMap> pupil_maps(const trace::Train& train) {
  std::vector<PupilMap> maps;
  for (std::size_t field = 0; field < train.footprints.size(); ++field)
    maps.push_back(Mapper(train, field).map());
  return maps;
}

} // namespace lightledger::analysis
