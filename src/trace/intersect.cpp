#include "asphere.hpp"
#include "lanes.hpp"

#include <algorithm>
#include <limits>

namespace lightledger::trace {
namespace {

/// The point of each ray nearest to the vertex, from which distances along the ray are small and accurate.
struct Nearest {
  Lanes o[3];
  Lanes ahead; ///< from p to o along the ray
};

void transfer(const PlanLeg& leg, const RayBlock& in, Meeting& m) {
  for (int i = 0; i < m.count; ++i)
    m.alive[i] = mask_of(((in.alive >> i) & 1U) != 0);
  for (int row = 0; row < 3; ++row) {
    const auto& [rx, ry, rz] = leg.rotation[row];
    for (int i = 0; i < m.count; ++i) {
      m.p[row][i] = rx * in.p[0][i] + ry * in.p[1][i] + rz * in.p[2][i] + leg.shift[row];
      m.d[row][i] = rx * in.d[0][i] + ry * in.d[1][i] + rz * in.d[2][i];
      m.u[row][i] = rx * in.u[0][i] + ry * in.u[1][i] + rz * in.u[2][i];
    }
  }
  // One Newton step towards unit length keeps rounding from growing along the train.
  for (int i = 0; i < m.count; ++i) {
    const double length_squared = m.d[0][i] * m.d[0][i] + m.d[1][i] * m.d[1][i] + m.d[2][i] * m.d[2][i];
    const double correction = 1.5 - 0.5 * length_squared;
    for (auto& d : m.d)
      d[i] *= correction;
  }
}

void advance(Meeting& m, const Nearest& nearest, const Lanes& t) {
  for (int i = 0; i < m.count; ++i) {
    m.path[i] = t[i] + nearest.ahead[i];
    for (int axis = 0; axis < 3; ++axis)
      m.p[axis][i] = nearest.o[axis][i] + t[i] * m.d[axis][i];
  }
}

void find_nearest(const Meeting& m, Nearest& nearest) {
  for (int i = 0; i < m.count; ++i) {
    const double along = m.p[0][i] * m.d[0][i] + m.p[1][i] * m.d[1][i] + m.p[2][i] * m.d[2][i];
    nearest.ahead[i] = -along;
    for (int axis = 0; axis < 3; ++axis)
      nearest.o[axis][i] = m.p[axis][i] - along * m.d[axis][i];
  }
}

void meet_plane(Meeting& m) {
  for (int i = 0; i < m.count; ++i) {
    const double t = -m.p[2][i] / m.d[2][i];
    const bool found = std::abs(t) < std::numeric_limits<double>::max();
    m.hit[i] = m.alive[i] & mask_of(found);
    m.path[i] = found ? t : 0.0;
    m.p[0][i] += m.path[i] * m.d[0][i];
    m.p[1][i] += m.path[i] * m.d[1][i];
    m.p[2][i] = 0.0;
    m.normal[0][i] = m.normal[1][i] = 0.0;
    m.normal[2][i] = 1.0;
  }
}

/// Roots of a t² + 2 b t + c = 0 for c(x² + y² + (1+K) z²) = 2 z on the ray o + t d. Of those before the
/// equator the one whose |z| is smaller is the nearer to the tangent plane along the ray.
void meet_conic(const PlanOp& op, const Meeting& m, const Nearest& nearest, Lanes& t, Mask& found) {
  const double curvature = op.curvature;
  const double stretch = 1.0 + op.conic;
  for (int i = 0; i < m.count; ++i) {
    const double ox = nearest.o[0][i];
    const double oy = nearest.o[1][i];
    const double oz = nearest.o[2][i];
    const double dz = m.d[2][i];
    const double a = curvature * (1.0 + op.conic * dz * dz);
    const double b = curvature * (ox * m.d[0][i] + oy * m.d[1][i] + stretch * oz * dz) - dz;
    const double c = curvature * (ox * ox + oy * oy + stretch * oz * oz) - 2.0 * oz;
    const double discriminant = b * b - a * c;
    const double root = std::sqrt(std::max(discriminant, 0.0));
    const double q = -(b + std::copysign(root, b));
    const double t1 = c / q;
    const double t2 = q / a;
    const double z1 = oz + t1 * dz;
    const double z2 = oz + t2 * dz;
    // Comparisons with a quotient that is infinite or not a number are false, so such a root does not count.
    const bool first = stretch * curvature * z1 < 1.0 && std::abs(t1) < std::numeric_limits<double>::max();
    const bool second = stretch * curvature * z2 < 1.0 && std::abs(t2) < std::numeric_limits<double>::max();
    const bool take_second = second && (!first || std::abs(z2) < std::abs(z1));
    const bool any = discriminant >= 0.0 && (first || second);
    t[i] = any ? (take_second ? t2 : t1) : 0.0;
    found[i] = mask_of(any);
  }
}

void conic_normal(const PlanOp& op, Meeting& m) {
  for (int i = 0; i < m.count; ++i) {
    const double x = -op.curvature * m.p[0][i];
    const double y = -op.curvature * m.p[1][i];
    const double z = 1.0 - (1.0 + op.conic) * op.curvature * m.p[2][i];
    const double scale = 1.0 / std::sqrt(std::max(x * x + y * y + z * z, std::numeric_limits<double>::min()));
    m.normal[0][i] = x * scale;
    m.normal[1][i] = y * scale;
    m.normal[2][i] = z * scale;
  }
}

void meet_asphere(const PlanOp& op, Meeting& m) {
  Nearest nearest;
  Lanes t;
  find_nearest(m, nearest);
  for (int i = 0; i < m.count; ++i) {
    const AsphereRay ray{{nearest.o[0][i], nearest.o[1][i], nearest.o[2][i]},
                         {m.d[0][i], m.d[1][i], m.d[2][i]}};
    const AsphereHit end = meet(op, ray);
    t[i] = end.found ? end.t : 0.0;
    m.hit[i] = m.alive[i] & mask_of(end.found);
  }
  advance(m, nearest, t);
  for (int i = 0; i < m.count; ++i) {
    const double r_squared = m.p[0][i] * m.p[0][i] + m.p[1][i] * m.p[1][i];
    const double slope = sag(op, r_squared).slope_over_r;
    const double scale = 1.0 / std::sqrt(1.0 + slope * slope * r_squared);
    m.normal[0][i] = -slope * m.p[0][i] * scale;
    m.normal[1][i] = -slope * m.p[1][i] * scale;
    m.normal[2][i] = scale;
  }
}

/// Turns the normals toward which the rays go, and measures the angle of incidence.
void face(Meeting& m) {
  for (int i = 0; i < m.count; ++i) {
    double cosine = 0.0;
    for (int axis = 0; axis < 3; ++axis)
      cosine += m.d[axis][i] * m.normal[axis][i];
    const double sign = std::copysign(1.0, cosine);
    for (auto& component : m.normal)
      component[i] *= sign;
    m.cos1[i] = std::min(std::abs(cosine), 1.0);
  }
}

} // namespace

void intersect(const PlanLeg& leg, const PlanOp& op, const RayBlock& in, Meeting& m) {
  m.count = in.count;
  transfer(leg, in, m);
  switch (op.shape) {
  case ShapeKind::plane:
    meet_plane(m);
    break;
  case ShapeKind::conic: {
    Nearest nearest;
    Lanes t;
    Mask found;
    find_nearest(m, nearest);
    meet_conic(op, m, nearest, t, found);
    for (int i = 0; i < m.count; ++i)
      m.hit[i] = m.alive[i] & found[i];
    advance(m, nearest, t);
    conic_normal(op, m);
    break;
  }
  case ShapeKind::asphere:
    meet_asphere(op, m);
    break;
  }
  face(m);
}

void clip(const PlanOp& op, Meeting& m) {
  const double hole_squared = op.hole * op.hole;
  const double scale_x = op.clear_x > 0.0 ? 1.0 / op.clear_x : 0.0;
  const double scale_y = op.clear_y > 0.0 ? 1.0 / op.clear_y : 0.0;
  for (int i = 0; i < m.count; ++i) {
    const double x = m.p[0][i] - op.centre[0];
    const double y = m.p[1][i] - op.centre[1];
    const double r_squared = x * x + y * y;
    bool open = true;
    switch (op.clear) {
    case ClearKind::unlimited:
      break;
    case ClearKind::disc:
      open = r_squared <= op.clear_x * op.clear_x;
      break;
    case ClearKind::rectangle:
      open = std::abs(x) <= op.clear_x && std::abs(y) <= op.clear_y;
      break;
    case ClearKind::ellipse:
      open = x * x * scale_x * scale_x + y * y * scale_y * scale_y <= 1.0;
      break;
    }
    m.inside[i] = m.hit[i] & mask_of(open && r_squared >= hole_squared);
  }
}

} // namespace lightledger::trace
