#include "lanes.hpp"

#include <lightledger/optics/boundary.hpp>

#include <algorithm>
#include <span>

namespace lightledger::trace {
namespace {

double square(const Lanes (&amplitude)[2], int i) {
  return amplitude[0][i] * amplitude[0][i] + amplitude[1][i] * amplitude[1][i];
}

void set(Lanes (&amplitude)[2], int i, double real, double imaginary = 0.0) {
  amplitude[0][i] = real;
  amplitude[1][i] = imaginary;
}

void store(const optics::Response& response, int i, Meeting& m) {
  set(m.r_s, i, response.r_s.real(), response.r_s.imag());
  set(m.r_p, i, response.r_p.real(), response.r_p.imag());
  set(m.t_s, i, response.t_s.real(), response.t_s.imag());
  set(m.t_p, i, response.t_p.real(), response.t_p.imag());
  m.absorbed_s[i] = response.absorptance_s;
  m.absorbed_p[i] = response.absorptance_p;
}

void untouched(Meeting& m) {
  for (int i = 0; i < m.count; ++i) {
    set(m.r_s, i, 0.0);
    set(m.r_p, i, 0.0);
    set(m.t_s, i, 1.0);
    set(m.t_p, i, 1.0);
    m.absorbed_s[i] = m.absorbed_p[i] = 0.0;
  }
}

double place_on_curve(const PlanOp& op, double sin1_squared) {
  const double alpha_squared = op.n1 * op.n1 * sin1_squared;
  return op.shift_index > 0.0 ? wavelength_on_curve(alpha_squared, op.shift_index, op.wavelength_nm)
                              : angle_on_curve(alpha_squared, op.curve_index);
}

void set_polar(Lanes (&amplitude)[2], int i, double power, double phase) {
  const double size = std::sqrt(std::max(power, 0.0));
  set(amplitude, i, size * std::cos(phase), size * std::sin(phase));
}

/// Beyond the critical angle what is not absorbed is reflected.
void measured(const PlanOp& op, Meeting& m) {
  const std::span points(op.curve, op.curve_count);
  for (int i = 0; i < m.count; ++i) {
    const double x = place_on_curve(op, m.sin1_squared[i]);
    const CurvePoint point = interpolate(points, x);
    const bool crosses = m.crosses[i] != 0 || op.swallows;
    m.absorbed_s[i] = std::max(1.0 - point.reflect_s - point.transmit_s, 0.0);
    m.absorbed_p[i] = std::max(1.0 - point.reflect_p - point.transmit_p, 0.0);
    set_polar(m.r_s, i, crosses ? point.reflect_s : 1.0 - m.absorbed_s[i], point.phase_rs);
    set_polar(m.r_p, i, crosses ? point.reflect_p : 1.0 - m.absorbed_p[i], point.phase_rp);
    set_polar(m.t_s, i, crosses ? point.transmit_s : 0.0, point.phase_ts);
    set_polar(m.t_p, i, crosses ? point.transmit_p : 0.0, point.phase_tp);
    m.extrapolated[i] = mask_of(outside(points, x));
  }
}

/// A polarizer, retarder or rotator; what it blocks is absorbed.
void element(const PlanOp& op, Meeting& m) {
  for (int i = 0; i < m.count; ++i) {
    set(m.r_s, i, 0.0);
    set(m.r_p, i, 0.0);
    set(m.t_s, i, op.along[0], op.along[1]);
    set(m.t_p, i, op.across[0], op.across[1]);
    m.absorbed_s[i] = op.blocked[0];
    m.absorbed_p[i] = op.blocked[1];
  }
}

/// Fresnel (1823) between transparent media. Numerators are products, so that nothing cancels near equal
/// indices or Brewster's angle; beyond the critical angle the root is imaginary and |r| = 1.
void fresnel(const PlanOp& op, Meeting& m) {
  const double n1 = op.n1;
  const double n2 = op.n2;
  const double difference = (n1 - n2) * (n1 + n2);
  const double sum = n1 * n1 + n2 * n2;
  for (int i = 0; i < m.count; ++i) {
    const double c1 = m.cos1[i];
    const double n1_c1 = n1 * c1;
    const double q_squared = n1_c1 * n1_c1 - difference;
    const bool crosses = q_squared > 0.0;
    const double q = std::sqrt(std::abs(q_squared));
    const double real = crosses ? q : 0.0; // n2 cosθ2 = real + i · imaginary
    const double imaginary = crosses ? 0.0 : q;
    // r = numerator · conj(denominator²) / |denominator|⁴, the denominator being s = n1 c1 + q or p = n2² c1
    // + n1 q.
    const double s_re = n1_c1 + real;
    const double s_im = imaginary;
    const double p_re = n2 * n2 * c1 + n1 * real;
    const double p_im = n1 * imaginary;
    const double s_size = std::max(s_re * s_re + s_im * s_im, 1e-300);
    const double p_size = std::max(p_re * p_re + p_im * p_im, 1e-300);
    const double s_top = difference / (s_size * s_size);
    const double p_top = -difference * (c1 * c1 * sum - n1 * n1) / (p_size * p_size);
    set(m.r_s, i, s_top * (s_re * s_re - s_im * s_im), -2.0 * s_top * s_re * s_im);
    set(m.r_p, i, p_top * (p_re * p_re - p_im * p_im), -2.0 * p_top * p_re * p_im);
    const double flux = 2.0 * std::sqrt(n1_c1 * real);
    set(m.t_s, i, flux * s_re / s_size);
    set(m.t_p, i, flux * n2 * p_re / p_size);
    m.absorbed_s[i] = m.absorbed_p[i] = 0.0;
  }
}

void metal(const PlanOp& op, Meeting& m) {
  for (int i = 0; i < m.count; ++i)
    store(optics::bare_boundary(op.n1, {op.n2, op.n2_kappa}, m.cos1[i]), i, m);
}

void stack(const PlanOp& op, Meeting& m) {
  const std::span layers(op.layers, op.layer_count);
  for (int i = 0; i < m.count; ++i)
    store(optics::layered_boundary(op.n1, layers, {op.n2, op.n2_kappa}, m.cos1[i], op.wavelength_nm), i, m);
}

/// r_s = −√R, r_p = +√R, t = √T at every angle; beyond the critical angle what is not absorbed is reflected.
void ideal(const PlanOp& op, Meeting& m) {
  const double absorbed_s = std::max(1.0 - op.reflect_s - op.transmit_s, 0.0);
  const double absorbed_p = std::max(1.0 - op.reflect_p - op.transmit_p, 0.0);
  for (int i = 0; i < m.count; ++i) {
    const bool crosses = m.crosses[i] != 0 || op.swallows;
    set(m.r_s, i, -std::sqrt(crosses ? op.reflect_s : 1.0 - absorbed_s));
    set(m.r_p, i, std::sqrt(crosses ? op.reflect_p : 1.0 - absorbed_p));
    set(m.t_s, i, crosses ? std::sqrt(op.transmit_s) : 0.0);
    set(m.t_p, i, crosses ? std::sqrt(op.transmit_p) : 0.0);
    m.absorbed_s[i] = absorbed_s;
    m.absorbed_p[i] = absorbed_p;
  }
}

} // namespace

void respond(const PlanOp& op, Meeting& m) {
  std::fill_n(m.extrapolated, m.count, std::uint64_t{0});
  switch (op.amplitude) {
  case AmplitudeKind::none:
    untouched(m);
    break;
  case AmplitudeKind::fresnel:
    fresnel(op, m);
    break;
  case AmplitudeKind::metal:
    metal(op, m);
    break;
  case AmplitudeKind::stack:
    stack(op, m);
    break;
  case AmplitudeKind::ideal:
    ideal(op, m);
    break;
  case AmplitudeKind::measured:
    measured(op, m);
    break;
  case AmplitudeKind::element:
    element(op, m);
    break;
  }
  const double swallowed = op.swallows ? 1.0 : 0.0;
  for (int i = 0; i < m.count; ++i) {
    m.reflected_s[i] = square(m.r_s, i);
    m.reflected_p[i] = square(m.r_p, i);
    const double crossed_s = square(m.t_s, i);
    const double crossed_p = square(m.t_p, i);
    m.absorbed_s[i] += swallowed * crossed_s;
    m.absorbed_p[i] += swallowed * crossed_p;
    m.crossed_s[i] = (1.0 - swallowed) * crossed_s;
    m.crossed_p[i] = (1.0 - swallowed) * crossed_p;
  }
}

} // namespace lightledger::trace
