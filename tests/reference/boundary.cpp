#include "reference/boundary.hpp"

#include <cmath>

namespace lightledger::reference {
namespace {

/// The root with Im ≥ 0, and ≥ 0 where real.
Complex outgoing_root(Complex square) {
  const Complex root = std::sqrt(square);
  return root.imag() < 0.0 ? -root : root;
}

Channel ideal_channel(const assembly::Ideal::Powers& powers, double sign, bool total_reflection) {
  const double absorbed = 1.0 - powers.reflect - powers.transmit;
  const double reflect = total_reflection ? 1.0 - absorbed : powers.reflect;
  const double transmit = total_reflection ? 0.0 : powers.transmit;
  return {sign * std::sqrt(reflect), std::sqrt(transmit), reflect, transmit, absorbed};
}

} // namespace

Boundary bare(double incident, Complex exit, Incidence angle) {
  const auto [cosine, sine] = angle;
  const Complex n = exit / incident;
  const Complex root = outgoing_root(n * n - sine * sine); // n cosθ'
  const Complex r_s = (cosine - root) / (cosine + root);
  const Complex r_p = (n * n * cosine - root) / (n * n * cosine + root);
  const Complex t_s = 2.0 * cosine / (cosine + root);
  const Complex t_p = 2.0 * n * cosine / (n * n * cosine + root);
  // The flux across the boundary, of fields t_s and t_p (Born & Wolf, 7th ed., §1.5.3, for a complex index).
  const double flux_s = root.real() / cosine;
  const double flux_p = (std::conj(n) * root / n).real() / cosine;
  return {{r_s, t_s * std::sqrt(flux_s), std::norm(r_s), flux_s * std::norm(t_s), 0.0},
          {r_p, t_p * std::sqrt(flux_p), std::norm(r_p), flux_p * std::norm(t_p), 0.0}};
}

Boundary ideal(const assembly::Ideal& coating, bool total_reflection) {
  return {ideal_channel(coating.s, -1.0, total_reflection), ideal_channel(coating.p, 1.0, total_reflection)};
}

} // namespace lightledger::reference
