#include "arrival.hpp"

#include <lightledger/optics/boundary.hpp>

#include <algorithm>
#include <cmath>
#include <numbers>

namespace lightledger::optics {
namespace {

/// Below this phase (rad) fields run straight through a layer; what that leaves out is the phase's square,
/// far below rounding.
constexpr double no_phase = 1e-8;
/// Phases beyond this have no digit left; they are cut here to stay finite.
constexpr double last_phase = 1e100;

/// Tangential fields of one polarization at a plane of the stack, and the power that the layers behind it
/// keep, in units of the fields at the exit; divided by exp(Σ Im δ) of the layers behind and by 2^exponent
/// (`absorbed` by their squares).
struct Fields {
  Complex electric, magnetic;
  double absorbed = 0.0;
  int exponent = 0;

  void rescale();
};

/// Powers of two change no digit.
void Fields::rescale() {
  constexpr double ample = 0x1p64;
  const double size = std::max({std::abs(electric.real()), std::abs(electric.imag()),
                                std::abs(magnetic.real()), std::abs(magnetic.imag())});
  if (1.0 / ample < size && size < ample)
    return;
  const int shift = std::ilogb(size);
  const double factor = std::ldexp(1.0, -shift);
  electric *= factor;
  magnetic *= factor;
  absorbed *= factor * factor;
  exponent += shift;
}

/// One layer on the way through, of phase δ = k0 d q. T is double for lossless layers, where all but i is
/// real also if the light is evanescent, else Complex. `cosine` is cos δ and `sine` is sin δ/q, both times
/// exp(−Im δ); no step divides by a q near zero.
template <class T>
struct Passage {
  T n2; ///< index squared
  T q2; ///< normal component squared
  T cosine, sine;
  double decay; ///< Im δ
  double loss;  ///< 1 − exp(−2 Im δ)
};

Passage<double> passage(double n, double q2, double k0d) {
  const double q = std::sqrt(std::abs(q2));
  const double delta = k0d * q;
  if (delta < no_phase)
    return {n * n, q2, 1.0, k0d, 0.0, 0.0};
  if (q2 > 0.0)
    return {n * n, q2, std::cos(delta), std::sin(delta) / q, 0.0, 0.0};
  const double loss = -std::expm1(-2.0 * delta);
  return {n * n, q2, 1.0 - 0.5 * loss, 0.5 * loss / q, delta, loss};
}

/// An absorbing layer, with what its absorptance needs besides; x = Re δ.
struct LossyPassage : Passage<Complex> {
  Complex q, per_q;
  double k0d;
  double cos_x, sin_x;
};

bool thin(const LossyPassage& layer) {
  return std::norm(layer.k0d * layer.q) < no_phase * no_phase;
}

LossyPassage lossy_passage(Complex n, Complex q2, double k0d) {
  const Complex q = upper_root(q2);
  const Complex delta = k0d * q;
  LossyPassage layer{{n * n, q2, 1.0, k0d, 0.0, 0.0}, q, reciprocal(q), k0d, std::cos(delta.real()),
                     std::sin(delta.real())};
  if (thin(layer))
    return layer;
  layer.decay = delta.imag();
  layer.loss = -std::expm1(-2.0 * layer.decay);
  const double even = 1.0 - 0.5 * layer.loss; // exp(−Im δ) cosh Im δ
  const double odd = 0.5 * layer.loss;        // exp(−Im δ) sinh Im δ
  layer.cosine = {layer.cos_x * even, -layer.sin_x * odd};
  layer.sine = Complex{layer.sin_x * even, layer.cos_x * odd} * layer.per_q;
  return layer;
}

template <class T>
Complex minus_i_times(T factor, Complex field) {
  const Complex product = factor * field;
  return {product.imag(), -product.real()};
}

/// Carries fields from a layer's exit side to its entrance side by the characteristic matrix
/// [[cos δ, −i sin δ/η], [−i η sin δ, cos δ]] (Abelès 1950), given q/η and q η of the layer.
template <class T>
void carry(Fields& fields, const Passage<T>& layer, T q_per_eta, T q_eta) {
  const Complex electric = fields.electric;
  const Complex magnetic = fields.magnetic;
  fields.electric = layer.cosine * electric + minus_i_times(layer.sine * q_per_eta, magnetic);
  fields.magnetic = layer.cosine * magnetic + minus_i_times(layer.sine * q_eta, electric);
  fields.absorbed *= 1.0 - layer.loss;
}

/// η = q for s, n²/q for p.
template <class T>
void carry_s(Fields& fields, const Passage<T>& layer) {
  carry(fields, layer, T{1.0}, layer.q2);
}
template <class T>
void carry_p(Fields& fields, const Passage<T>& layer) {
  carry(fields, layer, layer.q2 * reciprocal(layer.n2), layer.n2);
}

// What a layer keeps is Joule's heat, k0 Im(n²) ∫|E|² over its thickness.

/// k0 ∫|X|² through a layer in which the field runs straight from one value to the other.
double straight_integral(double k0d, Complex from, Complex to) {
  return k0d * (std::norm(from) + (from * std::conj(to)).real() + std::norm(to)) / 3.0;
}

/// k0 Im(n²) ∫|f exp(−iδζ) ± g exp(iδζ)|² for ζ from 0 at the exit side to 1, times exp(−2 Im δ): `waves` of
/// both by themselves, plus or minus `interference`. With Im n² = 2 Re q Im q no quotient is left.
struct WaveIntegral {
  double waves, interference;
};

WaveIntegral wave_integral(const LossyPassage& layer, Complex f, Complex g) {
  const double rest = 1.0 - layer.loss;
  const Complex beat = f * std::conj(g) * Complex{layer.cos_x, -layer.sin_x};
  return {layer.q.real() * layer.loss * (std::norm(f) + rest * std::norm(g)),
          4.0 * layer.q.imag() * rest * layer.sin_x * beat.real()};
}

double absorbed_s(const LossyPassage& layer, const Fields& exit, const Fields& entrance) {
  if (thin(layer))
    return layer.n2.imag() * straight_integral(layer.k0d, exit.electric, entrance.electric);
  const Complex magnetic = exit.magnetic * layer.per_q;
  const auto [waves, interference] =
      wave_integral(layer, 0.5 * (exit.electric + magnetic), 0.5 * (exit.electric - magnetic));
  return waves + interference;
}

/// In p the magnetic field is the transverse one; with f and g its two waves the electric field is
/// (q/n²)(f − g) along the layer and (α/n²)(f + g) across it, α = n1 sinθ1.
double absorbed_p(const LossyPassage& layer, const Fields& exit, const Fields& entrance, double alpha2) {
  const double n2_norm = std::norm(layer.n2);
  if (thin(layer))
    return layer.n2.imag() *
           (straight_integral(layer.k0d, exit.electric, entrance.electric) +
            straight_integral(layer.k0d, exit.magnetic, entrance.magnetic) * alpha2 / n2_norm);
  const double q_norm = std::norm(layer.q);
  const Complex electric = exit.electric * layer.n2 * layer.per_q;
  const auto [waves, interference] =
      wave_integral(layer, 0.5 * (exit.magnetic + electric), 0.5 * (exit.magnetic - electric));
  return ((q_norm + alpha2) * waves + (alpha2 - q_norm) * interference) / n2_norm;
}

/// Both polarizations on their way from the exit to the entrance.
struct Carried {
  Fields s, p;
  double decay = 0.0; ///< Σ Im δ of the layers so far

