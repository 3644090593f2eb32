#pragma once

#include <lightledger/optics/index.hpp>

#include <algorithm>
#include <cmath>

namespace lightledger::optics {

/// √w for Im w ≥ 0: the root with Im ≥ 0, and ≥ 0 where real.
inline Complex upper_root(Complex w) {
  if (w.imag() == 0.0)
    return w.real() < 0.0 ? Complex{0.0, std::sqrt(-w.real())} : Complex{std::sqrt(w.real()), 0.0};
  const double modulus = std::sqrt(std::norm(w));
  const double larger = std::sqrt(0.5 * (modulus + std::abs(w.real())));
  if (larger == 0.0) // w below the square root of the smallest number
    return 0.0;
  const double smaller = 0.5 * w.imag() / larger;
  return w.real() < 0.0 ? Complex{smaller, larger} : Complex{larger, smaller};
}

/// 1/z for numbers as tame as indices: without the rescue from overflow that the library's quotient pays for.
inline double reciprocal(double z) {
  return 1.0 / z;
}
inline Complex reciprocal(Complex z) {
  return std::conj(z) * (1.0 / std::norm(z));
}

/// The plane wave that arrives at a boundary, and what Snell's law makes of it in any medium beyond.
class Arrival {
public:
  Arrival(double index, double cos_incident)
      : n(index), c(std::clamp(cos_incident, hair, 1.0)), q(n * c), alpha2(n * n * (1.0 - c) * (1.0 + c)) {}

  const double n;      ///< real index of the medium of incidence
  const double c;      ///< cosine of the angle of incidence
  const double q;      ///< n cosθ
  const double alpha2; ///< n² sin²θ, the same in every medium

  /// (m cosθ)² in a medium of index m; nothing cancels near grazing incidence or equal indices.
  [[nodiscard]] double normal_squared(double m) const { return (m - n) * (m + n) + q * q; }
  [[nodiscard]] Complex normal_squared(Complex m) const {
    return {normal_squared(m.real()) - m.imag() * m.imag(), 2.0 * m.real() * m.imag()};
  }

  /// Re(q̂ conj(m²)) for the normal component q̂ = m cosθ in a medium of index m, as a sum of positive terms:
  /// the power that a p wave of magnetic amplitude m² carries there. An s wave of electric amplitude 1
  /// carries Re q̂.
  [[nodiscard]] double power_p(Complex normal) const { return normal.real() * (std::norm(normal) + alpha2); }

private:
  /// Exactly grazing light is taken as this cosine, where every quotient has its limit instead of 0/0.
  static constexpr double hair = 1e-140;
};

} // namespace lightledger::optics
