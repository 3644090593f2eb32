// Where rays meet planes, spheres and conics, and how these stand there. Included once an instruction set.
#if defined(LIGHTLEDGER_SHAPES_INL) == defined(HWY_TARGET_TOGGLE)
#ifdef LIGHTLEDGER_SHAPES_INL
#undef LIGHTLEDGER_SHAPES_INL
#else
#define LIGHTLEDGER_SHAPES_INL
#endif

#include "elementary-inl.hpp"

#include <lightledger/trace/operator.hpp>

HWY_BEFORE_NAMESPACE();
namespace lightledger::trace::HWY_NAMESPACE {

/// Quotients beyond this count as infinite.
inline constexpr double largest_length = 1e300;

/// In the surface's frame.
struct Ray {
  V p[3], d[3], u[3];
};

struct Hit {
  V p[3];
  V normal[3]; ///< unit, on the side toward which the ray goes
  V cosine;    ///< of the angle of incidence
  V path;      ///< length of the leg, negative where the ray runs backwards
  M found;
};

HWY_INLINE V dot(const V (&a)[3], const V (&b)[3]) {
  return fma(a[0], b[0], fma(a[1], b[1], a[2] * b[2]));
}

HWY_INLINE void cross(const V (&a)[3], const V (&b)[3], V (&c)[3]) {
  c[0] = fms(a[1], b[2], a[2] * b[1]);
  c[1] = fms(a[2], b[0], a[0] * b[2]);
  c[2] = fms(a[0], b[1], a[1] * b[0]);
}

class PlaneShape {
public:
  explicit PlaneShape(const PlanOp&) {}

  HWY_INLINE Hit meet(const Ray& ray, M) const {
    const V t = neg(ray.p[2] * reciprocal(ray.d[2]));
    const M found = abs(t) < set(largest_length);
    const V path = keep(found, t);
    const V zero = set(0.0);
    return {{fma(path, ray.d[0], ray.p[0]), fma(path, ray.d[1], ray.p[1]), zero},
            {zero, zero, copysign(set(1.0), ray.d[2])},
            min(abs(ray.d[2]), set(1.0)),
            path,
            found};
  }
};

/// The point of a ray nearest to the vertex, from which distances along the ray are small and accurate.
struct Nearest {
  V o[3];
  V ahead; ///< from o to p along the ray
};

HWY_INLINE Nearest nearest_to_vertex(const Ray& ray) {
  const V ahead = dot(ray.p, ray.d);
  return {{fnma(ahead, ray.d[0], ray.p[0]), fnma(ahead, ray.d[1], ray.p[1]), fnma(ahead, ray.d[2], ray.p[2])},
          ahead};
}

/// a t² + 2 b t + c = 0 for the places where a ray o + t d with o ⟂ d meets c(x² + y² + (1+K) z²) = 2 z.
/// At them half the derivative of the equation along the ray, which is the normal's component along it, is
/// `along` at the first and its opposite at the second place.
struct Quadratic {
  V a, q;  ///< q = −b + copysign(√discriminant, −b); the roots are c/q and q/a
  V first; ///< c/q
  V along;
  V discriminant;
};

template <bool Spherical>
HWY_INLINE Quadratic quadratic(double curvature, double conic, const Nearest& nearest, V dz) {
  const V c = set(curvature);
  const V oz = nearest.o[2];
  V down = dz; // −b
  V rest = fms(c, dot(nearest.o, nearest.o), oz + oz);
  V a = c;
  if constexpr (!Spherical) {
    const V k = set(curvature * conic);
    down = fnma(k * oz, dz, dz);
    rest = fma(k * oz, oz, rest);
    a = fma(k * dz, dz, c);
  }
  const V discriminant = fnma(a, rest, down * down);
  const V along = copysign(quick_root(max(discriminant, set(tiny))), down);
  const V q = down + along;
  return {a, q, rest * reciprocal(q), along, discriminant};
}

/// Both places and which of them count.
struct Places {
  V t[2];
  V z[2];
  M real;
  M before_equator[2];
};

HWY_INLINE Places places(const Quadratic& at, double curvature, double conic, const Nearest& nearest, V dz) {
  Places found;
  found.t[0] = at.first;
  found.t[1] = at.q * reciprocal(at.a);
  found.real = set(0.0) <= at.discriminant;
  const V stretch = set(curvature * (1.0 + conic));
  for (int k = 0; k < 2; ++k) {
    found.z[k] = fma(found.t[k], dz, nearest.o[2]);
    // Comparisons with what is infinite or not a number are false: such a root does not count.
    found.before_equator[k] = both(stretch * found.z[k] < set(1.0), abs(found.t[k]) < set(largest_length));
  }
  return found;
}

/// Of two places before the equator the one whose |z| is smaller is nearer to the tangent plane along the
/// ray.
HWY_INLINE M takes_second(const Places& at) {
  return first_only(at.before_equator[1], both(at.before_equator[0], abs(at.z[0]) <= abs(at.z[1])));
}

template <bool Spherical>
class QuadricShape {
public:
  explicit QuadricShape(const PlanOp& op) : m_curvature(op.curvature), m_conic(Spherical ? 0.0 : op.conic) {}

