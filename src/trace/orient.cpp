#include "lanes.hpp"

#include <algorithm>

namespace lightledger::trace {
namespace {

/// Below this sin² of the angle of incidence k × N is rounding, and any transverse vector serves as s.
constexpr double no_plane_of_incidence = 1e-32;

/// s = unit(k × N), made exactly transverse to k.
void senkrecht(Meeting& m) {
  for (int i = 0; i < m.count; ++i) {
    const double x = m.d[1][i] * m.normal[2][i] - m.d[2][i] * m.normal[1][i];
    const double y = m.d[2][i] * m.normal[0][i] - m.d[0][i] * m.normal[2][i];
    const double z = m.d[0][i] * m.normal[1][i] - m.d[1][i] * m.normal[0][i];
    const double sin1_squared = x * x + y * y + z * z;
    m.sin1_squared[i] = sin1_squared;
    const bool any = sin1_squared < no_plane_of_incidence;
    double sx = any ? m.u[0][i] : x;
    double sy = any ? m.u[1][i] : y;
    double sz = any ? m.u[2][i] : z;
    const double along = sx * m.d[0][i] + sy * m.d[1][i] + sz * m.d[2][i];
    sx -= along * m.d[0][i];
    sy -= along * m.d[1][i];
    sz -= along * m.d[2][i];
    const double scale = 1.0 / std::sqrt(std::max(sx * sx + sy * sy + sz * sz, 1e-300));
    m.s[0][i] = sx * scale;
    m.s[1][i] = sy * scale;
    m.s[2][i] = sz * scale;
  }
}

/// s = unit(A − (A·k) k), the axis of an element projected across the ray.
void project_axis(const PlanOp& op, Meeting& m) {
  for (int i = 0; i < m.count; ++i) {
    m.sin1_squared[i] = m.d[0][i] * m.d[0][i] + m.d[1][i] * m.d[1][i];
    const double along = op.axis[0] * m.d[0][i] + op.axis[1] * m.d[1][i];
    const double sx = op.axis[0] - along * m.d[0][i];
    const double sy = op.axis[1] - along * m.d[1][i];
    const double sz = -along * m.d[2][i];
    const double scale = 1.0 / std::sqrt(std::max(sx * sx + sy * sy + sz * sz, 1e-300));
    m.s[0][i] = sx * scale;
    m.s[1][i] = sy * scale;
    m.s[2][i] = sz * scale;
  }
}

/// cosφ = s·u and sinφ = s·v with v = d × u.
void turn(Meeting& m) {
  for (int i = 0; i < m.count; ++i) {
    const double vx = m.d[1][i] * m.u[2][i] - m.d[2][i] * m.u[1][i];
    const double vy = m.d[2][i] * m.u[0][i] - m.d[0][i] * m.u[2][i];
    const double vz = m.d[0][i] * m.u[1][i] - m.d[1][i] * m.u[0][i];
    const double c = m.s[0][i] * m.u[0][i] + m.s[1][i] * m.u[1][i] + m.s[2][i] * m.u[2][i];
    const double s = m.s[0][i] * vx + m.s[1][i] * vy + m.s[2][i] * vz;
    const double scale = 1.5 - 0.5 * (c * c + s * s);
    m.turn_cos[i] = c * scale;
    m.turn_sin[i] = s * scale;
  }
}

/// n2² cos²θ2 = n2² − n1² sin²θ1, without cancellation at grazing incidence.
void refract(const PlanOp& op, Meeting& m) {
  const double difference = (op.n2 - op.n1) * (op.n2 + op.n1);
  for (int i = 0; i < m.count; ++i) {
    const double n1_cos1 = op.n1 * m.cos1[i];
    const double square = difference + n1_cos1 * n1_cos1;
    m.crosses[i] = mask_of(square > 0.0 && !op.swallows);
    m.cos2[i] = std::min(std::sqrt(std::max(square, 0.0)) / op.n2, 1.0);
  }
}

void go_straight(Meeting& m) {
  for (int i = 0; i < m.count; ++i) {
    m.crosses[i] = mask_of(true);
    m.cos2[i] = m.cos1[i];
  }
}

/// Keeps the basis that the light came with.
void keep(Meeting& m) {
  for (int i = 0; i < m.count; ++i) {
    for (int axis = 0; axis < 3; ++axis)
      m.s[axis][i] = m.u[axis][i];
    m.turn_cos[i] = 1.0;
    m.turn_sin[i] = 0.0;
  }
}

} // namespace

void orient(const PlanOp& op, Meeting& m) {
  switch (op.amplitude) {
  case AmplitudeKind::none:
    senkrecht(m);
    keep(m);
    go_straight(m);
    break;
  case AmplitudeKind::element:
    project_axis(op, m);
    turn(m);
    go_straight(m);
    break;
  default:
    senkrecht(m);
    turn(m);
    refract(op, m);
    break;
  }
}

} // namespace lightledger::trace
