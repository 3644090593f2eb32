// The amplitudes of every kind of operator for a block of rays. Included once an instruction set.
#if defined(LIGHTLEDGER_RESPOND_INL) == defined(HWY_TARGET_TOGGLE)
#ifdef LIGHTLEDGER_RESPOND_INL
#undef LIGHTLEDGER_RESPOND_INL
#else
#define LIGHTLEDGER_RESPOND_INL
#endif

#include "measured-inl.hpp"
#include "meeting.hpp"
#include "response-inl.hpp"
#include "stack-inl.hpp"
#include "table-inl.hpp"

HWY_BEFORE_NAMESPACE();
namespace lightledger::trace::HWY_NAMESPACE {

/// Fresnel (1823) between transparent media. Numerators are products, so that nothing cancels near equal
/// indices or Brewster's angle.
class Fresnel {
public:
  explicit Fresnel(const PlanOp& op)
      : m_n1(op.n1), m_n2(op.n2), m_contrast((op.n1 - op.n2) * (op.n1 + op.n2)),
        m_sum(op.n1 * op.n1 + op.n2 * op.n2) {}

  /// Of light that crosses; all amplitudes are real.
  HWY_INLINE void crossing(V c1, V q, M crosses, Asked asked, int i, Meeting& m) const {
    const V q1 = set(m_n1) * c1;
    const V sum_s = q1 + q;
    const V sum_p = fma(set(m_n2 * m_n2), c1, set(m_n1) * q);
    const V per_both = reciprocal(max(sum_s * sum_p, set(tiny)));
    const V per_s = per_both * sum_p;
    const V per_p = per_both * sum_s;
    if (asked.t) {
      const V flux = keep(crosses, set(2.0) * quick_root(max(q1 * q, set(tiny))));
      store(m.t_s[0] + i, flux * per_s);
      store(m.t_p[0] + i, set(m_n2) * flux * per_p);
    }
    if (asked.r) {
      const V brewster = fms(c1 * c1, set(m_sum), set(m_n1 * m_n1));
      store(m.r_s[0] + i, set(m_contrast) * (per_s * per_s));
      store(m.r_p[0] + i, neg(set(m_contrast) * brewster) * (per_p * per_p));
    }
  }

  /// Reflected amplitudes where some light is totally reflected: |r| = 1, as numerator · conj(sum²)/|sum|⁴.
  HWY_INLINE void reflected(V c1, V q, M crosses, int i, Meeting& m) const {
    const V real = keep(crosses, q);
    const V imaginary = q - real;
    const C sum_s{fma(set(m_n1), c1, real), imaginary};
    const C sum_p{fma(set(m_n2 * m_n2), c1, set(m_n1) * real), set(m_n1) * imaginary};
    const C per_s = reciprocal(sum_s);
    const C per_p = reciprocal(sum_p);
    const V brewster = fms(c1 * c1, set(m_sum), set(m_n1 * m_n1));
    put(m.r_s, i, set(m_contrast) * (per_s * per_s));
    put(m.r_p, i, neg(set(m_contrast) * brewster) * (per_p * per_p));
  }

private:
  double m_n1, m_n2, m_contrast, m_sum;
};

inline void fresnel(const PlanOp& op, Asked asked, Meeting& m) {
  const Fresnel boundary(op);
  const bool total = (m.inside & ~m.crosses) != 0;
  m.lossy = m.complex_t = false;
  m.complex_r = total;
  const Asked real{asked.t, asked.r && !total};
  for (int i = 0; i < m.count; i += width) {
    if (!any(mask(m.inside >> i)))
      continue;
    const V c1 = load(m.cos1 + i);
    const V q = load(m.normal_part + i);
    const M crosses = mask(m.crosses >> i);
    if (real.t || real.r)
      boundary.crossing(c1, q, crosses, real, i, m);
    if (asked.r && total)
      boundary.reflected(c1, q, crosses, i, m);
  }
}

/// Fixed amplitudes along and across an axis; what is blocked is absorbed.
inline void element(const PlanOp& op, Asked, Meeting& m) {
  m.lossy = m.complex_t = m.complex_r = true;
  const C along{set(op.along[0]), set(op.along[1])};
  const C across{set(op.across[0]), set(op.across[1])};
  const C none{set(0.0), set(0.0)};
  const Response response{none, none, along, across, set(op.blocked[0]), set(op.blocked[1])};
  for (int i = 0; i < m.count; i += width)
    enter(op, response, i, m);
}

/// r_s = −√R, r_p = +√R, t = √T at every angle; beyond the critical angle what is not absorbed is reflected.
inline void ideal(const PlanOp& op, Asked, Meeting& m) {
  m.lossy = m.complex_t = m.complex_r = true;
  const V zero = set(0.0);
  const V a_s = max(set(1.0 - op.reflect_s - op.transmit_s), zero);
  const V a_p = max(set(1.0 - op.reflect_p - op.transmit_p), zero);
  for (int i = 0; i < m.count; i += width) {
    const M crosses = op.swallows ? mask(~std::uint64_t{0}) : mask(m.crosses >> i);
    const V r_s = root(select(crosses, set(op.reflect_s), set(1.0) - a_s));
    const V r_p = root(select(crosses, set(op.reflect_p), set(1.0) - a_p));
    const V t_s = keep(crosses, root(set(op.transmit_s)));
    const V t_p = keep(crosses, root(set(op.transmit_p)));
    enter(op, {{neg(r_s), zero}, {r_p, zero}, {t_s, zero}, {t_p, zero}, a_s, a_p}, i, m);
  }
}

/// The bare boundary to an absorbing backing.
inline void metal(const PlanOp& op, Asked, Meeting& m) {
  m.lossy = m.complex_t = m.complex_r = true;
  for (int i = 0; i < m.count; i += width) {
    if (!any(mask(m.inside >> i)))
      continue;
    enter(op, absorbing_boundary(op, load(m.cos1 + i)), i, m);
  }
}

/// Layers, from their table where it holds and from the layers themselves where not.
inline void coated(const PlanOp& op, Asked asked, Meeting& m) {
  m.lossy = !op.lossless;
  m.complex_t = true;
  const bool reflected = m.complex_r = asked.r || m.lossy;
  for (int i = 0; i < m.count; i += width) {
    const M inside = mask(m.inside >> i);
    if (!any(inside))
      continue;
    const V c1 = select(inside, load(m.cos1 + i), set(1.0));
    const M crosses = mask(m.crosses >> i);
    Response response;
    if (op.table == nullptr) {
      response = layered_boundary(op, c1);
    } else {
      const M holds = both(within(*op.table, c1), op.swallows ? inside : crosses);
      response = tabulated(op, c1, load(m.normal_part + i), reflected);
      if (any(first_only(inside, holds)))
        response = select(holds, response, layered_boundary(op, c1));
    }
    enter(op, response, i, m);
  }
}

void respond(const PlanOp& op, Asked asked, Meeting& m) {
  m.extrapolated = 0;
  switch (op.amplitude) {
  case AmplitudeKind::none:
    m.lossy = m.complex_t = m.complex_r = false;
    return;
  case AmplitudeKind::fresnel:
    return fresnel(op, asked, m);
  case AmplitudeKind::metal:
    return metal(op, asked, m);
  case AmplitudeKind::stack:
    return coated(op, asked, m);
  case AmplitudeKind::ideal:
    return ideal(op, asked, m);
  case AmplitudeKind::measured:
    return measured(op, asked, m);
  case AmplitudeKind::element:
    return element(op, asked, m);
  }
}

} // namespace lightledger::trace::HWY_NAMESPACE
HWY_AFTER_NAMESPACE();

#endif
