#include "reference/random_parts.hpp"

#include <algorithm>
#include <cmath>
#include <limits>
#include <numbers>
#include <optional>
#include <string>
#include <utility>

namespace lightledger::reference {
namespace {

using assembly::Assembly;
using assembly::Clear;

/// Fills the shelf and the assembly's list together.
class Storekeeper {
public:
  Storekeeper(Assembly& assembly, Dice& dice, bool lossless)
      : m_assembly(assembly), m_dice(dice), m_lossless(lossless) {}

  assembly::MediumId add(optics::Dispersion dispersion) {
    optics::Medium medium;
    medium.name = "medium " + std::to_string(m_assembly.media.size());
    medium.dispersion = std::move(dispersion);
    m_assembly.media.push_back(medium);
    return static_cast<assembly::MediumId>(m_assembly.media.size() - 1);
  }
  assembly::MediumId constant(double n, double kappa) {
    return add(optics::ConstantIndex{n, m_lossless ? 0.0 : kappa});
  }

  std::vector<assembly::MediumId> glasses() {
    return {constant(m_dice.between(1.3, 1.6), 0.0),
            constant(m_dice.between(1.6, 2.0), m_dice.magnitude(1e-9, 1e-5)),
            constant(m_dice.between(1.4, 1.8), m_dice.magnitude(1e-6, 1e-3)),
            add(optics::Sellmeier{1.0, {m_dice.between(1.0, 1.3), 0.25, 0.9}, {0.006, 0.02, 105.0}}),
            add(optics::Cauchy{{m_dice.between(1.5, 1.7), 0.004, 0.0001}})};
  }
  std::vector<assembly::MediumId> films() {
    return {constant(1.38, 0.0), constant(m_dice.between(1.4, 1.5), 1e-5),
            constant(m_dice.between(1.6, 2.0), 0.0), constant(2.35, 4e-4), constant(2.1, 0.05)};
  }
  std::vector<assembly::MediumId> metals() {
    return {constant(m_dice.between(0.8, 1.6), m_dice.between(5.0, 8.0)),
            constant(0.055, m_dice.between(2.5, 4.0)), constant(3.1, 3.3)};
  }

private:
  Assembly& m_assembly;
  Dice& m_dice;
  bool m_lossless;
};

double signed_radius(Dice& dice, double size) {
  const double radius = dice.chance(0.1) ? size * dice.between(1.2, 4.0) : size * dice.magnitude(4.0, 60.0);
  return dice.chance(0.5) ? radius : -radius;
}

assembly::Asphere random_asphere(Dice& dice, double size) {
  assembly::Asphere shape{signed_radius(dice, size), dice.between(-2.0, 1.0), {}};
  if (dice.chance(0.15))
    shape.radius = std::numeric_limits<double>::infinity();
  for (int count = dice.whole(1, 3); count > 0; --count) {
    const int power = dice.chance(0.9) ? dice.whole(assembly::Asphere::lowest_power, 6) : dice.whole(7, 12);
    shape.terms[static_cast<std::size_t>(power - assembly::Asphere::lowest_power)] =
        dice.around_zero(0.004) * size / std::pow(power > 6 ? 4.0 * size : 2.0 * size, power);
  }
  return shape;
}

void add_films(std::vector<assembly::Film>& films, Dice& dice, const Shelf& shelf) {
  assembly::Film film{dice.one_of(shelf.films), 0.0, {}};
  if (dice.chance(0.5))
    film.thickness = assembly::Film::Waves{dice.one_of({0.25, 0.5, 0.37}), dice.between(450.0, 1000.0)};
  else
    film.thickness = dice.between(10.0, 300.0);
  films.push_back(film);
}

/// Ascending places on a grid from `first` to about `last`.
std::vector<double> random_grid(Dice& dice, double first, double last, int count) {
  std::vector<double> grid;
  grid.reserve(static_cast<std::size_t>(count));
  for (int i = 0; i < count; ++i)
    grid.push_back(first +
                   (last - first) * (i + (i > 0 ? dice.around_zero(0.3) : 0.0)) / std::max(count - 1, 1));
  return grid;
}

/// A phase in (−π, π], near a common one so that the nearest turn of every neighbour is never in question.
double phase_near(Dice& dice, double common) {
  return std::remainder(common + dice.around_zero(0.45), 2.0 * std::numbers::pi);
}

/// One polarization of a point.
struct MeasuredChannel {
  double reflect, transmit, reflect_back, phase_r, phase_t;
};

MeasuredChannel random_channel(Dice& dice, double phase_r, double phase_t, bool lossless) {
  const double reflect = dice.between(0.0, 1.0);
  const double transmit = (1.0 - reflect) * (lossless ? 1.0 : dice.between(0.3, 1.0));
  const double back = lossless || dice.chance(0.5) ? reflect : dice.between(0.0, 1.0 - transmit);
  return {reflect, transmit, back, phase_near(dice, phase_r), phase_near(dice, phase_t)};
}

} // namespace

Shelf stock(Assembly& assembly, Dice& dice, bool lossless) {
  Storekeeper keeper(assembly, dice, lossless);
  Shelf shelf;
  shelf.gases = {keeper.constant(1.0, 0.0), keeper.constant(1.0003, dice.chance(0.5) ? 1e-9 : 0.0)};
  shelf.glasses = keeper.glasses();
  shelf.films = keeper.films();
  if (!lossless)
    shelf.metals = keeper.metals();
  return shelf;
}

assembly::Shape random_shape(Dice& dice, double size) {
  switch (dice.whole(0, 9)) {
  case 0:
  case 1:
  case 2:
    return assembly::Plane{};
  case 3:
  case 4:
  case 5:
    return assembly::Sphere{signed_radius(dice, size)};
  case 6:
  case 7:
    return assembly::Conic{signed_radius(dice, size), dice.between(-2.5, 1.0)};
  default:
    return random_asphere(dice, size);
  }
}

Clear random_clear(Dice& dice, double size) {
  Clear clear;
  const double open = size * dice.between(1.0, 2.5);
  switch (dice.whole(0, 5)) {
  case 0:
    break;
  case 1:
    clear.opening = Clear::Rectangle{open, open * dice.between(0.7, 1.2)};
    break;
  case 2:
    clear.opening = Clear::Ellipse{open, open * dice.between(0.7, 1.2)};
    break;
  default:
    clear.opening = Clear::Disc{open};
  }
  if (dice.chance(0.15))
    clear.hole_radius = size * dice.between(0.05, 0.4);
  if (dice.chance(0.25))
    clear.at = {dice.around_zero(0.2 * size), dice.around_zero(0.2 * size)};
  return clear;
}

assembly::Coating random_layers(Dice& dice, const Shelf& shelf) {
  assembly::Layers layers;
  for (int count = dice.whole(1, 5); count > 0; --count)
    add_films(layers.films, dice, shelf);
  if (dice.chance(0.2)) { // a repeated group
    const std::vector<assembly::Film> group = layers.films;
    for (int times = dice.whole(1, 4); times > 0; --times)
      layers.films.insert(layers.films.end(), group.begin(), group.end());
  }
  if (!shelf.metals.empty() && dice.chance(0.15)) // a thin metal, sometimes too thick to see through
    layers.films.push_back({dice.one_of(shelf.metals), dice.magnitude(2.0, 200.0), {}});
  return {"layers", layers};
}

assembly::Coating random_ideal(Dice& dice, bool lossless) {
  const auto powers = [&] {
    const double reflect = dice.between(0.0, 1.0);
    return assembly::Ideal::Powers{reflect, (1.0 - reflect) * (lossless ? 1.0 : dice.between(0.5, 1.0))};
  };
  assembly::Ideal coating{powers(), powers()};
  if (dice.chance(0.5))
    coating.p = coating.s;
  return {"ideal", coating};
}

assembly::Coating random_measured(Dice& dice, const Shelf& shelf, bool lossless) {
  constexpr double pi = std::numbers::pi;
  assembly::Measured curves;
  curves.wavelengths_nm = random_grid(dice, 430.0, 1120.0, dice.whole(1, 4));
  curves.angles_deg = random_grid(dice, 0.0, dice.between(20.0, 65.0), dice.whole(1, 4));
  if (curves.angles_deg.size() == 1)
    curves.shift_index = dice.between(1.4, 2.2);
  if (dice.chance(0.4))
    curves.from = dice.one_of(dice.chance(0.5) ? shelf.gases : shelf.glasses);
  curves.has_phases = dice.chance(0.5);
  const double phase_r = dice.around_zero(pi);
  const double phase_t = dice.around_zero(pi);
  for (std::size_t i = 0; i < curves.wavelengths_nm.size() * curves.angles_deg.size(); ++i) {
    const MeasuredChannel s = random_channel(dice, phase_r, phase_t, lossless);
    MeasuredChannel p = random_channel(dice, phase_r + pi, phase_t, lossless);
    const bool at_normal_incidence = i % curves.angles_deg.size() == 0;
    if (at_normal_incidence)
      p = {s.reflect, s.transmit, s.reflect_back, std::remainder(s.phase_r + pi, 2.0 * pi), s.phase_t};
    assembly::Measured::Phases phases{pi, 0.0, 0.0, 0.0};
    if (curves.has_phases)
      phases = {s.phase_r, p.phase_r, s.phase_t, p.phase_t};
    curves.points.push_back(
        {{s.reflect, p.reflect}, {s.transmit, p.transmit}, {s.reflect_back, p.reflect_back}, phases});
  }
  return {"measured", curves};
}

assembly::Effect random_element(Dice& dice, bool lossless) {
  const double axis = dice.around_zero(90.0);
  const int kind = dice.whole(lossless ? 1 : 0, 2);
  if (kind == 0) {
    const double block = dice.chance(0.5) ? 0.0 : dice.magnitude(1e-6, 0.1);
    return assembly::Polarizer{axis, dice.chance(0.3) ? 1.0 : dice.between(0.5, 1.0), block};
  }
  if (kind == 1) {
    const double retardance = dice.one_of({90.0, 180.0, dice.around_zero(400.0)});
    return assembly::Retarder{axis, retardance,
                              dice.chance(0.5) ? std::optional(dice.between(400.0, 1200.0)) : std::nullopt};
  }
  return assembly::Rotator{dice.around_zero(180.0), dice.chance(0.5) ? assembly::Rotator::Kind::faraday
                                                                     : assembly::Rotator::Kind::active};
}

} // namespace lightledger::reference