  HWY_INLINE Hit meet(const Ray& ray, M alive) const {
    const Nearest nearest = nearest_to_vertex(ray);
    const Quadratic at = quadratic<Spherical>(m_curvature, m_conic, nearest, ray.d[2]);
    V t = at.first;
    V along = at.along;
    Hit hit;
    hit.found = first_serves(at, fma(t, ray.d[2], nearest.o[2]), ray.d[2]);
    if (any(first_only(alive, hit.found)))
      choose(at, nearest, ray.d[2], t, along, hit.found);
    for (int axis = 0; axis < 3; ++axis)
      hit.p[axis] = fma(t, ray.d[axis], nearest.o[axis]);
    hit.path = t - nearest.ahead;
    stand(along, hit);
    return hit;
  }

private:
  /// The places lie 2 along dz/a apart in z, so a first one nearer than half of that is the nearer one. What
  /// this does not settle, choose() does.
  HWY_INLINE M first_serves(const Quadratic& at, V z, V dz) const {
    const M nearer = both(set(0.0) <= at.discriminant, abs(at.a * z) <= abs(at.along * dz));
    if constexpr (Spherical)
      return nearer; // and |c z| ≤ 1: before the equator
    return both(nearer, set(m_curvature * (1.0 + m_conic)) * z < set(1.0));
  }

  HWY_INLINE void choose(const Quadratic& at, const Nearest& nearest, V dz, V& t, V& along, M& found) const {
    const Places all = places(at, m_curvature, m_conic, nearest, dz);
    const M second = takes_second(all);
    found = both(all.real, either(all.before_equator[0], all.before_equator[1]));
    t = keep(found, select(second, all.t[1], all.t[0]));
    along = select(second, neg(along), along);
  }

  /// Normal and angle of incidence, from the normal's component along the ray.
  HWY_INLINE void stand(V along, Hit& hit) const {
    const V size = copysign(set(1.0), along);
    const V c = set(-m_curvature) * size;
    hit.normal[0] = c * hit.p[0];
    hit.normal[1] = c * hit.p[1];
    hit.normal[2] = fma(set(1.0 + m_conic) * c, hit.p[2], size);
    hit.cosine = abs(along);
    if constexpr (!Spherical) {
      const V scale = reciprocal_root(max(dot(hit.normal, hit.normal), set(tiny)));
      for (V& component : hit.normal)
        component = component * scale;
      hit.cosine = hit.cosine * scale;
    }
    hit.cosine = min(hit.cosine, set(1.0));
  }

  double m_curvature, m_conic;
};

using SphereShape = QuadricShape<true>;
using ConicShape = QuadricShape<false>;

} // namespace lightledger::trace::HWY_NAMESPACE
HWY_AFTER_NAMESPACE();

#endif
