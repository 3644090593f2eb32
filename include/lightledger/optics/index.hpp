#pragma once

#include <complex>

namespace lightledger::optics {

using Complex = std::complex<double>;

/// Refractive index n + i kappa of a medium at one wavelength, for fields ∝ exp(i(k·r − ωt)).
struct Index {
  double n = 1.0;
  double kappa = 0.0;

  [[nodiscard]] Complex complex() const { return {n, kappa}; }
};

/// Beyond this kappa a medium is opaque: what enters it is absorbed at once (contract §2).
inline constexpr double opaque_kappa = 1e-3;
/// A transparent medium of index below this counts as a gas (contract §3).
inline constexpr double gas_index = 1.01;

[[nodiscard]] inline bool opaque(Index index) {
  return index.kappa > opaque_kappa;
}
[[nodiscard]] inline bool gas(Index index) {
  return !opaque(index) && index.n < gas_index;
}

} // namespace lightledger::optics
