#include "reference/element.hpp"

#include <Eigen/Geometry>
#include <cmath>
#include <complex>
#include <numbers>

namespace lightledger::reference {
namespace {

constexpr double degree = std::numbers::pi / 180.0;

/// Projections onto the axis, across it, and along the ray.
struct Projections {
  Eigen::Matrix3d a, b, k;
};

Projections project(double axis_deg, const Rotation& surface_axes, const Vector& k) {
  const Vector axis = surface_axes * Vector(std::cos(axis_deg * degree), std::sin(axis_deg * degree), 0.0);
  const Vector a = (axis - axis.dot(k) * k).normalized();
  const Vector b = k.cross(a);
  return {a * a.transpose(), b * b.transpose(), k * k.transpose()};
}

struct Acts {
  const Rotation& surface_axes;
  const Vector& k;
  bool on_the_way_back;
  double wavelength_nm;

  std::optional<Element> operator()(const assembly::Polarizer& polarizer) const {
    const auto [a, b, along] = project(polarizer.axis_deg, surface_axes, k);
    const Eigen::Matrix3d field = std::sqrt(polarizer.pass) * a + std::sqrt(polarizer.block) * b + along;
    return Element{field.cast<std::complex<double>>(),
                   (1.0 - polarizer.pass) * a + (1.0 - polarizer.block) * b};
  }

  std::optional<Element> operator()(const assembly::Retarder& retarder) const {
    const auto [a, b, along] = project(retarder.axis_deg, surface_axes, k);
    const double scale = retarder.at_nm ? *retarder.at_nm / wavelength_nm : 1.0;
    const std::complex<double> across = std::polar(1.0, scale * retarder.retardance_deg * degree);
    const Eigen::Matrix3d untouched = a + along;
    return Element{untouched.cast<std::complex<double>>() + across * b.cast<std::complex<double>>(),
                   Eigen::Matrix3d::Zero()};
  }

  /// About the ray on its first way; a Faraday rotator keeps that sense in space for the way back.
  std::optional<Element> operator()(const assembly::Rotator& rotator) const {
    const bool keeps_sense_in_space = rotator.kind == assembly::Rotator::Kind::faraday;
    const Vector about = keeps_sense_in_space && on_the_way_back ? Vector(-k) : k;
    const Eigen::Matrix3d turn = Eigen::AngleAxisd(rotator.angle_deg * degree, about).toRotationMatrix();
    return Element{turn.cast<std::complex<double>>(), Eigen::Matrix3d::Zero()};
  }

  template <typename Other>
  std::optional<Element> operator()(const Other&) const {
    return std::nullopt;
  }
};

} // namespace

std::optional<Element> element(const assembly::Effect& effect, const Rotation& surface_axes,
                               const Vector& direction, bool on_the_way_back, double wavelength_nm) {
  return std::visit(Acts{surface_axes, direction, on_the_way_back, wavelength_nm}, effect);
}

} // namespace lightledger::reference
