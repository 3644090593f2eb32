// Complex numbers by the vector. Included once an instruction set.
#if defined(LIGHTLEDGER_COMPLEX_INL) == defined(HWY_TARGET_TOGGLE)
#ifdef LIGHTLEDGER_COMPLEX_INL
#undef LIGHTLEDGER_COMPLEX_INL
#else
#define LIGHTLEDGER_COMPLEX_INL
#endif

#include "elementary-inl.hpp"

HWY_BEFORE_NAMESPACE();
namespace lightledger::trace::HWY_NAMESPACE {

struct C {
  V re, im;
};

HWY_INLINE C operator+(C a, C b) {
  return {a.re + b.re, a.im + b.im};
}
HWY_INLINE C operator-(C a, C b) {
  return {a.re - b.re, a.im - b.im};
}
HWY_INLINE C operator*(C a, C b) {
  return {fnma(a.im, b.im, a.re * b.re), fma(a.im, b.re, a.re * b.im)};
}
HWY_INLINE C operator*(V a, C b) {
  return {a * b.re, a * b.im};
}
HWY_INLINE C conjugate(C a) {
  return {a.re, neg(a.im)};
}
HWY_INLINE C minus_i_times(C a) {
  return {a.im, neg(a.re)};
}
HWY_INLINE V norm(C a) {
  return fma(a.re, a.re, a.im * a.im);
}
/// Re(a b*).
HWY_INLINE V overlap(C a, C b) {
  return fma(a.re, b.re, a.im * b.im);
}
HWY_INLINE C select(M m, C yes, C no) {
  return {select(m, yes.re, no.re), select(m, yes.im, no.im)};
}
HWY_INLINE C reciprocal(C a) {
  const V scale = reciprocal(max(norm(a), set(tiny)));
  return {a.re * scale, neg(a.im * scale)};
}

/// The root with Im ≥ 0, and ≥ 0 where real, of a number with Im ≥ 0.
HWY_INLINE C upper_root(C a) {
  const V size = root(norm(a));
  // One part from a sum, the other from its product with the first: nothing cancels.
  const V large = quick_root(max(set(0.5) * (size + abs(a.re)), set(tiny)));
  const V small = set(0.5) * a.im * reciprocal(large);
  const M right = set(0.0) <= a.re;
  return {select(right, large, small), select(right, small, large)};
}

} // namespace lightledger::trace::HWY_NAMESPACE
HWY_AFTER_NAMESPACE();

#endif
