// Where rays meet aspheres, by Newton's iteration in lanes. Included once an instruction set.
#if defined(LIGHTLEDGER_ASPHERE_INL) == defined(HWY_TARGET_TOGGLE)
#ifdef LIGHTLEDGER_ASPHERE_INL
#undef LIGHTLEDGER_ASPHERE_INL
#else
#define LIGHTLEDGER_ASPHERE_INL
#endif

#include "shapes-inl.hpp"
#include "steep.hpp"

HWY_BEFORE_NAMESPACE();
namespace lightledger::trace::HWY_NAMESPACE {

/// A step this small relative to the largest coordinate is the last: the error behind it is its square times
/// the surface's curvature, below rounding.
inline constexpr double last_step = 1e-9;
inline constexpr int newton_cap = 12;

/// The surface below one point of each ray.
struct Below {
  V sag, slope_over_r;
  M before_equator;
};

class AsphereShape {
public:
  explicit AsphereShape(const PlanOp& op)
      : m_op(op), m_closing((1.0 + op.conic) * op.curvature * op.curvature) {}

  HWY_INLINE Hit meet(const Ray& ray, M alive) const {
    const Nearest nearest = nearest_to_vertex(ray);
    const Places at = places<false>(m_op.curvature, m_op.conic, 0.0, nearest, ray.d[2]);
    const V to_plane = neg(nearest.o[2] * reciprocal(ray.d[2]));
    const M second = takes_second(at);
    const M two = both(at.before_equator[0], at.before_equator[1]);
    const V near_z = abs(select(second, at.z[1], at.z[0]));
    const V far_z = abs(select(second, at.z[0], at.z[1]));
    const M one_is_nearest = both(both(at.real, either(at.before_equator[0], at.before_equator[1])),
                                  either(first_only(alive, two), set(4.0) * near_z < far_z));
    const M done = opposite(both(alive, one_is_nearest));
    V t = keep(one_is_nearest, select(second, at.t[1], at.t[0]));
    const M plain = newton(ray, nearest, t, done);
    // As far on the other side of the tangent plane: r² is convex along the ray, so the terms slope gently
    // wherever a nearer place could be.
    const V mirrored = fms(set(2.0), to_plane, t);
    const M gentle = both(r_squared(ray, nearest, t) < set(m_op.gentle_squared),
                          r_squared(ray, nearest, mirrored) < set(m_op.gentle_squared));
    M found = both(both(plain, gentle), one_is_nearest);
    if (bits(first_only(alive, found)) != 0)
      found = search(ray, nearest, alive, found, t);
    return at_place(ray, nearest, keep(found, t), found);
  }

private:
  HWY_INLINE V r_squared(const Ray& ray, const Nearest& nearest, V t) const {
    const V x = fma(t, ray.d[0], nearest.o[0]);
    const V y = fma(t, ray.d[1], nearest.o[1]);
    return fma(x, x, y * y);
  }

  /// Σ A_i r^i and Σ i A_i r^(i−2).
  HWY_INLINE void terms(V r2, V& sag, V& slope_over_r) const {
    V size = set(0.0);
    V slope = set(0.0);
    if (m_op.odd_terms) {
      const V r = quick_root(max(r2, set(tiny)));
      for (int k = m_op.used_terms - 1; k >= 0; --k) {
        size = fma(size, r, set(m_op.a[k]));
        slope = fma(slope, r, set((k + PlanOp::lowest_power) * m_op.a[k]));
      }
      sag = size * r2 * r;
      slope_over_r = slope * r;
      return;
    }
    for (int k = m_op.used_terms - 1; k > 0; k -= 2) { // A4, A6, …
      size = fma(size, r2, set(m_op.a[k]));
      slope = fma(slope, r2, set((k + PlanOp::lowest_power) * m_op.a[k]));
    }
    sag = size * r2 * r2;
    slope_over_r = slope * r2;
  }

  HWY_INLINE Below below(V r2) const {
    const V e = fnma(set(m_closing), r2, set(1.0));
    const V positive = max(e, set(tiny));
    const V per_root = reciprocal_root(positive);
    Below here;
    V sag;
    V slope;
    terms(r2, sag, slope);
    here.sag = fma(set(m_op.curvature) * r2, reciprocal(fma(positive, per_root, set(1.0))), sag);
    here.slope_over_r = fma(set(m_op.curvature), per_root, slope);
    here.before_equator = set(0.0) < e;
    return here;
  }

  /// Moves t onto the surface; true where the last step was small enough. Lanes that are `done` stay.
  HWY_INLINE M newton(const Ray& ray, const Nearest& nearest, V& t, M done) const {
    M arrived = first_only(done, done);
    for (int round = 0; round < newton_cap; ++round) {
      const V x = fma(t, ray.d[0], nearest.o[0]);
      const V y = fma(t, ray.d[1], nearest.o[1]);
      const V z = fma(t, ray.d[2], nearest.o[2]);
      const Below here = below(fma(x, x, y * y));
      const V slope = fnma(here.slope_over_r, fma(x, ray.d[0], y * ray.d[1]), ray.d[2]);
      const V step = (here.sag - z) * reciprocal(slope);
      const V size = max(max(abs(x), abs(y)), max(abs(z), abs(t)));
      t = select(done, t, t + step);
      arrived = either(arrived, both(abs(step) <= set(last_step) * size, here.before_equator));
      done = either(done, arrived);
      if (all(done))
        break;
    }
    return arrived;
  }

  /// Steep surfaces, rays beside the base conic: one ray at a time, outward from the tangent plane.
  HWY_INLINE M search(const Ray& ray, const Nearest& nearest, M alive, M found, V& t) const {
    double o[3][width];
    double d[3][width];
    double place[width];
    for (int axis = 0; axis < 3; ++axis) {
      store(o[axis], nearest.o[axis]);
      store(d[axis], ray.d[axis]);
    }
    store(place, t);
    std::uint64_t all_found = bits(found);
    const std::uint64_t left = bits(first_only(alive, found));
    for (int lane = 0; lane < width; ++lane) {
      if (((left >> lane) & 1U) == 0)
        continue;
      const double from[3] = {o[0][lane], o[1][lane], o[2][lane]};
      const double along[3] = {d[0][lane], d[1][lane], d[2][lane]};
      if (meet_steep(m_op, from, along, place[lane]))
        all_found |= std::uint64_t{1} << lane;
    }
    t = load(place);
    return mask(all_found);
  }

  HWY_INLINE Hit at_place(const Ray& ray, const Nearest& nearest, V t, M found) const {
    Hit hit;
    for (int axis = 0; axis < 3; ++axis)
      hit.p[axis] = fma(t, ray.d[axis], nearest.o[axis]);
    hit.path = t - nearest.ahead;
    hit.found = found;
    const V slope = below(fma(hit.p[0], hit.p[0], hit.p[1] * hit.p[1])).slope_over_r;
    const V normal[3] = {neg(slope * hit.p[0]), neg(slope * hit.p[1]), set(1.0)};
    const V along = dot(normal, ray.d);
    const V scale = copysign(reciprocal_root(dot(normal, normal)), along);
    for (int axis = 0; axis < 3; ++axis)
      hit.normal[axis] = normal[axis] * scale;
    hit.cosine = min(along * scale, set(1.0));
    return hit;
  }

  const PlanOp& m_op;
  double m_closing; ///< 1/r² at the equator of the base conic
};

} // namespace lightledger::trace::HWY_NAMESPACE
HWY_AFTER_NAMESPACE();

#endif
