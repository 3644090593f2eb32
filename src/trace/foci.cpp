#include "tree_walk.hpp"

#include <lightledger/optics/index.hpp>
#include <lightledger/trace/foci.hpp>
#include <lightledger/trace/sampling.hpp>

#include <Eigen/Core>
#include <algorithm>
#include <cmath>
#include <numbers>

namespace lightledger::trace {
namespace {

using Eigen::Vector3d;

constexpr double near_surface = 0.1; ///< share of the focal irradiance
constexpr double nm_per_mm = 1e6;
constexpr std::uint64_t rings = 2;
constexpr std::uint64_t spokes = 8;

/// Moments of a bundle of straight rays about its mean ray: the squared rms radius at a distance z along that
/// is a − 2 b z + c z².
struct Bundle {
  double power = 0.0;
  double start = 0.0, end = 0.0; ///< z of the two surfaces
  double a = 0.0, b = 0.0, c = 0.0;

  [[nodiscard]] double waist() const { return b / c; }
  [[nodiscard]] double squared_radius(double z) const {
    return std::max(2.0 * (a - 2.0 * b * z + c * z * z), 0.0);
  }
};

Vector3d vector(const double (&v)[3][RayBlock::lanes], int lane) {
  return {v[0][lane], v[1][lane], v[2][lane]};
}

bool lit(const RayBlock& block, int lane) {
  return ((block.alive >> lane) & 1U) != 0;
}

/// Power of each ray, from its Jones matrix.
double power_of(const RayBlock& block, int lane, const optics::Coherency& phi) {
  double sum = 0.0;
  for (int row = 0; row < 8; row += 4) {
    const optics::Complex x(block.J[row][lane], block.J[row + 1][lane]);
    const optics::Complex y(block.J[row + 2][lane], block.J[row + 3][lane]);
    sum += phi.xx * std::norm(x) + phi.yy * std::norm(y) + 2.0 * std::real(x * std::conj(y) * phi.xy);
  }
  return block.w[lane] * sum;
}

/// The rays of a run that arrive at its end; `index` is that of the medium.
Bundle bundle(const RayBlock& before, const RayBlock& after, double index, const optics::Coherency& phi) {
  Bundle bundle;
  Vector3d mean = Vector3d::Zero();
  Vector3d centre = Vector3d::Zero();
  const auto each = [&](auto visit) {
    for (int lane = 0; lane < before.count; ++lane)
      if (lit(before, lane) && lit(after, lane))
        visit(lane, power_of(before, lane, phi));
  };
  each([&](int lane, double power) {
    bundle.power += power;
    mean += power * vector(before.d, lane);
    centre += power * vector(before.p, lane);
  });
  if (!(bundle.power > 0.0) || !(mean.norm() > 0.0))
    return bundle;
  mean.normalize();
  centre /= bundle.power;
  // Each ray in the plane z = 0 through the centre of the start, and its slope there.
  Vector3d place = Vector3d::Zero();
  Vector3d slope = Vector3d::Zero();
  const auto in_plane = [&](int lane) {
    const Vector3d p = vector(before.p, lane) - centre;
    const Vector3d d = vector(before.d, lane);
    const Vector3d along = d / d.dot(mean);
    return std::pair<Vector3d, Vector3d>(p - p.dot(mean) * along, along - mean);
  };
  each([&](int lane, double power) {
    const auto [q, s] = in_plane(lane);
    place += power / bundle.power * q;
    slope += power / bundle.power * s;
    const double length = (after.opl[lane] - before.opl[lane]) / index;
    const double start = (vector(before.p, lane) - centre).dot(mean);
    bundle.start += power / bundle.power * start;
    bundle.end += power / bundle.power * (start + length * vector(before.d, lane).dot(mean));
  });
  each([&](int lane, double power) {
    const auto [q, s] = in_plane(lane);
    const double share = power / bundle.power;
    bundle.a += share * (q - place).squaredNorm();
    bundle.b -= share * (q - place).dot(s - slope);
    bundle.c += share * (s - slope).squaredNorm();
  });
  return bundle;
}

/// The rays of all replicates in one block.
RayBlock all_rays(const Launcher& launcher, const Pupil& pupil) {
  RayBlock all{};
  RayBlock part;
  for (int replicate = 0; replicate < replicates; ++replicate) {
    launcher.fill(part, replicate, 0, pupil.size());
    for (int lane = 0; lane < part.count; ++lane, ++all.count) {
      const auto copy = [&](const auto& from, auto& to) {
        for (std::size_t k = 0; k < std::size(from); ++k)
          to[k][all.count] = from[k][lane];
      };
      copy(part.p, all.p);
      copy(part.d, all.d);
      copy(part.u, all.u);
      copy(part.J, all.J);
      all.opl[all.count] = part.opl[lane];
      all.w[all.count] = part.w[lane];
      all.alive |= std::uint64_t{1} << all.count;
    }
  }
  return all;
}

void keep_brightest(std::vector<Focus>& foci, std::size_t most) {
  std::ranges::stable_sort(foci, std::ranges::greater{}, &Focus::irradiance_ratio);
  foci.resize(std::min(foci.size(), most));
}

class FocusFinder : public TreeObserver {
public:
  FocusFinder(const TreeSetting& setting, std::size_t field, const RayBlock& launched, std::size_t most)
      : m_setting(setting), m_field(field), m_most(most),
        m_wavelength_mm(setting.train.plans.front().wavelength_nm / nm_per_mm) {
    RayBlock ahead = launched; // the launched beam as if it ran a little on its way
    for (int lane = 0; lane < ahead.count; ++lane)
      ahead.opl[lane] += 1.0;
    const Bundle beam = bundle(launched, ahead, 1.0, setting.coherency);
    m_launched_power = beam.power;
    m_launched_squared = beam.squared_radius(0.0);
  }

