#pragma once

#include <lightledger/optics/index.hpp>
#include <lightledger/optics/polarization.hpp>

#include <array>
#include <optional>

namespace lightledger::optics {

/// A Jones matrix of flux-normalised amplitudes, from the x, y of one transverse basis to those of another.
struct Jones {
  Complex xx = 1.0, xy = 0.0, yx = 0.0, yy = 1.0; ///< [[xx, xy], [yx, yy]]
};

[[nodiscard]] Jones operator*(const Jones& after, const Jones& before);
[[nodiscard]] Jones operator*(Complex factor, const Jones& jones);

/// A Jones matrix as k0 + k1 σ1 + k2 σ2 + k3 σ3, the σ in the order of the Stokes parameters that they belong
/// to: σ1 = diag(1, −1), σ2 = [[0, 1], [1, 0]], σ3 = [[0, −i], [i, 0]]. Weak polarization stands in small
/// numbers, k1 to k3, that no difference of large ones spoils.
using PauliVector = std::array<Complex, 4>;

[[nodiscard]] PauliVector pauli(const Jones& jones);
[[nodiscard]] Jones jones(const PauliVector& k);
[[nodiscard]] PauliVector product(const PauliVector& after, const PauliVector& before);

/// A quantity with an orientation on the Poincaré sphere.
struct Oriented {
  double size;
  std::array<double, 3> axis; ///< (S1, S2, S3) of unit length; zero where the size is
};

/// (s1² − s2²)/(s1² + s2²) of the singular values s1 ≥ s2, and the state that passes best: the vector of K†K
/// over its scalar, so that nothing cancels. None of a matrix of zeros.
[[nodiscard]] std::optional<Oriented> diattenuation(const PauliVector& k);

/// Retardance in degrees, 0 … 180, and the fast state of the unitary factor of the polar decomposition. That
/// factor is (K + e^{iα} adj(K)†)/(s1 + s2), α the phase of det K, so that cos and sin of half the retardance
/// are found side by side. None where a singular value vanishes (s2 < 1e-12 s1).
[[nodiscard]] std::optional<Oriented> retardance(const PauliVector& k);

/// The state that an azimuth on the ray belongs to: half the longitude of (S1, S2, ·) in degrees, in (−90,
/// 90].
[[nodiscard]] double azimuth_of(double s1, double s2);

/// ⟨e⊥|σj|e⟩ for a fully polarized state e, the state e⊥ orthogonal to it, and j = 1, 2, 3, of arbitrary
/// phase: a + ib with a, b and the Stokes vector of e a right-handed triple. ⟨e⊥|K e⟩ = Σ of these times kj.
[[nodiscard]] std::array<Complex, 3> crossing(State e);

} // namespace lightledger::optics
