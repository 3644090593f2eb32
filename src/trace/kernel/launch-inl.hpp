// A block of rays at the launch plane. Included once an instruction set.
#if defined(LIGHTLEDGER_LAUNCH_INL) == defined(HWY_TARGET_TOGGLE)
#ifdef LIGHTLEDGER_LAUNCH_INL
#undef LIGHTLEDGER_LAUNCH_INL
#else
#define LIGHTLEDGER_LAUNCH_INL
#endif

#include "elementary-inl.hpp"
#include "launching.hpp"

HWY_BEFORE_NAMESPACE();
namespace lightledger::trace::HWY_NAMESPACE {

/// A word as a fraction of 2⁶⁴, in [0, 1), by its first 52 bits.
HWY_INLINE V fraction(W word) {
  return as_double(shift_right<12>(word) + set(std::uint64_t{0x3ff0000000000000})) - set(1.0);
}

/// Towards the object point or away from it; far ones are brought near first, so that no square overflows.
HWY_INLINE void aim(const Launching& from, V x, V y, V (&d)[3]) {
  const V scale = set(from.scale);
  d[0] = (set(from.object[0]) - x) * scale;
  d[1] = (set(from.object[1]) - y) * scale;
  d[2] = set(from.object[2] * from.scale);
  const V unit = reciprocal_root(max(fma(d[0], d[0], fma(d[1], d[1], d[2] * d[2])), set(tiny)));
  for (V& component : d)
    component = component * unit;
}

void launch(const Launching& from, RayBlock& block) {
  const V zero = set(0.0);
  const V one = set(1.0);
  for (int i = 0; i < block.count; i += width) {
    const V r_squared =
        fma(fraction(load(from.radial + i)), set(1.0 - from.inner_squared), set(from.inner_squared));
    const SineCosine azimuth = sine_cosine_of_turns(fraction(load(from.azimuthal + i)));
    const V r = root(r_squared);
    const V px = r * azimuth.cosine;
    const V py = r * azimuth.sine;
    const V x = fma(set(from.first[0]), px, fma(set(from.second[0]), py, set(from.centre[0])));
    const V y = fma(set(from.first[1]), px, fma(set(from.second[1]), py, set(from.centre[1])));
    V d[3] = {set(from.object[0]), set(from.object[1]), set(from.object[2])};
    if (from.finite)
      aim(from, x, y, d);
    // The double-pole basis: x carried by the smallest rotation of z onto d.
    const V pull = d[0] / (one + d[2]);
    store(block.p[0] + i, x);
    store(block.p[1] + i, y);
    store(block.p[2] + i, zero);
    for (int axis = 0; axis < 3; ++axis)
      store(block.d[axis] + i, d[axis]);
    store(block.u[0] + i, fnma(pull, d[0], one));
    store(block.u[1] + i, neg(pull * d[1]));
    store(block.u[2] + i, neg(d[0]));
    for (int k = 0; k < 8; ++k)
      store(block.J[k] + i, k == 0 || k == 6 ? one : zero);
    store(block.opl + i, zero);
    store(block.w + i, from.gaussian_decay > 0.0 ? exponential(set(-from.gaussian_decay) * r_squared) : one);
  }
}

} // namespace lightledger::trace::HWY_NAMESPACE
HWY_AFTER_NAMESPACE();

#endif
