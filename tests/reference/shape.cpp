#include "reference/shape.hpp"

#include "reference/conicoid.hpp"

#include <cmath>

namespace lightledger::reference {
namespace {

struct Curvature {
  double operator()(const assembly::Plane&) const { return 0.0; }
  double operator()(const assembly::Sphere& shape) const { return 1.0 / shape.radius; }
  double operator()(const assembly::Conic& shape) const { return 1.0 / shape.radius; }
  double operator()(const assembly::Asphere& shape) const { return 1.0 / shape.radius; }
};

struct Meet {
  const Frame& surface;
  const Ray& ray;

  Meeting operator()(const assembly::Plane&) const { return meet_conicoid({0.0, 0.0}, surface, ray); }
  Meeting operator()(const assembly::Sphere& shape) const {
    return meet_conicoid({1.0 / shape.radius, 0.0}, surface, ray);
  }
  Meeting operator()(const assembly::Conic& shape) const {
    return meet_conicoid({1.0 / shape.radius, shape.conic}, surface, ray);
  }
  Meeting operator()(const assembly::Asphere& shape) const { return meet_asphere(shape, surface, ray); }
};

} // namespace

Meeting meet(const assembly::Shape& shape, const Frame& surface, const Ray& ray) {
  return std::visit(Meet{surface, ray}, shape);
}

double vertex_curvature(const assembly::Shape& shape) {
  return std::visit(Curvature{}, shape);
}

Sag sag_at(const assembly::Asphere& shape, double r) {
  const double c = 1.0 / shape.radius;
  const double root = std::sqrt(1.0 - (1.0 + shape.conic) * c * c * r * r);
  Sag result{c * r * r / (1.0 + root), c * r / root};
  for (int power = assembly::Asphere::lowest_power; power <= assembly::Asphere::highest_power; ++power) {
    const double a = shape.terms[static_cast<std::size_t>(power - assembly::Asphere::lowest_power)];
    if (a == 0.0)
      continue;
    result.sag += a * std::pow(r, power);
    result.slope += a * power * std::pow(r, power - 1);
  }
  return result;
}

} // namespace lightledger::reference
