// Roots, quotients and elementary functions of vectors; included once an instruction set.
#if defined(LIGHTLEDGER_ELEMENTARY_INL) == defined(HWY_TARGET_TOGGLE)
#ifdef LIGHTLEDGER_ELEMENTARY_INL
#undef LIGHTLEDGER_ELEMENTARY_INL
#else
#define LIGHTLEDGER_ELEMENTARY_INL
#endif

#include "vectors-inl.hpp"

HWY_BEFORE_NAMESPACE();
namespace lightledger::trace::HWY_NAMESPACE {

/// Below every number that stands under a root or a quotient here and is not zero.
inline constexpr double tiny = 1e-300;

/// Horner's rule, the lowest power first.
template <int Count>
HWY_INLINE V polynomial(V x, const double (&coefficients)[Count]) {
  V value = set(coefficients[Count - 1]);
  for (int k = Count - 2; k >= 0; --k)
    value = fma(value, x, set(coefficients[k]));
  return value;
}

// Division and square root share one slow port. With a good first guess the fused multiply-adds, of which two
// run in every cycle, are faster: 14 bits grow to all in one step of high order, to within 2 units in the
// last place.
#if HWY_TARGET == HWY_AVX3

HWY_INLINE V reciprocal(V x) {
  const V y{_mm512_rcp14_pd(x.raw)};
  const V e = fnma(x, y, set(1.0));
  return fma(y, fma(fma(e, e, e), e, e), y);
}

HWY_INLINE V reciprocal_root(V x) {
  const V y{_mm512_rsqrt14_pd(x.raw)};
  const V e = fnma(x * y, y, set(1.0));
  const V series = fma(fma(set(0.3125), e, set(0.375)), e, set(0.5));
  return fma(series, y * e, y);
}

/// Of a positive number.
HWY_INLINE V quick_root(V x) {
  const V y{_mm512_rsqrt14_pd(x.raw)};
  const V s = x * y;
  const V e = fnma(s, y, set(1.0));
  const V series = fma(fma(set(0.3125), e, set(0.375)), e, set(0.5));
  return fma(series, s * e, s);
}

#else

HWY_INLINE V reciprocal(V x) {
  return set(1.0) / x;
}
HWY_INLINE V reciprocal_root(V x) {
  return set(1.0) / root(x);
}
HWY_INLINE V quick_root(V x) {
  return root(x);
}

#endif

struct SineCosine {
  V sine, cosine;
};

/// Of r, at most π/4 in size, plus `quarters` quarter turns (a whole number). Error below 1 ulp of 1.
HWY_INLINE SineCosine turned(V r, V quarters) {
  static constexpr double s[] = {-0.166666666666666646,  0.00833333333333094729,  -0.000198412698367567725,
                                 2.75573161016178744e-6, -2.50511316502351815e-8, 1.59181152632659752e-10};
  static constexpr double c[] = {0.0416666666666666654,  -0.00138888888888873965, 0.0000248015872987645608,
                                 -2.7557317271145146e-7, 2.08761461465586116e-9,  -1.13826236474746046e-11};
  const V r2 = r * r;
  const V sine = fma(polynomial(r2, s) * r2, r, r);
  const V cosine = fma(polynomial(r2, c), r2 * r2, fma(set(-0.5), r2, set(1.0)));
  const V place = fnma(round(quarters * set(0.25)), set(4.0), quarters); // −2 … 2
  const M odd = both(set(0.5) < abs(place), abs(place) < set(1.5));
  const V sine_size = select(odd, cosine, sine);
  const V cosine_size = select(odd, sine, cosine);
  const M sine_falls = either(place < set(-0.5), set(1.5) < place);
  const M cosine_falls = either(place < set(-1.5), set(0.5) < place);
  return {select(sine_falls, neg(sine_size), sine_size), select(cosine_falls, neg(cosine_size), cosine_size)};
}

/// The largest angle, in rad, that sine_cosine reduces to its quarter turn without loss.
inline constexpr double largest_angle = 1e6;

/// π/2 in three parts (Cody & Waite 1980).
HWY_INLINE SineCosine sine_cosine(V x) {
  const V quarters = round(x * set(0.63661977236758134));
  const V r = fnma(quarters, set(0x1.921fb54442d18p+0), x);
  return turned(fnma(quarters, set(-0x1.f1976b8p-110), fnma(quarters, set(0x1.1a62633145c07p-54), r)),
                quarters);
}

/// Of turns in [0, 1).
HWY_INLINE SineCosine sine_cosine_of_turns(V turns) {
  const V quarters = round(turns * set(4.0));
  return turned(fnma(quarters, set(0.25), turns) * set(6.283185307179586477), quarters);
}

/// A power of two and a small part: exp(x) = power · (1 + part).
struct Exponential {
  V power, part;
};

HWY_INLINE Exponential exponential_parts(V x) {
  static constexpr double tail[] = {0.500000000000000103,     0.166666666666666675,   0.0416666666666238205,
                                    0.0083333333333300382,    0.00138888889173670806, 0.00019841269863171556,
                                    0.0000248015210578682052, 2.75572682769056962e-6, 2.76202015910315488e-7,
                                    2.5100472505694996e-8};
  const V cut = min(max(x, set(-700.0)), set(700.0));
  const V whole = round(cut * set(1.4426950408889634));
  const V r = fnma(whole, set(0x1.abc9e3b39803fp-56), fnma(whole, set(0x1.62e42fefa39efp-1), cut));
  return {as_double(shift_left<52>(as_word(whole + set(0x1.8p52 + 1023.0)))),
          fma(polynomial(r, tail), r * r, r)};
}

/// Error below 2 ulp for x in [−700, 700]; constant beyond.
HWY_INLINE V exponential(V x) {
  const Exponential e = exponential_parts(x);
  return fma(e.power, e.part, e.power);
}

/// exp(x) − 1 for x ≤ 0; error below 2 ulp.
HWY_INLINE V exponential_minus_one(V x) {
  const Exponential e = exponential_parts(x);
  return fma(e.power, e.part, e.power - set(1.0));
}

/// The angle of sine² x and cosine c, in rad, 0 … π/2; error below 1e-15.
HWY_INLINE V angle(V x, V c) {
  static constexpr double near_axis[] = {1.00000000000000011,   0.166666666666486549,  0.0750000000479012187,
                                         0.0446428522504166518, 0.0303821939566020361, 0.0223650444281437712,
                                         0.0174710099402286096, 0.0128367239109510824, 0.0171391940853491626};
  static constexpr double to_45[] = {
      1.00000000000000001,   0.166666666666649869,    0.0750000000040181609, 0.0446428567626150034,
      0.0303819633967518285, 0.022371584779320353,    0.0173642814391035282, 0.0138034458958919798,
      0.0131910025717539036, -0.00260153784829968792, 0.0787161135700212663, -0.296870543068982427,
      1.00820166505341874,   -2.4908808126226117,     4.64206890998884336,   -6.22929987539798577,
      5.75794083131469874,   -3.27893315673981227,    0.889290436763868799};
  if (all(x < set(0.1)))
    return root(x) * polynomial(x, near_axis);
  const M steep = set(0.5) < x;
  const V y = select(steep, c * c, x);
  const V size = root(y) * polynomial(y, to_45);
  return select(steep, set(1.570796326794896619) - size, size);
}

} // namespace lightledger::trace::HWY_NAMESPACE
HWY_AFTER_NAMESPACE();

#endif
