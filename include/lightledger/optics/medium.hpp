#pragma once

#include <lightledger/optics/index.hpp>

#include <algorithm>
#include <limits>
#include <optional>
#include <string>
#include <string_view>
#include <variant>
#include <vector>

namespace lightledger::optics {

/// Vacuum wavelengths in nm, both ends included.
struct Range {
  double from_nm = 0.0;
  double to_nm = std::numeric_limits<double>::infinity();

  [[nodiscard]] bool holds(double wavelength_nm) const {
    return from_nm <= wavelength_nm && wavelength_nm <= to_nm;
  }

  /// What both hold; nothing where they do not meet.
  [[nodiscard]] Range overlap(Range other) const {
    return {std::max(from_nm, other.from_nm), std::min(to_nm, other.to_nm)};
  }
};

/// The same n + i kappa at every wavelength.
struct ConstantIndex {
  double n = 1.0;
  double kappa = 0.0;
};

/// n² = A + Σ B L²/(L² − C) with the wavelength L in µm (Sellmeier 1871).
struct Sellmeier {
  double A = 1.0;
  std::vector<double> B;
  std::vector<double> C_um2; ///< as many as B
};

/// n = A0 + A1/L² + A2/L⁴ + … with the wavelength L in µm (Cauchy 1836).
struct Cauchy {
  std::vector<double> A;
};

/// Published points, linear in wavelength between them; wavelengths ascend.
struct IndexTable {
  struct Row {
    double wavelength_nm, n, kappa;
  };
  std::vector<Row> rows;
};

/// Internal transmittance of a thickness, without reflection losses; ln T is linear in wavelength between the
/// rows, whose wavelengths ascend and whose transmittances lie in (0, 1].
struct InternalTransmittance {
  struct Row {
    double wavelength_nm, transmittance;
  };
  double thickness_mm = 1.0;
  std::vector<Row> rows;
};

using Dispersion = std::variant<ConstantIndex, Sellmeier, Cauchy, IndexTable>;

/// An optical medium: how its index follows the wavelength, where that holds, and who says so.
struct Medium {
  std::string name;
  Dispersion dispersion;
  std::optional<InternalTransmittance> transmittance;
  Range range; ///< where index and, if given, transmittance are known
  std::string source;
};

/// n + i kappa at a vacuum wavelength in nm; none outside the medium's range or where its formula gives no
/// finite index above zero. kappa = −ln T · λ/(4π d) where an internal transmittance is given.
[[nodiscard]] std::optional<Index> index_at(const Medium& medium, double wavelength_nm);

/// The widest range in which both the dispersion's and the transmittance's own data are known.
[[nodiscard]] Range natural_range(const Dispersion& dispersion,
                                  const std::optional<InternalTransmittance>& transmittance);

/// Names of all built-in media, `air` and `vacuum` first, then in the order of media.yaml.
[[nodiscard]] const std::vector<std::string_view>& builtin_media();

/// A built-in medium by its case-sensitive name, none if there is no such name.
[[nodiscard]] std::optional<Medium> builtin_medium(std::string_view name);

} // namespace lightledger::optics
