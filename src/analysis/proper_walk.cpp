#include "proper_walk.hpp"

#include <algorithm>
#include <bit>

namespace lightledger::analysis {
namespace {

using trace::RayBlock;

/// Against z the smallest rotation has no axis of its own; any will do.
constexpr double least_forward = 1e-12;

void double_pole_x(const double d[3], double x[3]) {
  const double pull = d[0] / std::max(1.0 + d[2], least_forward);
  x[0] = 1.0 - pull * d[0];
  x[1] = -pull * d[1];
  x[2] = -d[0];
}

bool rotates(const trace::PlanOp& op) {
  return op.amplitude == trace::AmplitudeKind::element && (op.turn[0] != 1.0 || op.turn[1] != 0.0);
}

} // namespace

Eigen::Vector3d double_pole_x(const Eigen::Vector3d& direction) {
  Eigen::Vector3d x;
  double_pole_x(direction.data(), x.data());
  return x;
}

ProperWalk::ProperWalk(const Optics& optics, RayBlock& block) : m_optics(optics), m_block(block) {
  std::fill_n(m_cos, lanes, 1.0);
  std::fill_n(m_sin, lanes, 0.0);
}

bool ProperWalk::step(const trace::Path::Step& step, PauliLanes& did) {
  const trace::PlanOp& op = m_optics.ops[step.op];
  trace::StepOut out;
  out.tape = &m_tape;
  out.bounces = step.act == trace::Act::bounce;
  (out.bounces ? out.bounce : out.pass) = &m_block;
  trace::interact(m_optics.legs[step.leg], op, optics::Coherency{}, m_block, out);
  turn_by(m_parity);
  act(out.bounces, did);
  if (rotates(op))
    rotate(op, did);
  if (out.bounces)
    m_parity = -m_parity;
  return m_block.alive != 0;
}

/// From the azimuth of u to that of s.
void ProperWalk::turn_by(double sign) {
  for (int i = 0; i < lanes; ++i) {
    const double c = m_tape.turn_cos[i];
    const double s = sign * m_tape.turn_sin[i];
    const double cosine = c * m_cos[i] - s * m_sin[i];
    m_sin[i] = c * m_sin[i] + s * m_cos[i];
    m_cos[i] = cosine;
  }
}

void ProperWalk::act(bool bounces, PauliLanes& did) {
  const double sign = bounces ? -1.0 : 1.0;
  for (int i = 0; i < lanes; ++i) {
    const double c2 = m_cos[i] * m_cos[i] - m_sin[i] * m_sin[i];
    const double s2 = 2.0 * m_cos[i] * m_sin[i];
    const double half_re = 0.5 * (m_tape.a_s[0][i] - sign * m_tape.a_p[0][i]);
    const double half_im = 0.5 * (m_tape.a_s[1][i] - sign * m_tape.a_p[1][i]);
    did.re[0][i] = 0.5 * (m_tape.a_s[0][i] + sign * m_tape.a_p[0][i]);
    did.im[0][i] = 0.5 * (m_tape.a_s[1][i] + sign * m_tape.a_p[1][i]);
    did.re[1][i] = half_re * c2;
    did.im[1][i] = half_im * c2;
    did.re[2][i] = half_re * s2;
    did.im[2][i] = half_im * s2;
    did.re[3][i] = did.im[3][i] = 0.0;
  }
}

/// A rotator lets both components through alike, and turns the field together with the ray's basis.
void ProperWalk::rotate(const trace::PlanOp& op, PauliLanes& did) {
  const double sine = m_parity * op.turn[1];
  for (int i = 0; i < lanes; ++i) {
    did.re[0][i] = op.turn[0];
    did.im[3][i] = -sine;
    m_tape.turn_cos[i] = op.turn[0];
    m_tape.turn_sin[i] = op.turn[1];
  }
  turn_by(m_parity);
}

void ProperWalk::arrive(const Eigen::Matrix3d& here, const Eigen::Matrix3d& axes,
                        ArrivalLanes& arrival) const {
  const Eigen::Matrix3d into = axes.transpose() * here;
  double r[3][3];
  for (int row = 0; row < 3; ++row)
    for (int column = 0; column < 3; ++column)
      r[row][column] = into(row, column);
  for (int i = 0; i < m_block.count; ++i) {
    double d[3];
    double u[3];
    for (int row = 0; row < 3; ++row) {
      d[row] = r[row][0] * m_block.d[0][i] + r[row][1] * m_block.d[1][i] + r[row][2] * m_block.d[2][i];
      u[row] = r[row][0] * m_block.u[0][i] + r[row][1] * m_block.u[1][i] + r[row][2] * m_block.u[2][i];
    }
    double x[3];
    double_pole_x(d, x);
    const double along_u = x[0] * u[0] + x[1] * u[1] + x[2] * u[2];
    const double along_v =
        m_parity * (x[0] * (d[1] * u[2] - d[2] * u[1]) + x[1] * (d[2] * u[0] - d[0] * u[2]) +
                    x[2] * (d[0] * u[1] - d[1] * u[0]));
    arrival.weight[i] = m_block.w[i];
    arrival.turn_cos[i] = along_u * m_cos[i] - along_v * m_sin[i];
    arrival.turn_sin[i] = along_u * m_sin[i] + along_v * m_cos[i];
  }
}

void ProperRays::follow(const trace::Train& train, const Optics& optics, RayBlock& block) {
  count = arrived = 0;
  ProperWalk walk(optics, block);
  const std::size_t stations = train.path.steps.size() - 1;
  did.resize(stations);
  PauliLanes detected;
  for (std::size_t i = 0; i <= stations; ++i)
    if (block.alive == 0 || !walk.step(train.path.steps[i], i < stations ? did[i] : detected))
      return;
  const std::size_t detector = train.path.steps.back().visit;
  walk.arrive(train.bench.surface[train.assembly->stations[detector].surface].axes,
              train.bench.arriving[detector].axes, arrival);
  parity = walk.parity();
  close_gaps(block.alive, block);
}

void ProperRays::close_gaps(std::uint64_t alive, const RayBlock& block) {
  for (std::uint64_t rest = alive; rest != 0; rest &= rest - 1)
    lane[count++] = std::countr_zero(rest);
  arrived = count;
  for (; count % strip != 0; ++count)
    lane[count] = lane[0];
  const auto move = [&](LaneArray& values) {
    if (arrived == block.count && count == arrived)
      return;
    LaneArray moved;
    for (int i = 0; i < count; ++i)
      moved[i] = values[lane[i]];
    std::copy_n(moved, count, values);
  };
  for (PauliLanes& k : did)
    for (int j = 0; j < 4; ++j) {
      move(k.re[j]);
      move(k.im[j]);
    }
  for (LaneArray* values : {&arrival.weight, &arrival.turn_cos, &arrival.turn_sin})
    move(*values);
  std::fill(arrival.weight + arrived, arrival.weight + count, 0.0);
}

} // namespace lightledger::analysis
