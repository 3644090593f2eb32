#include "support/walk.hpp"

#include <lightledger/assembly/load.hpp>

#include <Eigen/Geometry>
#include <cmath>
#include <memory>
#include <stdexcept>

namespace lightledger::support {

using trace::RayBlock;

assembly::Assembly loaded(const std::string& yaml) {
  assembly::Loaded result = assembly::load_text("test.yaml", yaml);
  if (!result.assembly)
    throw std::runtime_error(result.report());
  return std::move(*result.assembly);
}

Ready ready(const std::string& yaml) {
  auto assembly = std::make_unique<assembly::Assembly>(loaded(yaml));
  assembly::Faults faults;
  auto train = trace::prepare(*assembly, faults);
  if (!train)
    throw std::runtime_error(faults.kept().front().message);
  return {std::move(assembly), std::move(*train)};
}

RayBlock ray(const std::array<double, 3>& point, const std::array<double, 3>& direction) {
  RayBlock block{};
  const double length = std::hypot(direction[0], direction[1], direction[2]);
  const std::array<double, 3> d = {direction[0] / length, direction[1] / length, direction[2] / length};
  const double pull = d[0] / (1.0 + d[2]);
  const std::array<double, 3> u = {1.0 - pull * d[0], -pull * d[1], -d[0]};
  for (std::size_t axis = 0; axis < 3; ++axis) {
    block.p[axis][0] = point[axis];
    block.d[axis][0] = d[axis];
    block.u[axis][0] = u[axis];
  }
  block.J[0][0] = block.J[6][0] = 1.0;
  block.w[0] = 1.0;
  block.alive = 1;
  block.count = 1;
  return block;
}

std::array<double, 3> Walk::hit(std::size_t station, int lane) const {
  const auto& at = tapes.at(station).hit;
  return {at[0][lane], at[1][lane], at[2][lane]};
}

std::array<double, 3> Walk::direction(std::size_t station, int lane) const {
  const auto& d = behind.at(station).d;
  return {d[0][lane], d[1][lane], d[2][lane]};
}

namespace {

Eigen::Vector3d vector(const double (&components)[3][RayBlock::lanes]) {
  return {components[0][0], components[1][0], components[2][0]};
}

} // namespace

Eigen::Matrix3cd polarization_matrix(const trace::Train& train, const Walk& walk, const RayBlock& launched,
                                     std::size_t station) {
  const RayBlock& behind = walk.behind.at(station);
  const Eigen::Matrix3d& axes = train.bench.surface[train.assembly->stations[station].surface].axes;
  const Eigen::Vector3d k_in = vector(launched.d);
  const Eigen::Vector3d x = vector(launched.u);
  const Eigen::Vector3d k_out = vector(behind.d);
  const Eigen::Vector3d u = vector(behind.u);
  Eigen::Matrix3cd jones = Eigen::Matrix3cd::Identity();
  for (int row = 0; row < 2; ++row)
    for (int column = 0; column < 2; ++column)
      jones(row, column) = {behind.J[4 * row + 2 * column][0], behind.J[4 * row + 2 * column + 1][0]};
  Eigen::Matrix3d entrance;
  Eigen::Matrix3d exit;
  entrance << x, k_in.cross(x), k_in;
  exit << u, k_out.cross(u), k_out;
  return (axes * exit).cast<std::complex<double>>() * jones *
         entrance.transpose().cast<std::complex<double>>();
}

std::vector<trace::Path::Step> meetings(const trace::Train& train, const std::vector<trace::Act>& acts) {
  std::vector<trace::Path::Step> steps;
  trace::Hop hop = trace::Onward{train.routes.start(), trace::Routes::launch_leg};
  for (const trace::Act act : acts) {
    const auto& [state, leg] = std::get<trace::Onward>(hop);
    steps.push_back({leg, train.routes.op(*train.assembly, state), state.visit, act});
    hop = train.routes.next(state, act);
  }
  return steps;
}

void follow(const std::vector<trace::Path::Step>& steps, const trace::Plan& plan,
            const optics::Coherency& coherency, RayBlock& block, const Seen& seen) {
  for (const trace::Path::Step& step : steps) {
    if (block.alive == 0)
      return;
    trace::Entry entry;
    trace::Tape tape;
    trace::StepOut out;
    out.entry = &entry;
    out.tape = &tape;
    out.bounces = step.act == trace::Act::bounce;
    (out.bounces ? out.bounce : out.pass) = &block;
    trace::interact(plan.legs[step.leg], plan.ops[step.op], coherency, block, out);
    seen(step, entry, tape);
  }
}

Walk walk(const trace::Train& train, const RayBlock& launched, optics::State state, std::size_t wavelength) {
  const trace::Plan& plan = train.plans.at(wavelength);
  const optics::Coherency coherency = optics::coherency(state);
  Walk walk{{}, {}, trace::Ledger(train.assembly->stations.size())};
  for (int lane = 0; lane < launched.count; ++lane)
    walk.ledger.launched += launched.w[lane];
  RayBlock block = launched;
  follow(trace::intended_path(*train.assembly, train.routes).steps, plan, coherency, block,
         [&](const trace::Path::Step& step, const trace::Entry& entry, const trace::Tape& tape) {
           walk.ledger.enter(step.visit, entry);
           walk.tapes.push_back(tape);
           walk.behind.push_back(block);
         });
  return walk;
}

} // namespace lightledger::support
