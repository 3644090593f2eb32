#include "chief_ray.hpp"

#include "proper_walk.hpp"

#include <cmath>
#include <numbers>

namespace lightledger::analysis {
namespace {

using assembly::Assembly;
using optics::Complex;
using optics::Jones;
using optics::PauliVector;
using trace::RayBlock;
using trace::Train;

constexpr double degrees = 180.0 / std::numbers::pi;

std::vector<trace::PlanOp> opened(const trace::Plan& plan) {
  std::vector<trace::PlanOp> ops = plan.ops;
  for (trace::PlanOp& op : ops) {
    op.clear = trace::ClearKind::unlimited;
    op.hole = 0.0;
  }
  return ops;
}

RayBlock single_ray(const Assembly& assembly, const std::array<double, 2>& launch) {
  RayBlock block{};
  block.count = 1;
  block.alive = 1;
  block.w[0] = 1.0;
  block.p[0][0] = launch[0];
  block.p[1][0] = launch[1];
  trace::Source(assembly.light, assembly.light.fields.front()).aim(block, 0);
  return block;
}

PauliVector first_lane(const PauliLanes& k) {
  PauliVector first;
  for (std::size_t j = 0; j < 4; ++j)
    first[j] = {k.re[j][0], k.im[j][0]};
  return first;
}

/// From the entrance's basis, carried along, to a double-pole one that is ahead by a turn.
Jones into_basis(const ArrivalLanes& arrival, double parity) {
  const double c = arrival.turn_cos[0];
  const double s = arrival.turn_sin[0];
  return {c, s, -parity * s, parity * c};
}

/// Makes the largest element real and positive.
Jones without_phase(const Jones& jones) {
  Complex largest = 0.0;
  for (const Complex element : {jones.xx, jones.xy, jones.yx, jones.yy})
    if (std::abs(element) > std::abs(largest) * (1.0 + 1e-9))
      largest = element;
  if (std::abs(largest) == 0.0)
    return jones;
  return (std::conj(largest) / std::abs(largest)) * jones;
}

/// Keeps a walk's account from station to station.
class ChiefWalker {
public:
  ChiefWalker(const Train& train, RayBlock& block, const std::vector<trace::PlanOp>& ops)
      : m_train(train), m_walk(Optics(train.plans.front().legs, ops), block) {}

  std::optional<ChiefWalk> walk() {
    for (const trace::Path::Step& step : m_train.path.steps) {
      PauliLanes did;
      if (!m_walk.step(step, did))
        return std::nullopt;
      meet(step, first_lane(did));
    }
    return std::move(m_found);
  }

private:
  void meet(const trace::Path::Step& step, const PauliVector& did) {
    const bool at_detector = step.act == trace::Act::detect;
    const trace::Frame& axes =
        at_detector ? m_train.bench.arriving[step.visit] : m_train.bench.leaving[step.visit];
    ArrivalLanes arrival;
    m_walk.arrive(m_train.bench.surface[m_train.assembly->stations[step.visit].surface].axes, axes.axes,
                  arrival);
    if (!at_detector) {
      m_found.did.push_back(did);
      m_product = optics::product(did, m_product);
    }
    const Jones basis = into_basis(arrival, m_walk.parity());
    m_found.so_far.push_back(optics::pauli(basis * optics::jones(m_product)));
    m_found.weight.push_back(arrival.weight[0]);
    m_found.parity.push_back(m_walk.parity());
    const auto& d = m_walk.block().d;
    m_found.direction.push_back({d[0][0], d[1][0], d[2][0]});
    m_found.rotation_deg = degrees * std::atan2(basis.yx.real(), basis.xx.real());
  }

  const Train& m_train;
  ProperWalk m_walk;
  ChiefWalk m_found{};
  PauliVector m_product{1.0, 0.0, 0.0, 0.0};
};

std::optional<double> size(const std::optional<optics::Oriented>& oriented) {
  return oriented ? std::optional(oriented->size) : std::nullopt;
}

ChiefStation describe_station(const Train& train, const ChiefWalk& walk, std::size_t i) {
  const optics::Stokes launched = optics::stokes(train.assembly->light.polarization);
  const optics::Stokes stokes =
      optics::through(optics::mueller(optics::coherency_of(walk.so_far[i], walk.weight[i])), launched);
  return {train.assembly->stations[i].name,       stokes,
          optics::degree_of_polarization(stokes), optics::azimuth_deg(stokes),
          optics::ellipticity_deg(stokes),        size(optics::diattenuation(walk.did[i])),
          size(optics::retardance(walk.did[i]))};
}

} // namespace

std::optional<ChiefWalk> walk_chief(const Train& train) {
  const Assembly& assembly = *train.assembly;
  const trace::Plan& plan = train.plans.front();
  const auto launch = trace::chief_launch(assembly, train.path, plan, assembly.light.fields.front());
  const std::vector<trace::PlanOp> ops = opened(plan);
  RayBlock block = single_ray(assembly, launch);
  return ChiefWalker(train, block, ops).walk();
}

ChiefRay describe_chief(const Train& train, const ChiefWalk& walk) {
  const assembly::Light& light = train.assembly->light;
  const assembly::Field& field = light.fields.front();
  PauliVector proper{1.0, 0.0, 0.0, 0.0};
  for (const PauliVector& did : walk.did)
    proper = optics::product(did, proper);
  const double amplitude = std::sqrt(walk.weight.back());
  const Jones jones = without_phase(amplitude * optics::jones(walk.so_far.back()));
  ChiefRay chief{train.plans.front().wavelength_nm,
                 field.name,
                 field.at,
                 jones,
                 optics::mueller(optics::pauli(jones)),
                 size(optics::diattenuation(proper)),
                 size(optics::retardance(proper)),
                 walk.rotation_deg,
                 {}};
  for (std::size_t i = 0; i < walk.did.size(); ++i)
    chief.stations.push_back(describe_station(train, walk, i));
  return chief;
}

} // namespace lightledger::analysis