  void see(const Run& run) override {
    const PlanLeg& leg = m_setting.train.plans.front().legs[run.leg];
    const Bundle beam = bundle(run.before, run.after, leg.index, m_setting.coherency);
    const double least_slope = 1e-12;
    if (leg.launch || !(beam.c > least_slope))
      return;
    const double smallest = m_wavelength_mm / (std::numbers::pi * leg.index * std::sqrt(2.0 * beam.c));
    const auto radius = [&](double z) { return std::max(std::sqrt(beam.squared_radius(z)), smallest); };
    const double waist = beam.waist();
    const double focal = radius(waist);
    const bool within = waist >= beam.start && waist <= beam.end;
    const auto near = [&](double z) { return focal * focal >= near_surface * radius(z) * radius(z); };
    Focus focus{
        states(run), m_field, {}, run.junction.state.visit, Focus::Where::between, medium(run.leg), 0.0,
        0.0,         0.0,     0.0};
    if (const Leg& route = m_setting.train.routes.legs()[run.leg]; !route.launch)
      focus.from = came_from(run);
    double z = waist;
    if (!within || gas(focus.medium)) {
      const bool at_end = std::abs(waist - beam.end) <= std::abs(waist - beam.start);
      z = at_end ? beam.end : beam.start;
      if (!near(z))
        return;
      focus.where = at_end ? Focus::Where::at_to : Focus::Where::at_from;
    }
    focus.distance_mm = z - beam.start;
    focus.power = beam.power / m_launched_power;
    focus.radius_mm = radius(z);
    focus.irradiance_ratio = focus.power * m_launched_squared / (focus.radius_mm * focus.radius_mm);
    if (!(focus.irradiance_ratio > 1.0))
      return;
    found.push_back(std::move(focus));
    if (found.size() >= 16 * m_most)
      keep_brightest(found, m_most);
  }

  std::vector<Focus> found;

private:
  [[nodiscard]] std::vector<State> states(const Run& run) const {
    std::vector<State> states;
    for (const PathTree::JunctionId id : run.bounced)
      states.push_back(m_setting.tree.junction(id).state);
    return states;
  }
  [[nodiscard]] assembly::MediumId medium(LegId leg) const {
    return m_setting.train.routes.legs()[leg].medium;
  }
  [[nodiscard]] StationId came_from(const Run& run) const {
    const State state = run.junction.state;
    if (state.face != Face::front)
      return state.visit;
    return state.heading == Heading::along ? state.visit - 1 : state.visit + 1;
  }
  [[nodiscard]] bool gas(assembly::MediumId medium) const {
    const auto index = optics::index_at(m_setting.train.assembly->media[medium],
                                        m_setting.train.plans.front().wavelength_nm);
    return index && optics::gas(*index);
  }

  const TreeSetting& m_setting;
  std::size_t m_field, m_most;
  double m_wavelength_mm;
  double m_launched_power, m_launched_squared;
};

} // namespace

std::vector<Focus> hot_foci(const Train& train, const PathTree& tree, double floor, std::size_t most) {
  assembly::Light light = train.assembly->light;
  light.sampling = assembly::Rings{rings, spokes};
  const Pupil pupil(light);
  const TreeSetting setting(train, tree, floor);
  std::vector<Focus> foci;
  for (const Group& group : groups(train, pupil)) {
    if (group.wavelength != 0)
      continue;
    const RayBlock block = all_rays(group.launcher, pupil);
    if (block.alive == 0)
      continue;
    FocusFinder finder(setting, group.field, block, most);
    TreeFound unused;
    TreeWalk(setting, 0, unused, &finder).run(block);
    foci.insert(foci.end(), std::make_move_iterator(finder.found.begin()),
                std::make_move_iterator(finder.found.end()));
  }
  keep_brightest(foci, most);
  return foci;
}

} // namespace lightledger::trace
