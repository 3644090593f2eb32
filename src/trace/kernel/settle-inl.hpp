// What leaves a surface: Jones matrices, weights, and the ledger's entry. Included once an instruction set.
#if defined(LIGHTLEDGER_SETTLE_INL) == defined(HWY_TARGET_TOGGLE)
#ifdef LIGHTLEDGER_SETTLE_INL
#undef LIGHTLEDGER_SETTLE_INL
#else
#define LIGHTLEDGER_SETTLE_INL
#endif

#include "complex-inl.hpp"
#include "meeting.hpp"
#include "sums-inl.hpp"

#include <lightledger/trace/entry.hpp>

HWY_BEFORE_NAMESPACE();
namespace lightledger::trace::HWY_NAMESPACE {

/// Runs backwards longer than this, in mm, are told of; shorter ones are rounding between faces that touch.
inline constexpr double backward_tolerance = 1e-9;

enum class Beams { pass, bounce, both };
enum class Amplitudes { untouched, real, complex };

/// Two rows of a Jones matrix: x real, x imaginary, y real, y imaginary.
struct Rows {
  V s[4], p[4];
};

HWY_INLINE Rows rotated(const RayBlock& in, const Meeting& m, int i) {
  const V c = load(m.turn_cos + i);
  const V s = load(m.turn_sin + i);
  Rows rows;
  for (int k = 0; k < 4; ++k) {
    const V u = load(in.J[k] + i);
    const V v = load(in.J[4 + k] + i);
    rows.s[k] = fma(c, u, s * v);
    rows.p[k] = fnma(s, u, c * v);
  }
  return rows;
}

HWY_INLINE Rows kept_rows(const RayBlock& in, int i) {
  Rows rows;
  for (int k = 0; k < 4; ++k) {
    rows.s[k] = load(in.J[k] + i);
    rows.p[k] = load(in.J[4 + k] + i);
  }
  return rows;
}

/// row Φ row†; Diagonal where Φ has no other elements.
template <bool Diagonal>
HWY_INLINE V power(const Launched& phi, const V (&row)[4]) {
  const V x = fma(row[0], row[0], row[1] * row[1]);
  const V y = fma(row[2], row[2], row[3] * row[3]);
  const V own = fma(set(phi.xx), x, set(phi.yy) * y);
  if constexpr (Diagonal)
    return own;
  const V cross_re = fma(row[0], row[2], row[1] * row[3]); // Jx Jy*
  const V cross_im = fms(row[1], row[2], row[0] * row[3]);
  return fma(set(2.0 * phi.xy_re), cross_re, fnma(set(2.0 * phi.xy_im), cross_im, own));
}

/// The amplitudes of one beam where they stand in the meeting; no imaginary parts where they are 0.
struct Found {
  const Lanes (&s)[2];
  const Lanes (&p)[2];
  bool imaginary;
};

template <Amplitudes Kind>
HWY_INLINE Rows applied(const Found& found, const Rows& rows, int i) {
  if constexpr (Kind == Amplitudes::untouched)
    return rows;
  const V s_re = load(found.s[0] + i);
  const V p_re = load(found.p[0] + i);
  Rows out;
  if constexpr (Kind == Amplitudes::real) {
    for (int k = 0; k < 4; ++k) {
      out.s[k] = s_re * rows.s[k];
      out.p[k] = p_re * rows.p[k];
    }
    return out;
  }
  const V s_im = found.imaginary ? load(found.s[1] + i) : set(0.0);
  const V p_im = found.imaginary ? load(found.p[1] + i) : set(0.0);
  for (int k = 0; k < 4; k += 2) {
    out.s[k] = fnma(s_im, rows.s[k + 1], s_re * rows.s[k]);
    out.s[k + 1] = fma(s_im, rows.s[k], s_re * rows.s[k + 1]);
    out.p[k] = fnma(p_im, rows.p[k + 1], p_re * rows.p[k]);
    out.p[k + 1] = fma(p_im, rows.p[k], p_re * rows.p[k + 1]);
  }
  return out;
}

/// |a_s|² and |a_p|².
template <Amplitudes Kind>
HWY_INLINE void powers(const Found& found, int i, V& s, V& p) {
  if constexpr (Kind == Amplitudes::untouched) {
    s = p = set(1.0);
    return;
  }
  const V s_re = load(found.s[0] + i);
  const V p_re = load(found.p[0] + i);
  s = s_re * s_re;
  p = p_re * p_re;
  if (Kind == Amplitudes::complex && found.imaginary) {
    const V s_im = load(found.s[1] + i);
    const V p_im = load(found.p[1] + i);
    s = fma(s_im, s_im, s);
    p = fma(p_im, p_im, p);
  }
}

/// Powers of both polarizations that pass, that bounce, and that stay.
struct Shares {
  V crossed_s, crossed_p, reflected_s, reflected_p, absorbed_s, absorbed_p;
};

/// Of a lossless operator the beam that is not asked for has what the other one leaves.
template <Beams Out, Amplitudes Kind>
HWY_INLINE Shares shares(const Meeting& m, int i) {
  if (Kind != Amplitudes::untouched && m.lossy)
    return {load(m.crossed_s + i),   load(m.crossed_p + i),  load(m.reflected_s + i),
            load(m.reflected_p + i), load(m.absorbed_s + i), load(m.absorbed_p + i)};
  const V one = set(1.0);
  Shares shares;
  shares.absorbed_s = shares.absorbed_p = set(0.0);
  if constexpr (Out != Beams::bounce)
    powers<Kind>({m.t_s, m.t_p, m.complex_t}, i, shares.crossed_s, shares.crossed_p);
  if constexpr (Out != Beams::pass)
    powers<Kind>({m.r_s, m.r_p, m.complex_r}, i, shares.reflected_s, shares.reflected_p);
  if constexpr (Out == Beams::pass) {
    shares.reflected_s = max(one - shares.crossed_s, set(0.0)); // rounding alone goes below
    shares.reflected_p = max(one - shares.crossed_p, set(0.0));
  } else if constexpr (Out == Beams::bounce) {
    shares.crossed_s = max(one - shares.reflected_s, set(0.0));
    shares.crossed_p = max(one - shares.reflected_p, set(0.0));
  }
  return shares;
}

/// 1 − exp(−x²) of a rough surface (Bennett & Porteus 1961).
HWY_INLINE V scattered_share(V x) {
  return neg(exponential_minus_one(neg(x * x)));
}

HWY_INLINE V scattered_passing(const PlanOp& op, const Meeting& m, int i) {
  return scattered_share(set(op.scatter_transmitted) *
                         (set(op.n1) * load(m.cos1 + i) - load(m.normal_part + i)));
}

HWY_INLINE V scattered_bouncing(const PlanOp& op, const Meeting& m, int i) {
  return scattered_share(set(op.scatter_reflected) * load(m.cos1 + i));
}

/// One settling: everything that holds for all rays of the block.
struct Settling {
  const PlanLeg& leg;
  const PlanOp& op;
  const Launched& phi;
  const RayBlock& in;
  const Meeting& m;
  const Departing& out;
  bool bounces; ///< the beam that goes onward is the reflected one
};

/// What a beam lost and still has.
struct Sent {
  V onward, scattered, extra;
};

template <Amplitudes Kind, bool Diagonal, bool Attenuated>
HWY_INLINE Sent send(const Settling& all, const Found& found, const Rows& rows, V weight, V scattered, int i,
                     RayBlock* to) {
  const Rows sent = applied<Kind>(found, rows, i);
  const V gross = weight * (power<Diagonal>(all.phi, sent.s) + power<Diagonal>(all.phi, sent.p));
  Sent result{gross, set(0.0), set(0.0)};
  if constexpr (Attenuated) {
    const V specular = gross * (set(1.0) - scattered);
    result = {specular * set(1.0 - all.op.loss), gross * scattered, specular * set(all.op.loss)};
    weight = weight * (set(1.0) - scattered) * set(1.0 - all.op.loss);
  }
  if (to == nullptr)
    return result;
  for (int k = 0; k < 4; ++k) {
    store(to->J[k] + i, sent.s[k]);
    store(to->J[4 + k] + i, sent.p[k]);
  }
  store(to->w + i, weight);
  store(to->opl + i, fma(set(all.leg.index), load(all.m.path + i), load(all.in.opl + i)));
  return result;
}

template <Beams Out, Amplitudes Kind, bool Diagonal, bool Attenuated>
HWY_INLINE void settle_vector(const Settling& all, int i, Sums& sums) {
  const Meeting& m = all.m;
  const M alive = mask(m.alive >> i);
  const M inside = mask(m.inside >> i);
  const Rows rows = Kind == Amplitudes::untouched ? kept_rows(all.in, i) : rotated(all.in, m, i);
  V weight = load(all.in.w + i);
  V power_s = weight * power<Diagonal>(all.phi, rows.s);
  V power_p = weight * power<Diagonal>(all.phi, rows.p);
  const V sent = power_s + power_p;
  V arriving = sent;
  if (!all.leg.launch) {
    const M backward = both(alive, load(m.path + i) < set(-backward_tolerance));
    if (any(backward))
      sums.backward = sums.backward + keep(both(backward, mask(m.hit >> i)), sent);
  }
  if (Attenuated && all.leg.alpha > 0.0) {
    const V path = keep(mask(m.hit >> i), max(load(m.path + i), set(0.0)));
    const V bulk = neg(exponential_minus_one(set(-all.leg.alpha) * path));
    sums.bulk = sums.bulk + keep(alive, sent * bulk);
    const V left = set(1.0) - bulk;
    weight = weight * left;
    power_s = power_s * left;
    power_p = power_p * left;
    arriving = power_s + power_p;
  }

  V scatter_pass = set(0.0);
  V scatter_bounce = set(0.0);
  if (Attenuated && all.op.scatter_transmitted > 0.0) {
    if constexpr (Out != Beams::bounce)
      scatter_pass = scattered_passing(all.op, m, i);
    if constexpr (Out != Beams::pass)
      scatter_bounce = scattered_bouncing(all.op, m, i);
  }
  Sent passed;
  Sent bounced;
  if constexpr (Out != Beams::bounce)
    passed = send<Kind, Diagonal, Attenuated>(all, {m.t_s, m.t_p, m.complex_t}, rows, weight, scatter_pass, i,
                                              all.out.pass);
  if constexpr (Out != Beams::pass)
    bounced = send<Kind, Diagonal, Attenuated>(all, {m.r_s, m.r_p, m.complex_r}, rows, weight, scatter_bounce,
                                               i, all.out.bounce);
  const Shares share = shares<Out, Kind>(m, i);
  sums.arrive(alive, mask(m.hit >> i), inside, arriving);
  if (m.lossy)
    sums.absorb(inside, fma(power_s, share.absorbed_s, power_p * share.absorbed_p));
  const bool bounces = Out == Beams::bounce || (Out == Beams::both && all.bounces);
  const V intended_s = bounces ? share.reflected_s : share.crossed_s;
  const V intended_p = bounces ? share.reflected_p : share.crossed_p;
  const V aside_s = bounces ? share.crossed_s : share.reflected_s;
  const V aside_p = bounces ? share.crossed_p : share.reflected_p;
  sums.divide(inside, arriving, intended_s, intended_p, fma(power_s, aside_s, power_p * aside_p));
  if constexpr (Out != Beams::both) {
    sums.send<Attenuated>(inside, Out == Beams::pass ? passed : bounced);
  } else {
    const M crosses = both(inside, mask(m.crosses >> i));
    sums.send<Attenuated>(bounces ? inside : crosses, bounces ? bounced : passed);
    sums.turn(bounces ? crosses : inside, bounces ? passed : bounced);
  }
  sums.lean(inside, arriving, angle(keep(inside, load(m.sin_squared + i)), load(m.cos1 + i)));
  if (m.extrapolated != 0)
    sums.extrapolate(both(inside, mask(m.extrapolated >> i)), arriving);
}

template <Beams Out, Amplitudes Kind, bool Diagonal, bool Attenuated>
void settle_block(const Settling& all, Entry& entry) {
  Sums sums;
  for (int i = 0; i < all.m.count; i += width)
    if (any(mask(all.m.alive >> i)))
      settle_vector<Out, Kind, Diagonal, Attenuated>(all, i, sums);
  sums.collect(entry);
}

template <Beams Out, Amplitudes Kind>
void settle_with(const Settling& all, Entry& entry) {
  const bool diagonal = all.phi.xy_re == 0.0 && all.phi.xy_im == 0.0;
  const bool attenuated = all.leg.alpha > 0.0 || all.op.loss > 0.0 || all.op.scatter_transmitted > 0.0;
  if (attenuated)
    return diagonal ? settle_block<Out, Kind, true, true>(all, entry)
                    : settle_block<Out, Kind, false, true>(all, entry);
  return diagonal ? settle_block<Out, Kind, true, false>(all, entry)
                  : settle_block<Out, Kind, false, false>(all, entry);
}

template <Beams Out>
void settle_beams(const Settling& all, Entry& entry) {
  const bool imaginary = (Out != Beams::bounce && all.m.complex_t) || (Out != Beams::pass && all.m.complex_r);
  if (all.op.amplitude == AmplitudeKind::none && Out == Beams::pass)
    return settle_with<Beams::pass, Amplitudes::untouched>(all, entry);
  return imaginary ? settle_with<Out, Amplitudes::complex>(all, entry)
                   : settle_with<Out, Amplitudes::real>(all, entry);
}

void settle(const PlanLeg& leg, const PlanOp& op, const Launched& phi, const RayBlock& in, const Meeting& m,
            const Departing& out, bool bounces, Entry& entry) {
  const Settling all{leg, op, phi, in, m, out, bounces};
  if (out.pass != nullptr && out.bounce != nullptr)
    return settle_beams<Beams::both>(all, entry);
  return bounces ? settle_beams<Beams::bounce>(all, entry) : settle_beams<Beams::pass>(all, entry);
}

} // namespace lightledger::trace::HWY_NAMESPACE
HWY_AFTER_NAMESPACE();

#endif
