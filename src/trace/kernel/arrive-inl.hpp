// A block of rays comes to a surface: transfer, intersection, aperture, basis, direction beyond. Included
// once an instruction set.
#if defined(LIGHTLEDGER_ARRIVE_INL) == defined(HWY_TARGET_TOGGLE)
#ifdef LIGHTLEDGER_ARRIVE_INL
#undef LIGHTLEDGER_ARRIVE_INL
#else
#define LIGHTLEDGER_ARRIVE_INL
#endif

#include "asphere-inl.hpp"
#include "elementary-inl.hpp"
#include "meeting.hpp"
#include "shapes-inl.hpp"

HWY_BEFORE_NAMESPACE();
namespace lightledger::trace::HWY_NAMESPACE {

/// Below this sin² of the angle of incidence any transverse vector serves as s: r_s + r_p is of the order of
/// sin², and a unit vector along k × N leaves the transverse plane by rounding/sin, of which only the square
/// counts.
inline constexpr double no_plane_of_incidence = 1e-16;

template <LegKind Leg>
HWY_INLINE Ray transfer(const PlanLeg& leg, const RayBlock& in, int i) {
  const V p[3] = {load(in.p[0] + i), load(in.p[1] + i), load(in.p[2] + i)};
  const V d[3] = {load(in.d[0] + i), load(in.d[1] + i), load(in.d[2] + i)};
  const V u[3] = {load(in.u[0] + i), load(in.u[1] + i), load(in.u[2] + i)};
  if constexpr (Leg == LegKind::along_z)
    return {{p[0], p[1], p[2] + set(leg.shift[2])}, {d[0], d[1], d[2]}, {u[0], u[1], u[2]}};
  Ray ray;
  for (int row = 0; row < 3; ++row) {
    const V x = set(leg.rotation[row][0]);
    const V y = set(leg.rotation[row][1]);
    const V z = set(leg.rotation[row][2]);
    ray.p[row] = fma(x, p[0], fma(y, p[1], fma(z, p[2], set(leg.shift[row]))));
    ray.d[row] = fma(x, d[0], fma(y, d[1], z * d[2]));
    ray.u[row] = fma(x, u[0], fma(y, u[1], z * u[2]));
  }
  // One Newton step towards unit length keeps rounding from growing along the train.
  const V correction = fnma(set(0.5), dot(ray.d, ray.d), set(1.5));
  for (V& d_row : ray.d)
    d_row = d_row * correction;
  return ray;
}

/// Rays inside the clear area, the edge included.
HWY_INLINE M open_at(const PlanOp& op, V px, V py) {
  const V x = px - set(op.centre[0]);
  const V y = py - set(op.centre[1]);
  const V r_squared = fma(x, x, y * y);
  const M beside_hole = set(op.hole * op.hole) <= r_squared;
  switch (op.clear) {
  case ClearKind::unlimited:
    return beside_hole;
  case ClearKind::disc:
    return both(beside_hole, r_squared <= set(op.clear_x * op.clear_x));
  case ClearKind::rectangle:
    return both(beside_hole, both(abs(x) <= set(op.clear_x), abs(y) <= set(op.clear_y)));
  case ClearKind::ellipse: {
    const V across = x * set(1.0 / op.clear_x);
    const V up = y * set(1.0 / op.clear_y);
    return both(beside_hole, fma(across, across, up * up) <= set(1.0));
  }
  }
  return beside_hole;
}

struct Basis {
  V s[3];
  V turn_cos, turn_sin; ///< from (u, v) to (s, p)
  V sin_squared;        ///< of the angle of incidence
};

/// s = unit(k × N), and the turn: s·u = (k × N)·u/sinθ, s·v = (N − cosθ k)·u/sinθ.
HWY_INLINE Basis senkrecht(const Ray& ray, const Hit& hit) {
  V m[3];
  cross(ray.d, hit.normal, m);
  const V along = dot(m, ray.u);
  V across = (hit.normal[0] - hit.cosine * ray.d[0]) * ray.u[0];
  across = fma(fnma(hit.cosine, ray.d[1], hit.normal[1]), ray.u[1], across);
  across = fma(fnma(hit.cosine, ray.d[2], hit.normal[2]), ray.u[2], across);
  const V sin_squared = fma(along, along, across * across);
  const M none = sin_squared < set(no_plane_of_incidence);
  const V scale = reciprocal_root(max(sin_squared, set(tiny)));
  Basis basis;
  for (int axis = 0; axis < 3; ++axis)
    basis.s[axis] = select(none, ray.u[axis], m[axis] * scale);
  basis.turn_cos = select(none, set(1.0), along * scale);
  basis.turn_sin = select(none, set(0.0), across * scale);
  basis.sin_squared = sin_squared;
  return basis;
}

/// s = unit(A − (A·k) k), the axis of an element projected across the ray.
HWY_INLINE Basis projected_axis(const PlanOp& op, const Ray& ray) {
  const V ax = set(op.axis[0]);
  const V ay = set(op.axis[1]);
  const V ahead = fma(ax, ray.d[0], ay * ray.d[1]);
  V s[3] = {fnma(ahead, ray.d[0], ax), fnma(ahead, ray.d[1], ay), neg(ahead * ray.d[2])};
  const V along = fma(ax, ray.u[0], ay * ray.u[1]);
  const V vx = fms(ray.d[1], ray.u[2], ray.d[2] * ray.u[1]);
  const V vy = fms(ray.d[2], ray.u[0], ray.d[0] * ray.u[2]);
  const V across = fma(ax, vx, ay * vy);
  const V scale = reciprocal_root(max(fma(along, along, across * across), set(tiny)));
  Basis basis;
  for (int axis = 0; axis < 3; ++axis)
    basis.s[axis] = s[axis] * scale;
  basis.turn_cos = along * scale;
  basis.turn_sin = across * scale;
  basis.sin_squared = fma(ray.d[0], ray.d[0], ray.d[1] * ray.d[1]);
  return basis;
}

/// The basis that the light came with.
HWY_INLINE Basis kept(const Ray& ray, const Hit& hit) {
  V m[3];
  cross(ray.d, hit.normal, m);
  return {{ray.u[0], ray.u[1], ray.u[2]}, set(1.0), set(0.0), dot(m, m)};
}

/// A rotator turns the field by turning the basis that it is written in: u' = cosθ u + sinθ k × u.
HWY_INLINE void turn_basis(const PlanOp& op, const Ray& ray, V (&s)[3]) {
  V v[3];
  cross(ray.d, s, v);
  for (int axis = 0; axis < 3; ++axis)
    s[axis] = fma(set(op.turn[0]), s[axis], set(op.turn[1]) * v[axis]);
}

HWY_INLINE void put(double (&to)[3][RayBlock::lanes], int i, const V (&from)[3]) {
  for (int axis = 0; axis < 3; ++axis)
    store(to[axis] + i, from[axis]);
}

/// Onto the surface: a short pass, so that many vectors are in flight at once.
template <LegKind Leg, class Shape>
void meet_surface(const PlanLeg& leg_seen, const PlanOp& op_seen, const RayBlock& in, const Departing& out,
                  Meeting& m) {
  // Copies, which no store to a block can reach: what is the same for all rays leaves the loop.
  const PlanLeg leg = leg_seen;
  const PlanOp op = op_seen;
  const Shape shape(op);
  const std::uint64_t all_alive = in.alive;
  const int count = m.count;
  std::uint64_t all_found = 0;
  std::uint64_t all_inside = 0;
  for (int i = 0; i < count; i += width) {
    const M alive = mask(all_alive >> i);
    if (!any(alive))
      continue;
    const Ray ray = transfer<Leg>(leg, in, i);
    const Hit hit = shape.meet(ray, alive);
    const M found = both(hit.found, alive);
    all_found |= bits(found) << i;
    all_inside |= bits(both(found, open_at(op, hit.p[0], hit.p[1]))) << i;
    put(m.normal, i, hit.normal);
    store(m.cos1 + i, hit.cosine);
    store(m.path + i, hit.path);
    if constexpr (Leg == LegKind::rigid) {
      put(m.d, i, ray.d);
      put(m.u, i, ray.u);
    }
    if (out.pass != nullptr)
      put(out.pass->p, i, hit.p);
    if (out.bounce != nullptr)
      put(out.bounce->p, i, hit.p);
    if (out.hit != nullptr)
      put(*out.hit, i, hit.p);
  }
  m.hit = all_found;
  m.inside = all_inside;
}

enum class Transverse { interface, element, none };

/// Where the arriving direction and basis stand: in the block that came in, if the leg did not turn them.
struct Arriving {
  const double (&d)[3][RayBlock::lanes];
  const double (&u)[3][RayBlock::lanes];
};

HWY_INLINE void take(const double (&from)[3][RayBlock::lanes], int i, V (&to)[3]) {
  for (int axis = 0; axis < 3; ++axis)
    to[axis] = load(from[axis] + i);
}

template <Transverse Kind>
HWY_INLINE Basis basis_of(const PlanOp& op, const Ray& ray, const Hit& hit) {
  if constexpr (Kind == Transverse::interface)
    return senkrecht(ray, hit);
  else if constexpr (Kind == Transverse::element)
    return projected_axis(op, ray);
  else
    return kept(ray, hit);
}

/// k' = μ k + (cosθ2 − μ cosθ1) N, accurate at normal incidence; cosθ2 from n2² cos²θ2 = n2² − n1² sin²θ1,
/// without cancellation at grazing incidence.
HWY_INLINE M refract(const PlanOp& op, const Ray& ray, const Hit& hit, int i, Meeting& m, V (&passed)[3]) {
  const V n1_cos1 = set(op.n1) * hit.cosine;
  const V square = fma(n1_cos1, n1_cos1, set((op.n2 - op.n1) * (op.n2 + op.n1)));
  const V normal_part = quick_root(max(abs(square), set(tiny)));
  store(m.normal_part + i, normal_part);
  const V mu = set(op.n1 / op.n2);
  const V along = (normal_part - n1_cos1) * set(1.0 / op.n2);
  for (int axis = 0; axis < 3; ++axis)
    passed[axis] = fma(mu, ray.d[axis], along * hit.normal[axis]);
  return set(0.0) < square;
}

/// A beam that leaves. Where the basis was kept, it is set across the new direction again.
HWY_INLINE void send_out(RayBlock& out, int i, const V (&d)[3], const Basis& basis) {
  V u[3] = {basis.s[0], basis.s[1], basis.s[2]};
  const M none = basis.sin_squared < set(no_plane_of_incidence);
  if (any(none)) {
    const V along = keep(none, dot(u, d)); // the other rays keep their bits, whatever their neighbours do
    for (int axis = 0; axis < 3; ++axis)
      u[axis] = fnma(along, d[axis], u[axis]);
  }
  put(out.u, i, u);
  put(out.d, i, d);
}

/// Basis and directions of the beams that leave.
template <Transverse Kind>
void depart(const PlanOp& op_seen, const Arriving& arriving, const Departing& out, Meeting& m) {
  const PlanOp op = op_seen;
  const int count = m.count;
  std::uint64_t crosses = 0;
  for (int i = 0; i < count; i += width) {
    if (!any(mask(m.alive >> i)))
      continue;
    Ray ray;
    Hit hit;
    take(arriving.d, i, ray.d);
    take(arriving.u, i, ray.u);
    take(m.normal, i, hit.normal);
    hit.cosine = load(m.cos1 + i);
    Basis basis = basis_of<Kind>(op, ray, hit);
    store(m.turn_cos + i, basis.turn_cos);
    store(m.turn_sin + i, basis.turn_sin);
    store(m.sin_squared + i, basis.sin_squared);
    V passed[3] = {ray.d[0], ray.d[1], ray.d[2]};
    if constexpr (Kind == Transverse::interface)
      crosses |= bits(refract(op, ray, hit, i, m, passed)) << i;
    if constexpr (Kind == Transverse::element)
      turn_basis(op, ray, basis.s);
    const V back = set(-2.0) * hit.cosine;
    const V bounced[3] = {fma(back, hit.normal[0], ray.d[0]), fma(back, hit.normal[1], ray.d[1]),
                          fma(back, hit.normal[2], ray.d[2])};
    if (out.pass != nullptr)
      send_out(*out.pass, i, passed, basis);
    if (out.bounce != nullptr)
      send_out(*out.bounce, i, bounced, basis);
  }
  if constexpr (Kind == Transverse::interface)
    m.crosses = op.swallows ? 0 : crosses;
  else
    m.crosses = m.hit;
}

template <LegKind Leg>
HWY_INLINE void meet_any(const PlanLeg& leg, const PlanOp& op, const RayBlock& in, const Departing& out,
                         Meeting& m) {
  switch (op.shape) {
  case ShapeKind::plane:
    return meet_surface<Leg, PlaneShape>(leg, op, in, out, m);
  case ShapeKind::sphere:
    return meet_surface<Leg, SphereShape>(leg, op, in, out, m);
  case ShapeKind::conic:
    return meet_surface<Leg, ConicShape>(leg, op, in, out, m);
  case ShapeKind::asphere:
    return meet_surface<Leg, AsphereShape>(leg, op, in, out, m);
  }
}

void arrive(const PlanLeg& leg, const PlanOp& op, const RayBlock& in, const Departing& out, Meeting& m) {
  const bool along_z = leg.kind == LegKind::along_z;
  if (along_z)
    meet_any<LegKind::along_z>(leg, op, in, out, m);
  else
    meet_any<LegKind::rigid>(leg, op, in, out, m);
  const Arriving arriving = along_z ? Arriving{in.d, in.u} : Arriving{m.d, m.u};
  switch (op.amplitude) {
  case AmplitudeKind::none:
    return depart<Transverse::none>(op, arriving, out, m);
  case AmplitudeKind::element:
    return depart<Transverse::element>(op, arriving, out, m);
  default:
    return depart<Transverse::interface>(op, arriving, out, m);
  }
}

} // namespace lightledger::trace::HWY_NAMESPACE
HWY_AFTER_NAMESPACE();

#endif
