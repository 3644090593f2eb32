#include "gauss_legendre.hpp"
#include "kernel/kernel.hpp"

#include <lightledger/trace/launch.hpp>

#include <algorithm>
#include <cmath>
#include <numbers>

namespace lightledger::trace {
namespace {

using assembly::Grid;
using assembly::Rings;
using assembly::Scattered;
using assembly::ToAccuracy;

/// 2⁶⁴/ρ and 2⁶⁴/ρ², made odd, for ρ³ = ρ + 1: the lattice of least discrepancy in two dimensions (Roberts
/// 2018).
constexpr std::uint64_t radial_stride = 0xc13fa9a902a6328f;
constexpr std::uint64_t azimuthal_stride = 0x91e10da5c79e7b1d;

/// A fixed well-mixed 64-bit word for each number (Steele, Lea & Flood 2014, the SplitMix finaliser).
constexpr std::uint64_t shift(std::uint64_t number) {
  std::uint64_t word = (number + 1) * 0x9e3779b97f4a7c15;
  word = (word ^ (word >> 30)) * 0xbf58476d1ce4e5b9;
  word = (word ^ (word >> 27)) * 0x94d049bb133111eb;
  return word ^ (word >> 31);
}

/// A word as a fraction of 2⁶⁴, in [0, 1), by the 52 bits that the kernel's vectors take too.
constexpr double fraction(std::uint64_t word) {
  return static_cast<double>(word >> 12) * 0x1p-52;
}

std::uint64_t share(std::uint64_t count) {
  return (count + replicates - 1) / replicates;
}

struct ReplicateSize {
  std::uint64_t operator()(const ToAccuracy&) const { return 0; }
  std::uint64_t operator()(const Scattered& scattered) const { return share(scattered.count); }
  std::uint64_t operator()(const Rings& rings) const { return share(rings.rings * rings.spokes); }
  std::uint64_t operator()(const Grid& grid) const { return share(grid.across * grid.across); }
};

} // namespace

Pupil::Pupil(const assembly::Light& light, std::uint64_t shifts)
    : m_sampling(light.sampling), m_first_shift(std::uint64_t{2} * replicates * shifts),
      m_scattered(std::holds_alternative<Scattered>(light.sampling) ||
                  std::holds_alternative<ToAccuracy>(light.sampling)),
      m_size(std::visit(ReplicateSize{}, light.sampling)) {
  const double inner = light.beam.fill_stop ? 0.0 : light.beam.inner / light.beam.radius;
  const bool decays = light.beam.gaussian && !light.beam.fill_stop;
  const double gaussian = decays ? light.beam.radius / *light.beam.gaussian : 0.0;
  m_inner_squared = inner * inner;
  m_gaussian_decay = 2.0 * gaussian * gaussian;
  if (const auto* rings = std::get_if<Rings>(&m_sampling))
    for (const auto& [node, weight] : gauss_legendre(static_cast<int>(rings->rings)))
      m_rings.push_back({0.5 * (1.0 + node), 0.5 * weight});
}

PupilPoint Pupil::on_disc(double fraction_of_area, double azimuth_turns, double weight) const {
  const double r_squared = m_inner_squared + fraction_of_area * (1.0 - m_inner_squared);
  const double r = std::sqrt(r_squared);
  const double azimuth = 2.0 * std::numbers::pi * azimuth_turns;
  return {r * std::cos(azimuth), r * std::sin(azimuth), weight * std::exp(-m_gaussian_decay * r_squared)};
}

PupilPoint Pupil::point(std::uint64_t number, int replicate) const {
  if (m_scattered) {
    const auto dimension = m_first_shift + 2 * static_cast<std::uint64_t>(replicate);
    return on_disc(fraction(number * radial_stride + shift(dimension)),
                   fraction(number * azimuthal_stride + shift(dimension + 1)), 1.0);
  }
  const std::uint64_t index = static_cast<std::uint64_t>(replicate) * m_size + number;
  if (const auto* rings = std::get_if<Rings>(&m_sampling)) {
    if (index >= rings->rings * rings->spokes)
      return {0.0, 0.0, 0.0};
    const RingNode& ring = m_rings[index / rings->spokes];
    const double spoke =
        (static_cast<double>(index % rings->spokes) + 0.5) / static_cast<double>(rings->spokes);
    return on_disc(ring.r_squared, spoke, ring.weight / static_cast<double>(rings->spokes));
  }
  const std::uint64_t across = std::get<Grid>(m_sampling).across;
  if (index >= across * across)
    return {0.0, 0.0, 0.0};
  const auto centre = [&](std::uint64_t cell) {
    return (2.0 * static_cast<double>(cell) + 1.0) / static_cast<double>(across) - 1.0;
  };
  const double x = centre(index % across);
  const double y = centre(index / across);
  const double r_squared = x * x + y * y;
  const bool lit = r_squared <= 1.0 && r_squared >= m_inner_squared;
  return {x, y, lit ? std::exp(-m_gaussian_decay * r_squared) : 0.0};
}

void Pupil::scatter(Launching& from, std::uint64_t first, int replicate) const {
  const auto dimension = m_first_shift + 2 * static_cast<std::uint64_t>(replicate);
  const std::uint64_t radial = first * radial_stride + shift(dimension);
  const std::uint64_t azimuthal = first * azimuthal_stride + shift(dimension + 1);
  for (std::uint64_t i = 0; i < RayBlock::lanes; ++i) {
    from.radial[i] = radial + i * radial_stride;
    from.azimuthal[i] = azimuthal + i * azimuthal_stride;
  }
  from.inner_squared = m_inner_squared;
  from.gaussian_decay = m_gaussian_decay;
}

Source::Source(const assembly::Light& light, const assembly::Field& field)
    : m_infinite(!light.object_distance),
      m_converging(light.object_distance && *light.object_distance < 0.0), m_object{} {
  if (!m_infinite) {
    m_object = {field.at[0], field.at[1], -*light.object_distance};
    return;
  }
  constexpr double radian = std::numbers::pi / 180.0;
  const double x = std::tan(field.at[0] * radian);
  const double y = std::tan(field.at[1] * radian);
  const double scale = 1.0 / std::sqrt(1.0 + x * x + y * y);
  m_object = {x * scale, y * scale, scale};
}

/// Scattered rays are launched a vector at a time.
std::uint64_t Launcher::scatter(RayBlock& block, int replicate, std::uint64_t first,
                                std::uint64_t end) const {
  const auto count = static_cast<int>(std::min<std::uint64_t>(end - first, RayBlock::lanes));
  Launching from;
  m_pupil.scatter(from, first, replicate);
  m_source.describe(from);
  for (int axis = 0; axis < 2; ++axis) {
    from.centre[axis] = m_footprint.centre[static_cast<std::size_t>(axis)];
    from.first[axis] = m_footprint.first[static_cast<std::size_t>(axis)];
    from.second[axis] = m_footprint.second[static_cast<std::size_t>(axis)];
  }
  block.first = first;
  block.count = count;
  block.alive = count == RayBlock::lanes ? ~std::uint64_t{0} : (std::uint64_t{1} << count) - 1;
  kernel().launch(from, block);
  return first + static_cast<std::uint64_t>(count);
}

std::uint64_t Launcher::fill(RayBlock& block, int replicate, std::uint64_t first, std::uint64_t end) const {
  if (m_pupil.scattered())
    return scatter(block, replicate, first, end);
  block.first = first;
  block.count = 0;
  block.alive = 0;
  std::uint64_t number = first;
  for (; number < end && block.count < RayBlock::lanes; ++number) {
    const PupilPoint point = m_pupil.point(number, replicate);
    if (point.weight <= 0.0)
      continue;
    const int lane = block.count++;
    for (std::size_t axis = 0; axis < 2; ++axis)
      block.p[axis][lane] =
          m_footprint.centre[axis] + m_footprint.first[axis] * point.x + m_footprint.second[axis] * point.y;
    block.p[2][lane] = 0.0;
    block.w[lane] = point.weight;
    block.opl[lane] = 0.0;
    block.alive |= std::uint64_t{1} << lane;
    m_source.aim(block, lane);
  }
  return number;
}

void Source::describe(Launching& from) const {
  from.finite = !m_infinite;
  std::copy(m_object.begin(), m_object.end(), from.object);
  const double size = std::max({std::abs(m_object[0]), std::abs(m_object[1]), std::abs(m_object[2])});
  from.scale = (m_converging ? 1.0 : -1.0) / size;
}

/// Direction and the double-pole basis: x carried by the smallest rotation of z onto d.
void Source::aim(RayBlock& block, int lane) const {
  std::array<double, 3> d = m_object;
  if (!m_infinite) {
    const double side = m_converging ? 1.0 : -1.0;
    for (int axis = 0; axis < 3; ++axis)
      d[axis] = side * (m_object[axis] - block.p[axis][lane]);
    // hypot does not overflow: an object however far gives the direction of one at infinity.
    const double length = std::hypot(d[0], d[1], d[2]);
    for (double& component : d)
      component /= length;
  }
  const double pull = d[0] / (1.0 + d[2]);
  const std::array<double, 3> u = {1.0 - pull * d[0], -pull * d[1], -d[0]};
  for (int axis = 0; axis < 3; ++axis) {
    block.d[axis][lane] = d[axis];
    block.u[axis][lane] = u[axis];
  }
  for (int k = 0; k < 8; ++k)
    block.J[k][lane] = k == 0 || k == 6 ? 1.0 : 0.0;
}

} // namespace lightledger::trace
