// Measured coatings. Included once an instruction set.
#if defined(LIGHTLEDGER_MEASURED_INL) == defined(HWY_TARGET_TOGGLE)
#ifdef LIGHTLEDGER_MEASURED_INL
#undef LIGHTLEDGER_MEASURED_INL
#else
#define LIGHTLEDGER_MEASURED_INL
#endif

#include "response-inl.hpp"

HWY_BEFORE_NAMESPACE();
namespace lightledger::trace::HWY_NAMESPACE {

/// A place beyond every curve.
inline constexpr double nowhere = 1.7976931348623157e308;

/// Where rays read a curve: degrees in its medium, or the wavelength that a tilted filter has at the angle.
HWY_INLINE V place_on_curve(const PlanOp& op, V sin_squared) {
  const V alpha_squared = set(op.n1 * op.n1) * sin_squared;
  if (op.shift_index > 0.0) {
    const V cos_squared = fnma(alpha_squared, set(1.0 / (op.shift_index * op.shift_index)), set(1.0));
    const V place = set(op.wavelength_nm) * reciprocal_root(max(cos_squared, set(tiny)));
    return select(set(0.0) < cos_squared, place, set(nowhere));
  }
  const V x = alpha_squared * set(1.0 / (op.curve_index * op.curve_index));
  const V cosine = root(max(set(1.0) - x, set(0.0)));
  return select(x < set(1.0), angle(x, cosine) * set(57.295779513082320877), set(nowhere));
}

/// Linear between the two points around a place; beyond the ends of the curve its last point holds.
class Curve {
public:
  HWY_INLINE Curve(const PlanOp& op, V x) : m_points(&op.curve->x), m_above(set(0.0)) {
    const double last = op.curve_count - 1.0;
    // The number of points at or below x, by halving.
    double step = 1.0;
    while (step <= last)
      step *= 2.0;
    for (; step >= 1.0; step *= 0.5) {
      const V trial = m_above + set(step);
      const M possible = trial <= set(last + 1.0);
      const V point = value(0, keep(possible, trial - set(1.0)));
      m_above = select(both(possible, point <= x), trial, m_above);
    }
    const M before = m_above < set(0.5);
    const M beyond = set(last + 0.5) < m_above;
    m_low = select(before, set(0.0), m_above - set(1.0));
    m_high = min(m_above, set(last));
    const V from = value(0, m_low);
    const V to = value(0, m_high);
    const V share = (x - from) * reciprocal(select(to <= from, set(1.0), to - from));
    m_share = select(either(before, beyond), set(0.0), share);
  }

  /// The row of that number at the place.
  HWY_INLINE V at(int row) const {
    const V from = value(row, m_low);
    return fma(m_share, value(row, m_high) - from, from);
  }

private:
  static constexpr double values = sizeof(CurvePoint) / sizeof(double);

  HWY_INLINE V value(int row, V index) const { return gather(m_points + row, set(values) * index); }

  const double* m_points;
  V m_above, m_low, m_high, m_share;
};

HWY_INLINE C polar(V power, V phase) {
  const V size = root(max(power, set(0.0)));
  const SineCosine direction = sine_cosine(phase);
  return {size * direction.cosine, size * direction.sine};
}

/// Beyond the critical angle what is not absorbed is reflected.
inline void measured(const PlanOp& op, Asked, Meeting& m) {
  enum { reflect_s = 1, reflect_p, transmit_s, transmit_p, phase_rs, phase_rp, phase_ts, phase_tp };
  constexpr double rounding = 1e-9; // degrees or nm
  m.lossy = m.complex_t = m.complex_r = true;
  const V zero = set(0.0);
  const V one = set(1.0);
  const V least = set(op.curve[0].x - rounding);
  const V most = set(op.curve[op.curve_count - 1].x + rounding);
  for (int i = 0; i < m.count; i += width) {
    const M inside = mask(m.inside >> i);
    if (!any(inside))
      continue;
    const V x = place_on_curve(op, keep(inside, load(m.sin_squared + i)));
    const Curve curve(op, x);
    const M crosses = op.swallows ? mask(~std::uint64_t{0}) : mask(m.crosses >> i);
    const V r_s = curve.at(reflect_s);
    const V r_p = curve.at(reflect_p);
    const V t_s = curve.at(transmit_s);
    const V t_p = curve.at(transmit_p);
    const V a_s = max(one - r_s - t_s, zero);
    const V a_p = max(one - r_p - t_p, zero);
    const Response response{polar(select(crosses, r_s, one - a_s), curve.at(phase_rs)),
                            polar(select(crosses, r_p, one - a_p), curve.at(phase_rp)),
                            polar(keep(crosses, t_s), curve.at(phase_ts)),
                            polar(keep(crosses, t_p), curve.at(phase_tp)),
                            a_s,
                            a_p};
    enter(op, response, i, m);
    m.extrapolated |= bits(either(x < least, most < x)) << i;
  }
}

} // namespace lightledger::trace::HWY_NAMESPACE
HWY_AFTER_NAMESPACE();

#endif