  void through(const Passage<double>& layer) {
    carry_s(s, layer);
    carry_p(p, layer);
    settle(layer.decay);
  }

  void through(const LossyPassage& layer, double alpha2) {
    const Fields exit_s = s;
    const Fields exit_p = p;
    carry_s<Complex>(s, layer);
    carry_p<Complex>(p, layer);
    s.absorbed += absorbed_s(layer, exit_s, s);
    p.absorbed += absorbed_p(layer, exit_p, p, alpha2);
    settle(layer.decay);
  }

private:
  void settle(double layer_decay) {
    decay += layer_decay;
    s.rescale();
    p.rescale();
  }
};

void cross(Carried& fields, const Arrival& arrival, const Layer& layer, double k0) {
  const double k0d = std::min(k0 * layer.thickness_nm, last_phase);
  if (layer.index.imag() == 0.0) {
    const double n = layer.index.real();
    fields.through(passage(n, arrival.normal_squared(n), k0d));
  } else {
    fields.through(lossy_passage(layer.index, arrival.normal_squared(layer.index), k0d), arrival.alpha2);
  }
}

struct Outcome {
  Complex r, t;
  double absorptance;
};

/// What leaves, for one wave that arrives. `first` is the field whose reflection r tells, electric for s and
/// magnetic for p, `second` the other one, both weighted such that they agree in the wave that arrives and
/// are opposite in the one that leaves; a power P at the exit or in the layers is 4 q1 P/|first + second|² of
/// the arriving one.
Outcome outcome(const Fields& fields, Complex first, Complex second, double q1, double exit_power,
                double decay) {
  const Complex per_sum = reciprocal(first + second);
  const double faded = std::exp(-decay - fields.exponent * std::numbers::ln2);
  return {(first - second) * per_sum, 2.0 * std::sqrt(q1 * exit_power) * faded * per_sum,
          4.0 * q1 * fields.absorbed * std::norm(per_sum)};
}

} // namespace

Response layered_boundary(double incident, std::span<const Layer> layers, Complex exit, double cos_incident,
                          double wavelength_nm) {
  if (layers.empty())
    return bare_boundary(incident, exit, cos_incident);
  const Arrival arrival{incident, cos_incident};
  const double k0 = std::min(2.0 * std::numbers::pi / wavelength_nm, last_phase);
  const Complex q = upper_root(arrival.normal_squared(exit));
  Carried at{{1.0, q}, {q, exit * exit}};
  for (auto layer = layers.rbegin(); layer != layers.rend(); ++layer)
    cross(at, arrival, *layer, k0);

  const Outcome s = outcome(at.s, arrival.q * at.s.electric, at.s.magnetic, arrival.q, q.real(), at.decay);
  const Outcome p = outcome(at.p, arrival.c * at.p.magnetic, arrival.n * at.p.electric, arrival.q,
                            arrival.power_p(q), at.decay);
  return {s.r, p.r, s.t, p.t, s.absorptance, p.absorptance};
}

} // namespace lightledger::optics
