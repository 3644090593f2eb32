// The amplitudes and absorptances of a vector of rays, and how they are handed on. Included once an
// instruction set.
#if defined(LIGHTLEDGER_RESPONSE_INL) == defined(HWY_TARGET_TOGGLE)
#ifdef LIGHTLEDGER_RESPONSE_INL
#undef LIGHTLEDGER_RESPONSE_INL
#else
#define LIGHTLEDGER_RESPONSE_INL
#endif

#include "complex-inl.hpp"
#include "meeting.hpp"

HWY_BEFORE_NAMESPACE();
namespace lightledger::trace::HWY_NAMESPACE {

/// Flux-normalised amplitudes by the signs of contract §2, and what the coating keeps.
struct Response {
  C r_s, r_p, t_s, t_p;
  V a_s, a_p;
};

HWY_INLINE Response select(M m, const Response& yes, const Response& no) {
  return {select(m, yes.r_s, no.r_s), select(m, yes.r_p, no.r_p), select(m, yes.t_s, no.t_s),
          select(m, yes.t_p, no.t_p), select(m, yes.a_s, no.a_s), select(m, yes.a_p, no.a_p)};
}

HWY_INLINE void put(double (&to)[2][RayBlock::lanes], int i, C from) {
  store(to[0] + i, from.re);
  store(to[1] + i, from.im);
}

/// Writes amplitudes, and of lossy operators the powers; what an opaque backing lets in, it absorbs.
HWY_INLINE void enter(const PlanOp& op, const Response& response, int i, Meeting& m) {
  put(m.t_s, i, response.t_s);
  put(m.t_p, i, response.t_p);
  if (m.complex_r) {
    put(m.r_s, i, response.r_s);
    put(m.r_p, i, response.r_p);
  }
  if (!m.lossy)
    return;
  const V crossed_s = norm(response.t_s);
  const V crossed_p = norm(response.t_p);
  const V swallowed = set(op.swallows ? 1.0 : 0.0);
  const V free = set(op.swallows ? 0.0 : 1.0);
  store(m.crossed_s + i, free * crossed_s);
  store(m.crossed_p + i, free * crossed_p);
  store(m.absorbed_s + i, fma(swallowed, crossed_s, response.a_s));
  store(m.absorbed_p + i, fma(swallowed, crossed_p, response.a_p));
  store(m.reflected_s + i, norm(response.r_s));
  store(m.reflected_p + i, norm(response.r_p));
}

} // namespace lightledger::trace::HWY_NAMESPACE
HWY_AFTER_NAMESPACE();

#endif
