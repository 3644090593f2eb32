// The ledger's entry while a block is settled, a vector of partial sums each. Included once an instruction
// set.
#if defined(LIGHTLEDGER_SUMS_INL) == defined(HWY_TARGET_TOGGLE)
#ifdef LIGHTLEDGER_SUMS_INL
#undef LIGHTLEDGER_SUMS_INL
#else
#define LIGHTLEDGER_SUMS_INL
#endif

#include "vectors-inl.hpp"

#include <lightledger/trace/entry.hpp>

HWY_BEFORE_NAMESPACE();
namespace lightledger::trace::HWY_NAMESPACE {

class Sums {
public:
  V bulk, backward;

  HWY_INLINE Sums() {
    bulk = backward = m_incident = m_missed = m_clipped = m_onward = m_aside = m_absorbed = m_scattered =
        set(0.0);
    m_extra = m_turned = m_turned_scattered = m_turned_extra = m_extrapolated = m_inside = set(0.0);
    m_pass_s = m_pass_p = m_incidence = set(0.0);
    m_least = set(HUGE_VAL);
    m_most = set(-HUGE_VAL);
  }

  HWY_INLINE void arrive(M alive, M hit, M inside, V power) {
    m_incident = add_where(alive, m_incident, power);
    if (all(inside))
      return;
    m_missed = add_where(first_only(alive, hit), m_missed, power);
    m_clipped = add_where(first_only(hit, inside), m_clipped, power);
  }

  HWY_INLINE void absorb(M inside, V power) { m_absorbed = add_where(inside, m_absorbed, power); }

  HWY_INLINE void divide(M inside, V arriving, V intended_s, V intended_p, V aside) {
    const V in = keep(inside, arriving);
    m_inside = m_inside + in;
    m_pass_s = add_where(inside, m_pass_s, arriving * intended_s);
    m_pass_p = add_where(inside, m_pass_p, arriving * intended_p);
    m_aside = add_where(inside, m_aside, aside);
  }

  template <bool Attenuated, class Sent>
  HWY_INLINE void send(M inside, const Sent& onward) {
    m_onward = add_where(inside, m_onward, onward.onward);
    if constexpr (Attenuated) {
      m_scattered = add_where(inside, m_scattered, onward.scattered);
      m_extra = add_where(inside, m_extra, onward.extra);
    }
  }

  template <class Sent>
  HWY_INLINE void turn(M exists, const Sent& turned) {
    m_turned = add_where(exists, m_turned, turned.onward);
    m_turned_scattered = add_where(exists, m_turned_scattered, turned.scattered);
    m_turned_extra = add_where(exists, m_turned_extra, turned.extra);
  }

  HWY_INLINE void lean(M inside, V arriving, V incidence) {
    m_incidence = add_where(inside, m_incidence, arriving * incidence);
    m_least = min(m_least, select(inside, incidence, m_least));
    m_most = max(m_most, select(inside, incidence, m_most));
  }

  HWY_INLINE void extrapolate(M inside, V arriving) {
    m_extrapolated = add_where(inside, m_extrapolated, arriving);
  }

  HWY_INLINE void collect(Entry& entry) const {
    entry.incident = sum(m_incident);
    entry.missed = sum(m_missed);
    entry.clipped = sum(m_clipped);
    entry.onward = sum(m_onward);
    entry.aside = sum(m_aside);
    entry.absorbed = sum(m_absorbed);
    entry.scattered = sum(m_scattered);
    entry.extra = sum(m_extra);
    entry.bulk = sum(bulk);
    entry.backward = sum(backward);
    entry.turned = sum(m_turned);
    entry.turned_scattered = sum(m_turned_scattered);
    entry.turned_extra = sum(m_turned_extra);
    entry.extrapolated = sum(m_extrapolated);
    entry.inside = sum(m_inside);
    entry.pass_s = sum(m_pass_s);
    entry.pass_p = sum(m_pass_p);
    entry.incidence = sum(m_incidence);
    entry.least_incidence = least(m_least);
    entry.most_incidence = most(m_most);
  }

private:
  V m_incident, m_missed, m_clipped, m_onward, m_aside, m_absorbed, m_scattered, m_extra;
  V m_turned, m_turned_scattered, m_turned_extra, m_extrapolated, m_inside, m_pass_s, m_pass_p, m_incidence;
  V m_least, m_most;
};

} // namespace lightledger::trace::HWY_NAMESPACE
HWY_AFTER_NAMESPACE();

#endif
