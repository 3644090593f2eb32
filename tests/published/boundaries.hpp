#pragma once

#include <lightledger/optics/boundary.hpp>

#include <array>
#include <cmath>
#include <complex>
#include <numbers>
#include <span>
#include <utility>
#include <vector>

/// What published checks of boundaries ask of the optics: angles in degrees, powers, full-field amplitudes,
/// roots.
namespace lightledger::published {

using optics::Complex;
using optics::Layer;
using optics::Response;

constexpr double degrees = 180.0 / std::numbers::pi;

inline double cosine(double angle_deg) {
  return std::cos(angle_deg / degrees);
}
inline double sine(double angle_deg) {
  return std::sin(angle_deg / degrees);
}

inline Response bare(double n1, Complex n2, double angle_deg) {
  return optics::bare_boundary(n1, n2, cosine(angle_deg));
}

/// A stack at a wavelength of 1, so that thicknesses are in wavelengths.
inline Response stack(double n1, std::span<const Layer> layers, Complex n2, double angle_deg = 0.0,
                      double wavelength = 1.0) {
  return optics::layered_boundary(n1, layers, n2, cosine(angle_deg), wavelength);
}

/// A quarter of a wavelength of 1, as optical thickness at normal incidence.
inline Layer quarter_wave(double n) {
  return {n, 0.25 / n};
}

inline std::vector<Layer> repeated(int count, std::span<const Layer> group) {
  std::vector<Layer> layers;
  for (int i = 0; i < count; ++i)
    layers.insert(layers.end(), group.begin(), group.end());
  return layers;
}

inline double power(Complex amplitude) {
  return std::norm(amplitude);
}

inline double phase_deg(Complex amplitude) {
  return std::arg(amplitude) * degrees;
}

/// arg(r_p/r_s) in degrees.
inline double phase_difference_deg(const Response& response) {
  return phase_deg(response.r_p / response.r_s);
}

/// The ratio of electric fields behind a flux-normalised transmission between two lossless media.
inline Complex full_field(Complex t, double n1, double n2, double angle_deg) {
  return t * std::sqrt(n1 * cosine(angle_deg) / optics::normal_component(n1, n2, cosine(angle_deg)).real());
}

/// Where a function that changes sign between two places is zero.
template <class Function>
double root_between(double from, double to, Function f) {
  const bool rises = f(to) > f(from);
  for (int i = 0; i < 200; ++i) {
    const double middle = 0.5 * (from + to);
    ((f(middle) > 0.0) == rises ? to : from) = middle;
  }
  return 0.5 * (from + to);
}

/// The characteristic matrix of a stack at normal incidence, found from its amplitudes between known media.
struct Characteristic {
  Complex a, b, c, d; ///< [[a, b], [c, d]]

  Characteristic(std::span<const Layer> layers, double wavelength = 1.0) {
    // In units of the field at an exit of index n the fields at the entrance are (a + b n, c + d n).
    const auto [electric1, magnetic1] = entrance(layers, 1.0, wavelength);
    const auto [electric2, magnetic2] = entrance(layers, 2.0, wavelength);
    b = electric2 - electric1;
    a = electric1 - b;
    d = magnetic2 - magnetic1;
    c = magnetic1 - d;
  }

  [[nodiscard]] Complex half_trace() const { return 0.5 * (a + d); }
  [[nodiscard]] Complex determinant() const { return a * d - b * c; }

private:
  static std::pair<Complex, Complex> entrance(std::span<const Layer> layers, double exit, double wavelength) {
    const Response response = stack(1.0, layers, exit, 0.0, wavelength);
    const Complex arriving = std::sqrt(exit) / response.t_s;
    return {arriving * (1.0 + response.r_s), arriving * (1.0 - response.r_s)};
  }
};

} // namespace lightledger::published
