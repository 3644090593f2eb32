#include <lightledger/optics/jones.hpp>

#include <algorithm>
#include <cmath>
#include <numbers>

namespace lightledger::optics {
namespace {

using Vector = std::array<double, 3>;

constexpr Complex i{0.0, 1.0};
constexpr double degrees = 180.0 / std::numbers::pi;
/// Below this ratio of the singular values the smaller one is rounding.
constexpr double vanishing = 1e-12;

double squared(const PauliVector& k) {
  return std::norm(k[0]) + std::norm(k[1]) + std::norm(k[2]) + std::norm(k[3]);
}

double length(const Vector& v) {
  return std::hypot(v[0], v[1], v[2]);
}

Vector unit(const Vector& v) {
  const double size = length(v);
  if (!(size > 0.0))
    return {0.0, 0.0, 0.0};
  return {v[0] / size, v[1] / size, v[2] / size};
}

/// Im(k_a* k_b), a component of Re k × Im k.
double turned(const PauliVector& k, std::size_t a, std::size_t b) {
  return (std::conj(k[a]) * k[b]).imag();
}

} // namespace

Jones operator*(const Jones& after, const Jones& before) {
  return {after.xx * before.xx + after.xy * before.yx, after.xx * before.xy + after.xy * before.yy,
          after.yx * before.xx + after.yy * before.yx, after.yx * before.xy + after.yy * before.yy};
}

Jones operator*(Complex factor, const Jones& jones) {
  return {factor * jones.xx, factor * jones.xy, factor * jones.yx, factor * jones.yy};
}

PauliVector pauli(const Jones& jones) {
  return {0.5 * (jones.xx + jones.yy), 0.5 * (jones.xx - jones.yy), 0.5 * (jones.xy + jones.yx),
          0.5 * i * (jones.xy - jones.yx)};
}

Jones jones(const PauliVector& k) {
  return {k[0] + k[1], k[2] - i * k[3], k[2] + i * k[3], k[0] - k[1]};
}

PauliVector product(const PauliVector& a, const PauliVector& b) {
  return {a[0] * b[0] + a[1] * b[1] + a[2] * b[2] + a[3] * b[3],
          a[0] * b[1] + a[1] * b[0] + i * (a[2] * b[3] - a[3] * b[2]),
          a[0] * b[2] + a[2] * b[0] + i * (a[3] * b[1] - a[1] * b[3]),
          a[0] * b[3] + a[3] * b[0] + i * (a[1] * b[2] - a[2] * b[1])};
}

// K†K = |k0|² + k·k* + (2 Re(k0* k) − 2 Re k × Im k)·σ.
std::optional<Oriented> diattenuation(const PauliVector& k) {
  const double scalar = squared(k);
  if (!(scalar > 0.0))
    return std::nullopt;
  Vector vector{};
  for (std::size_t j = 0; j < 3; ++j) {
    const double along = (std::conj(k[0]) * k[j + 1]).real();
    vector[j] = 2.0 * (along - turned(k, (j + 1) % 3 + 1, (j + 2) % 3 + 1)) / scalar;
  }
  return Oriented{std::min(length(vector), 1.0), unit(vector)};
}

// With the phase of √det taken out, the unitary factor is (Re k0 + i Im k·σ) · 2/(s1 + s2), and a retarder is
// cos(δ/2) − i sin(δ/2) n·σ.
std::optional<Oriented> retardance(const PauliVector& k) {
  const Complex det = k[0] * k[0] - k[1] * k[1] - k[2] * k[2] - k[3] * k[3];
  const double size = std::abs(det);
  if (!(size > vanishing * squared(k)))
    return std::nullopt;
  const Complex turn = std::conj(std::sqrt(det / size));
  const double cosine = (turn * k[0]).real();
  const double sign = cosine < 0.0 ? 1.0 : -1.0;
  const Vector fast{sign * (turn * k[1]).imag(), sign * (turn * k[2]).imag(), sign * (turn * k[3]).imag()};
  return Oriented{2.0 * degrees * std::atan2(length(fast), std::abs(cosine)), unit(fast)};
}

double azimuth_of(double s1, double s2) {
  const double azimuth = 0.5 * degrees * std::atan2(s2, s1);
  return azimuth <= -90.0 ? 90.0 : azimuth;
}

std::array<Complex, 3> crossing(State e) {
  const Vector s = unit({e.s1, e.s2, e.s3});
  // a: the axis that s is least along, made orthogonal to s; b = s × a.
  const auto least = static_cast<std::size_t>(
      std::ranges::min_element(s, {}, [](double component) { return std::abs(component); }) - s.begin());
  Vector a{};
  for (std::size_t j = 0; j < 3; ++j)
    a[j] = (j == least ? 1.0 : 0.0) - s[least] * s[j];
  a = unit(a);
  return {Complex{a[0], s[1] * a[2] - s[2] * a[1]}, Complex{a[1], s[2] * a[0] - s[0] * a[2]},
          Complex{a[2], s[0] * a[1] - s[1] * a[0]}};
}

} // namespace lightledger::optics
