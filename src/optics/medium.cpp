#include <lightledger/optics/medium.hpp>

#include <algorithm>
#include <cmath>
#include <numbers>

namespace lightledger::optics {
namespace {

constexpr Range nowhere{1.0, 0.0};

template <class Row>
Range covered(const std::vector<Row>& rows) {
  return rows.empty() ? nowhere : Range{rows.front().wavelength_nm, rows.back().wavelength_nm};
}

/// A place between two neighbouring rows; `share` is 0 at `below` and 1 at `above`.
template <class Row>
struct Bracket {
  const Row& below;
  const Row& above;
  double share;
};

/// The rows around a wavelength that they cover.
template <class Row>
Bracket<Row> bracket(const std::vector<Row>& rows, double wavelength_nm) {
  const auto above = std::ranges::lower_bound(rows, wavelength_nm, {}, &Row::wavelength_nm);
  const auto below = above == rows.begin() ? above : std::prev(above);
  const double step = above->wavelength_nm - below->wavelength_nm;
  return {*below, *above, step > 0.0 ? (wavelength_nm - below->wavelength_nm) / step : 0.0};
}

Index index_of(const ConstantIndex& constant, double) {
  return {constant.n, constant.kappa};
}

Index index_of(const Sellmeier& formula, double wavelength_nm) {
  const double L = wavelength_nm * 1e-3;
  double n_squared = formula.A;
  for (std::size_t i = 0; i < formula.B.size(); ++i)
    n_squared += formula.B[i] * L * L / (L * L - formula.C_um2[i]);
  return {std::sqrt(n_squared), 0.0};
}

Index index_of(const Cauchy& formula, double wavelength_nm) {
  const double L = wavelength_nm * 1e-3;
  double n = 0.0;
  for (std::size_t i = formula.A.size(); i-- > 0;)
    n = n / (L * L) + formula.A[i];
  return {n, 0.0};
}

Index index_of(const IndexTable& table, double wavelength_nm) {
  const auto [below, above, share] = bracket(table.rows, wavelength_nm);
  return {std::lerp(below.n, above.n, share), std::lerp(below.kappa, above.kappa, share)};
}

double kappa_of(const InternalTransmittance& table, double wavelength_nm) {
  const auto [below, above, share] = bracket(table.rows, wavelength_nm);
  const double log_t = std::lerp(std::log(below.transmittance), std::log(above.transmittance), share);
  const double thickness_nm = table.thickness_mm * 1e6;
  return std::abs(log_t) * wavelength_nm / (4.0 * std::numbers::pi * thickness_nm);
}

} // namespace

Range natural_range(const Dispersion& dispersion, const std::optional<InternalTransmittance>& transmittance) {
  Range range;
  if (const auto* table = std::get_if<IndexTable>(&dispersion))
    range = covered(table->rows);
  return transmittance ? range.overlap(covered(transmittance->rows)) : range;
}

std::optional<Index> index_at(const Medium& medium, double wavelength_nm) {
  const Range range = medium.range.overlap(natural_range(medium.dispersion, medium.transmittance));
  if (!range.holds(wavelength_nm) || wavelength_nm <= 0.0)
    return std::nullopt;
  Index index =
      std::visit([&](const auto& form) { return index_of(form, wavelength_nm); }, medium.dispersion);
  if (medium.transmittance)
    index.kappa = kappa_of(*medium.transmittance, wavelength_nm);
  if (!(index.n > 0.0) || !std::isfinite(index.n))
    return std::nullopt;
  return index;
}

} // namespace lightledger::optics
