#pragma once

#include <lightledger/optics/jones.hpp>

#include <array>
#include <optional>

namespace lightledger::optics {

using Stokes = std::array<double, 4>;
using Mueller = std::array<std::array<double, 4>, 4>;

/// Σ w k k† over Pauli vectors k: the coherency matrix of a Mueller matrix (Cloude 1986), Hermitian. Sums of
/// Mueller matrices are kept in this form, where weak polarization is not the difference of large numbers.
struct PauliCoherency {
  std::array<double, 4> diagonal{};
  std::array<Complex, 6> upper{}; ///< 01, 02, 03, 12, 13, 23

  PauliCoherency& operator+=(const PauliCoherency& other);
  PauliCoherency& operator*=(double factor);
  [[nodiscard]] Complex at(std::size_t row, std::size_t column) const;
};

[[nodiscard]] PauliCoherency coherency_of(const PauliVector& k, double weight = 1.0);

/// M_ab = ½ Σ T_cd tr(σa σc σb σd).
[[nodiscard]] Mueller mueller(const PauliCoherency& coherency);
[[nodiscard]] Mueller mueller(const PauliVector& k);
/// The light that goes through.
[[nodiscard]] Stokes through(const Mueller& mueller, const Stokes& stokes);
[[nodiscard]] Stokes stokes(State state, double power = 1.0);

/// What a Stokes vector says in the words of contract §2 and §5; none where it is not defined.
[[nodiscard]] std::optional<double> degree_of_polarization(const Stokes& stokes);
[[nodiscard]] std::optional<double> degree_of_linear_polarization(const Stokes& stokes);
[[nodiscard]] std::optional<double> azimuth_deg(const Stokes& stokes);
[[nodiscard]] std::optional<double> ellipticity_deg(const Stokes& stokes);

/// Of a Mueller matrix; none where M00 is not above 0.
[[nodiscard]] std::optional<double> diattenuation(const Mueller& mueller);
[[nodiscard]] std::optional<double> polarizance(const Mueller& mueller);
/// √(ΣM² − M00²)/(√3 M00), Gil & Bernabeu 1986.
[[nodiscard]] std::optional<double> depolarization_index(const Mueller& mueller);

/// The eigenvalues, ascending, of the coherency matrix of a Mueller matrix; their sum is M00. None is
/// negative where the matrix can be made of passive Jones matrices (Cloude 1986).
[[nodiscard]] std::array<double, 4> coherency_eigenvalues(const Mueller& mueller);

/// M = M_Δ M_R M_D (Lu & Chipman, J. Opt. Soc. Am. A 13, 1106 (1996)).
struct Decomposition {
  double retardance_deg;      ///< of M_R, 0 … 180
  std::array<double, 3> axis; ///< the fast state of M_R; zero where there is no retardance
  double depolarization;      ///< 1 − |tr m_Δ|/3, eq. 49
};

/// None where the diattenuation is 1, or so little is left of the polarization that M_R is not defined: the
/// second singular value of what follows the diattenuator vanishes.
[[nodiscard]] std::optional<Decomposition> decompose(const Mueller& mueller);

} // namespace lightledger::optics
