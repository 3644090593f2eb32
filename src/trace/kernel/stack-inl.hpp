// Film stacks and absorbing backings, for a vector of rays at once: the method of optics/layers.cpp, in which
// the formulas are explained. Included once an instruction set.
#if defined(LIGHTLEDGER_STACK_INL) == defined(HWY_TARGET_TOGGLE)
#ifdef LIGHTLEDGER_STACK_INL
#undef LIGHTLEDGER_STACK_INL
#else
#define LIGHTLEDGER_STACK_INL
#endif

#include "far_phase.hpp"
#include "response-inl.hpp"

HWY_BEFORE_NAMESPACE();
namespace lightledger::trace::HWY_NAMESPACE {

/// The plane wave that arrives, and what Snell's law makes of it in any medium beyond.
struct Arrival {
  double n;
  V c, q, q_squared, alpha_squared;

  HWY_INLINE Arrival(double index, V cosine) : n(index), c(max(cosine, set(1e-140))) {
    q = set(n) * c;
    q_squared = q * q;
    alpha_squared = set(n * n) * ((set(1.0) - c) * (set(1.0) + c));
  }

  /// (m cosθ)² in a medium of index m.
  HWY_INLINE V normal_squared(double m) const { return q_squared + set((m - n) * (m + n)); }
  HWY_INLINE C normal_squared(double m, double kappa) const {
    return {normal_squared(m) - set(kappa * kappa), set(2.0 * m * kappa)};
  }
  /// The power that a p wave of magnetic amplitude m² carries, given its normal component.
  HWY_INLINE V power_p(C normal) const { return normal.re * (norm(normal) + alpha_squared); }
};

/// n2 cosθ2 in the medium beyond.
HWY_INLINE C exit_normal(const PlanOp& op, const Arrival& arrival) {
  const C square = arrival.normal_squared(op.n2, op.n2_kappa);
  if (op.n2_kappa != 0.0)
    return upper_root(square);
  const V size = root(abs(square.re));
  const M crosses = set(0.0) < square.re;
  return {keep(crosses, size), select(crosses, set(0.0), size)};
}

/// The bare boundary to an absorbing medium (Fresnel 1823).
HWY_INLINE Response absorbing_boundary(const PlanOp& op, V cosine) {
  const Arrival arrival(op.n1, cosine);
  const C n2{set(op.n2), set(op.n2_kappa)};
  const C n2_squared = n2 * n2;
  const C q2 = exit_normal(op, arrival);
  const V n1_squared = set(op.n1 * op.n1);
  const C contrast{n2_squared.re - n1_squared, n2_squared.im};
  const V c_squared = arrival.c * arrival.c;
  const C brewster{fms(c_squared, n1_squared + n2_squared.re, n1_squared), c_squared * n2_squared.im};
  const C per_s = reciprocal(C{arrival.q + q2.re, q2.im});
  const C per_p = reciprocal(arrival.c * n2_squared + set(op.n1) * q2);
  Response response;
  const V zero = set(0.0);
  response.r_s = C{zero, zero} - contrast * (per_s * per_s);
  response.r_p = contrast * brewster * (per_p * per_p);
  response.t_s = set(2.0) * root(arrival.q * q2.re) * per_s;
  response.t_p = set(2.0) * root(arrival.q * arrival.power_p(q2)) * per_p;
  response.a_s = response.a_p = zero;
  return response;
}

/// Tangential fields of one polarization, and the power kept behind, in units of the fields at the exit.
struct Fields {
  C electric, magnetic;
  V absorbed;
  V exponent; ///< of the powers of two that were taken out
};

HWY_INLINE void rescale(Fields& fields) {
  const V size = max(max(abs(fields.electric.re), abs(fields.electric.im)),
                     max(abs(fields.magnetic.re), abs(fields.magnetic.im)));
  const W biased = shift_right<52>(as_word(size));
  const V factor = as_double(shift_left<52>(set(std::uint64_t{2046}) - biased));
  const V whole = as_double(biased + as_word(set(0x1p52))) - set(0x1p52 + 1023.0);
  fields.electric = factor * fields.electric;
  fields.magnetic = factor * fields.magnetic;
  fields.absorbed = fields.absorbed * (factor * factor);
  fields.exponent = fields.exponent + whole;
}

/// One layer on the way through: cos δ and sin δ/q, both times exp(−Im δ).
struct Passage {
  C cosine, sine;
  V decay, loss; ///< Im δ, 1 − exp(−2 Im δ)
};

HWY_INLINE SineCosine phase(V x) {
  if (all(abs(x) <= set(largest_angle)))
    return sine_cosine(x);
  double angles[width];
  double sines[width];
  double cosines[width];
  store(angles, x);
  far_phases(angles, sines, cosines, width);
  return {load(sines), load(cosines)};
}

/// A lossless layer: everything is real but i, also where the light is evanescent.
struct ClearPassage {
  V cosine, sine, decay, rest; ///< rest = exp(−2 Im δ)
};

HWY_INLINE ClearPassage clear_passage(V q_squared, double k0d) {
  const V q = quick_root(max(abs(q_squared), set(tiny)));
  const V delta = set(k0d) * q;
  const V per_q = reciprocal(q);
  const M runs = set(0.0) <= q_squared;
  const SineCosine wave = phase(delta);
  const V zero = set(0.0);
  if (all(runs))
    return {wave.cosine, wave.sine * per_q, zero, set(1.0)};
  const V loss = neg(exponential_minus_one(set(-2.0) * delta));
  return {select(runs, wave.cosine, fnma(set(0.5), loss, set(1.0))),
          select(runs, wave.sine, set(0.5) * loss) * per_q, select(runs, zero, delta),
          select(runs, set(1.0), set(1.0) - loss)};
}

/// By the characteristic matrix [[cos δ, −i sin δ/η], [−i η sin δ, cos δ]] (Abelès 1950), given q/η and q η.
HWY_INLINE void carry(Fields& fields, const ClearPassage& layer, V q_per_eta, V q_eta) {
  const C electric = fields.electric;
  const C magnetic = fields.magnetic;
  const V to_electric = layer.sine * q_per_eta;
  const V to_magnetic = layer.sine * q_eta;
  fields.electric = {fma(layer.cosine, electric.re, to_electric * magnetic.im),
                     fnma(to_electric, magnetic.re, layer.cosine * electric.im)};
  fields.magnetic = {fma(layer.cosine, magnetic.re, to_magnetic * electric.im),
                     fnma(to_magnetic, electric.re, layer.cosine * magnetic.im)};
  fields.absorbed = fields.absorbed * layer.rest;
}

/// An absorbing layer, with what its absorptance needs besides.
struct LossyPassage {
  C n2, q, q2, per_q, cosine, sine;
  V k0d, cos_x, sin_x, decay, loss;
  M thin; ///< fields run straight through
};

HWY_INLINE LossyPassage lossy_passage(const PlanLayer& layer, C q2, double k0d) {
  LossyPassage p;
  const C n{set(layer.n), set(layer.kappa)};
  p.n2 = n * n;
  p.q2 = q2;
  p.q = upper_root(q2);
  p.per_q = reciprocal(p.q);
  p.k0d = set(k0d);
  const V x = p.k0d * p.q.re;
  const V y = p.k0d * p.q.im;
  const SineCosine wave = phase(x);
  p.cos_x = wave.cosine;
  p.sin_x = wave.sine;
  p.thin = fma(x, x, y * y) < set(1e-16);
  p.decay = keep(p.thin, set(0.0));
  p.decay = select(p.thin, set(0.0), y);
  p.loss = select(p.thin, set(0.0), neg(exponential_minus_one(set(-2.0) * y)));
  const V odd = set(0.5) * p.loss; // exp(−Im δ) sinh Im δ
  const V even = set(1.0) - odd;   // exp(−Im δ) cosh Im δ
  const V zero = set(0.0);
  p.cosine = select(p.thin, C{set(1.0), zero}, C{p.cos_x * even, neg(p.sin_x * odd)});
  p.sine = select(p.thin, C{p.k0d, zero}, C{p.sin_x * even, p.cos_x * odd} * p.per_q);
  return p;
}

HWY_INLINE void carry(Fields& fields, const LossyPassage& layer, C q_per_eta, C q_eta) {
  const C electric = fields.electric;
  const C magnetic = fields.magnetic;
  fields.electric = layer.cosine * electric + minus_i_times(layer.sine * q_per_eta * magnetic);
  fields.magnetic = layer.cosine * magnetic + minus_i_times(layer.sine * q_eta * electric);
  fields.absorbed = fields.absorbed * (set(1.0) - layer.loss);
}

HWY_INLINE V straight_integral(V k0d, C from, C to) {
  return k0d * (norm(from) + overlap(from, to) + norm(to)) * set(1.0 / 3.0);
}

struct WaveIntegral {
  V waves, interference;
};

HWY_INLINE WaveIntegral wave_integral(const LossyPassage& layer, C f, C g) {
  const V rest = set(1.0) - layer.loss;
  const C beat = f * conjugate(g) * C{layer.cos_x, neg(layer.sin_x)};
  return {layer.q.re * layer.loss * fma(rest, norm(g), norm(f)),
          set(4.0) * layer.q.im * rest * layer.sin_x * beat.re};
}

HWY_INLINE V absorbed_s(const LossyPassage& layer, const Fields& exit, const Fields& entrance) {
  const V straight = layer.n2.im * straight_integral(layer.k0d, exit.electric, entrance.electric);
  const C magnetic = exit.magnetic * layer.per_q;
  const WaveIntegral integral =
      wave_integral(layer, set(0.5) * (exit.electric + magnetic), set(0.5) * (exit.electric - magnetic));
  return select(layer.thin, straight, integral.waves + integral.interference);
}

HWY_INLINE V absorbed_p(const LossyPassage& layer, const Fields& exit, const Fields& entrance, V alpha2) {
  const V per_n2 = reciprocal(norm(layer.n2));
  const V per_n = reciprocal(quick_root(norm(layer.n2)));
  const V straight =
      layer.n2.im * (straight_integral(layer.k0d, exit.electric, entrance.electric) +
                     straight_integral(layer.k0d, exit.magnetic, entrance.magnetic) * alpha2 * per_n2);
  const V q_norm = norm(layer.q);
  const C electric = exit.electric * layer.n2 * layer.per_q;
  const WaveIntegral integral =
      wave_integral(layer, set(0.5) * (exit.magnetic + electric), set(0.5) * (exit.magnetic - electric));
  const V kept = (fma(q_norm + alpha2, integral.waves, (alpha2 - q_norm) * integral.interference));
  return select(layer.thin, straight, kept * per_n * per_n);
}

/// Both polarizations on their way from the exit to the entrance.
struct Carried {
  Fields s, p;
  V decay;
};

HWY_INLINE void cross_layer(Carried& at, const Arrival& arrival, const PlanLayer& layer, double k0d) {
  if (layer.kappa == 0.0) {
    const V q2 = arrival.normal_squared(layer.n);
    const ClearPassage passage = clear_passage(q2, k0d);
    carry(at.s, passage, set(1.0), q2);
    carry(at.p, passage, q2 * set(1.0 / (layer.n * layer.n)), set(layer.n * layer.n));
    at.decay = at.decay + passage.decay;
    return;
  }
  const C q2 = arrival.normal_squared(layer.n, layer.kappa);
  const LossyPassage passage = lossy_passage(layer, q2, k0d);
  const Fields exit_s = at.s;
  const Fields exit_p = at.p;
  const V zero = set(0.0);
  carry(at.s, passage, C{set(1.0), zero}, q2);
  carry(at.p, passage, q2 * reciprocal(passage.n2), passage.n2);
  at.s.absorbed = at.s.absorbed + absorbed_s(passage, exit_s, at.s);
  at.p.absorbed = at.p.absorbed + absorbed_p(passage, exit_p, at.p, arrival.alpha_squared);
  at.decay = at.decay + passage.decay;
}

struct Outcome {
  C r, t;
  V absorptance;
};

HWY_INLINE Outcome outcome(const Fields& fields, C first, C second, V q1, V exit_power, V decay) {
  const C per_sum = reciprocal(first + second);
  const V faded = exponential(fnma(fields.exponent, set(0.69314718055994530942), neg(decay)));
  return {(first - second) * per_sum, set(2.0) * root(q1 * exit_power) * faded * per_sum,
          set(4.0) * q1 * fields.absorbed * norm(per_sum)};
}

/// Fields cannot leave the range of doubles within so many layers.
inline constexpr std::uint32_t layers_between_rescales = 8;
inline constexpr double last_phase = 1e100;

HWY_INLINE Response layered_boundary(const PlanOp& op, V cosine) {
  const Arrival arrival(op.n1, cosine);
  const double k0 = 6.283185307179586477 / op.wavelength_nm;
  const C q = exit_normal(op, arrival);
  const C n2{set(op.n2), set(op.n2_kappa)};
  const V zero = set(0.0);
  Carried at{{{set(1.0), zero}, q, zero, zero}, {q, n2 * n2, zero, zero}, zero};
  for (std::uint32_t k = op.layer_count; k-- > 0;) {
    const double k0d = k0 * op.layers[k].thickness_nm;
    cross_layer(at, arrival, op.layers[k], k0d < last_phase ? k0d : last_phase);
    if (k % layers_between_rescales == 1) {
      rescale(at.s);
      rescale(at.p);
    }
  }
  const Outcome s = outcome(at.s, arrival.q * at.s.electric, at.s.magnetic, arrival.q, q.re, at.decay);
  const Outcome p = outcome(at.p, arrival.c * at.p.magnetic, set(arrival.n) * at.p.electric, arrival.q,
                            arrival.power_p(q), at.decay);
  return {s.r, p.r, s.t, p.t, s.absorptance, p.absorptance};
}

} // namespace lightledger::trace::HWY_NAMESPACE
HWY_AFTER_NAMESPACE();

#endif
