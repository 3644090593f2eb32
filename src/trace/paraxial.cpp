#include "paraxial.hpp"

#include <algorithm>
#include <cmath>
#include <limits>

namespace lightledger::trace {
namespace {

using assembly::Act;
using assembly::Assembly;
using assembly::Side;

double curvature(const assembly::Plane&) {
  return 0.0;
}

template <typename Curved>
double curvature(const Curved& shape) {
  return 1.0 / shape.radius;
}

} // namespace

ParaxialRay::ParaxialRay(const Assembly& assembly)
    : m_assembly(assembly), m_index(index(assembly.light.medium)) {
  if (assembly.light.object_distance)
    m_slope = m_index / *assembly.light.object_distance;
  m_largest_slope = std::abs(m_slope);
}

void ParaxialRay::meet(const assembly::Station& station, Side from) {
  meet(m_assembly.surfaces[station.surface], from, station.intended == Act::bounce);
}

void ParaxialRay::meet(const assembly::Surface& surface, Side from, bool bounces) {
  const double sign = from == Side::before ? 1.0 : -1.0;
  const double c = sign * std::visit([](const auto& shape) { return curvature(shape); }, surface.shape);
  double next = m_index;
  double power = 0.0;
  if (bounces) {
    power = -2.0 * m_index * c;
  } else if (std::holds_alternative<assembly::Interface>(surface.effect)) {
    next = index(from == Side::before ? *surface.beyond : surface.before);
    power = (next - m_index) * c;
  }
  m_slope -= m_height * power;
  m_index = next;
  m_largest_slope = std::max(m_largest_slope, std::abs(m_height * power));
}

std::optional<double> ParaxialRay::signed_image_distance() const {
  if (std::abs(m_slope) <= parallel())
    return std::nullopt;
  return -m_height * m_index / m_slope;
}

std::optional<double> ParaxialRay::image_distance() const {
  const std::optional<double> distance = signed_image_distance();
  return distance && *distance >= 0.0 ? distance : std::nullopt;
}

const char* ParaxialRay::why_no_image() const {
  return std::abs(m_slope) <= parallel() ? "infinitely far" : "virtual, on the side the light comes from";
}

double ParaxialRay::index(assembly::MediumId medium) const {
  return optics::index_at(m_assembly.media[medium], m_assembly.light.wavelengths.front().nm).value().n;
}

double ParaxialRay::parallel() const {
  return 16.0 * std::numeric_limits<double>::epsilon() * m_largest_slope;
}

} // namespace lightledger::trace
