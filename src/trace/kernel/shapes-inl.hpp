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

/// Both places where a ray o + t d with o ⟂ d meets c(x² + y² + (1+K) z²) = 2 z: roots of a t² + 2 b t + c =
/// 0. At them half the derivative of the equation along the ray, which is the normal's component along it, is
/// −b' and b' with b' = copysign(√discriminant, −b).
struct Places {
  V t[2];
  V z[2];
  V along; ///< normal's component at t[0]; at t[1] the opposite
  M real;
  M before_equator[2];
};

template <bool Spherical>
HWY_INLINE Places places(double curvature, double conic, double radius, const Nearest& nearest, V dz) {
  const V c = set(curvature);
  const V oz = nearest.o[2];
  const V oo = dot(nearest.o, nearest.o);
  V down = dz; // −b
  V rest = fms(c, oo, oz + oz);
  V a = c;
  if constexpr (!Spherical) {
    const V k = set(curvature * conic);
    down = fnma(k * oz, dz, dz);
    rest = fma(k * oz, oz, rest);
    a = fma(k * dz, dz, c);
  }
  const V discriminant = fnma(a, rest, down * down);
  const V half = copysign(quick_root(max(discriminant, set(tiny))), down);
  const V q = down + half;
  Places found;
  found.t[0] = rest * reciprocal(q);
  if constexpr (Spherical)
    found.t[1] = q * set(radius);
  else
    found.t[1] = q * reciprocal(a);
  found.along = half;
  found.real = set(0.0) <= discriminant;
  const V stretch = set(curvature * (1.0 + conic));
  for (int k = 0; k < 2; ++k) {
    found.z[k] = fma(found.t[k], dz, oz);
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
  explicit QuadricShape(const PlanOp& op)
      : m_curvature(op.curvature), m_conic(Spherical ? 0.0 : op.conic),
        m_radius(Spherical ? 1.0 / op.curvature : 0.0) {}

  HWY_INLINE Hit meet(const Ray& ray, M) const {
    const Nearest nearest = nearest_to_vertex(ray);
    const Places at = places<Spherical>(m_curvature, m_conic, m_radius, nearest, ray.d[2]);
    const M second = takes_second(at);
    Hit hit;
    hit.found = both(at.real, either(at.before_equator[0], at.before_equator[1]));
    const V t = keep(hit.found, select(second, at.t[1], at.t[0]));
    for (int axis = 0; axis < 3; ++axis)
      hit.p[axis] = fma(t, ray.d[axis], nearest.o[axis]);
    hit.path = t - nearest.ahead;
    const V along = select(second, neg(at.along), at.along);
    const V size = copysign(set(1.0), along);
    const V c = set(m_curvature) * size;
    V normal[3] = {neg(c * hit.p[0]), neg(c * hit.p[1]), fnma(set(1.0 + m_conic) * c, hit.p[2], size)};
    if constexpr (Spherical) {
      hit.cosine = abs(along);
    } else {
      const V scale = reciprocal_root(max(dot(normal, normal), set(tiny)));
      for (V& component : normal)
        component = component * scale;
      hit.cosine = abs(along) * scale;
    }
    hit.cosine = min(hit.cosine, set(1.0));
    for (int axis = 0; axis < 3; ++axis)
      hit.normal[axis] = normal[axis];
    return hit;
  }

private:
  double m_curvature, m_conic, m_radius;
};

using SphereShape = QuadricShape<true>;
using ConicShape = QuadricShape<false>;

} // namespace lightledger::trace::HWY_NAMESPACE
HWY_AFTER_NAMESPACE();

#endif
