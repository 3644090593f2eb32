#include "reference/random_assembly.hpp"

#include "reference/bench.hpp"
#include "reference/media.hpp"
#include "reference/random_parts.hpp"

#include <algorithm>
#include <array>
#include <stdexcept>
#include <string>

namespace lightledger::reference {
namespace {

using assembly::Act;
using assembly::MediumId;
using assembly::Station;
using assembly::Surface;

bool contains(const std::vector<MediumId>& media, MediumId medium) {
  return std::find(media.begin(), media.end(), medium) != media.end();
}

optics::State random_state(Dice& dice) {
  switch (dice.whole(0, 4)) {
  case 0:
    return {};
  case 1:
    return optics::linear(dice.between(-90.0, 90.0));
  case 2:
    return optics::elliptical(0.0, dice.one_of({-45.0, 45.0}));
  case 3:
    return optics::elliptical(dice.between(-90.0, 90.0), dice.between(-45.0, 45.0));
  default: {
    const optics::State pure = optics::elliptical(dice.between(-90.0, 90.0), dice.between(-45.0, 45.0));
    const double degree = dice.between(0.0, 1.0);
    return {degree * pure.s1, degree * pure.s2, degree * pure.s3};
  }
  }
}

/// Builds one assembly from the light to the detector.
class Builder {
public:
  Builder(std::uint64_t seed, const Variety& variety) : m_dice(seed), m_variety(variety) {}

  assembly::Assembly build() {
    m_result.title = "random";
    m_shelf = stock(m_result, m_dice, m_variety.lossless);
    light();
    m_medium = m_result.light.medium;
    for (int rest = m_dice.whole(1, 11); rest > 0; --rest)
      station();
    if (m_variety.returning)
      way_back();
    detector();
    focus_where_there_is_one();
    return m_result;
  }

private:
  void light() {
    assembly::Light& light = m_result.light;
    m_size = m_dice.between(0.5, 6.0);
    for (int count = m_dice.whole(1, 3); count > 0; --count)
      light.wavelengths.push_back({m_dice.between(450.0, 1100.0), m_dice.between(0.1, 2.0)});
    light.polarization = random_state(m_dice);
    light.medium = m_dice.one_of(m_dice.chance(0.85) ? m_shelf.gases : m_shelf.glasses);
    light.beam.radius = m_size;
    if (m_dice.chance(0.3))
      light.beam.gaussian = m_size * m_dice.between(0.5, 2.0);
    if (m_dice.chance(0.2))
      light.beam.inner = m_size * m_dice.between(0.1, 0.5);
    if (m_dice.chance(0.2))
      light.beam.at = {m_dice.around_zero(0.2 * m_size), m_dice.around_zero(0.2 * m_size)};
    object(light);
    sampling(light);
  }

  void object(assembly::Light& light) {
    if (m_dice.chance(0.3))
      light.object_distance = m_size * m_dice.magnitude(8.0, 400.0);
    else if (m_dice.chance(0.2))
      light.object_distance = -m_size * m_dice.magnitude(10.0, 400.0);
    const double reach = light.object_distance ? 0.03 * std::abs(*light.object_distance) : 3.0;
    light.fields.clear();
    for (int count = m_dice.whole(1, 2); count > 0; --count)
      light.fields.push_back(
          {{m_dice.around_zero(reach), m_dice.around_zero(reach)}, m_dice.between(0.5, 1.5), {}});
  }

  void sampling(assembly::Light& light) {
    switch (m_dice.whole(0, 2)) {
    case 0:
      light.sampling = assembly::Rings{4, 8};
      break;
    case 1:
      light.sampling = assembly::Grid{7};
      break;
    default:
      light.sampling = assembly::Scattered{48};
    }
  }

  void station() {
    const double kind = m_dice.between(0.0, 1.0);
    if (kind < 0.12)
      stop();
    else if (kind < 0.24)
      element();
    else if (kind < 0.38)
      mirror();
    else if (kind < 0.44 && !m_variety.reversible)
      way_back();
    else
      lens_face();
  }

  void way_back() {
    switch (m_dice.whole(0, 2)) {
    case 0:
      second_surface_mirror();
      break;
    case 1:
      double_pass();
      break;
    default:
      mirror_met_twice();
    }
  }

  void second_surface_mirror() {
    lens_face();
    const std::size_t front = m_result.stations.size() - 1;
    mirror(20.0);
    again(front, Act::pass);
  }

  /// Through some of the stations before to a mirror, and back through them.
  void double_pass() {
    const std::size_t mirror_at = m_result.stations.size();
    mirror(6.0);
    const std::size_t most = std::min<std::size_t>(mirror_at, static_cast<std::size_t>(m_dice.whole(1, 3)));
    for (std::size_t back = 1; back <= most; ++back)
      if (m_result.stations[mirror_at - back].intended != Act::pass || !again(mirror_at - back, Act::pass))
        return;
  }

  /// Two mirrors that see each other; on the way back the first one reflects once more, or lets through.
  void mirror_met_twice() {
    mirror(25.0);
    const std::size_t first = m_result.stations.size() - 1;
    mirror(8.0);
    const auto& beyond = m_result.surfaces[m_result.stations[first].surface].beyond;
    const bool passable = beyond && !contains(m_shelf.metals, *beyond) && !rear_of(first);
    again(first, passable && m_dice.chance(0.5) ? Act::pass : Act::bounce);
  }

  [[nodiscard]] const std::optional<assembly::Rear>& rear_of(std::size_t station) const {
    return m_result.surfaces[m_result.stations[station].surface].rear;
  }

  /// Meets the surface of an earlier station again; false, and nothing happens, where the axis does not come
  /// back to it.
  bool again(std::size_t earlier, Act act) {
    Station station = m_result.stations[earlier];
    station.name += " again " + std::to_string(m_result.stations.size());
    station.intended = act;
    station.gap = way(m_medium);
    station.turn_deg = {};
    const assembly::Gap written = m_result.stations.back().gap;
    m_result.stations.back().gap = assembly::UpToSurface{};
    m_result.stations.push_back(station);
    try {
      m_medium = medium_behind(m_result, station, lay_out(m_result).stations.back().from);
      m_result.stations.back().gap = way(m_medium);
      return true;
    } catch (const std::domain_error&) {
      m_result.stations.pop_back();
      m_result.stations.back().gap = written;
      return false;
    }
  }

  /// A length of the way in a medium.
  double way(MediumId medium) {
    return m_size * (contains(m_shelf.glasses, medium) ? m_dice.between(0.2, 1.5) : m_dice.between(0.5, 8.0));
  }

  void element() {
    Surface surface;
    surface.effect = random_element(m_dice, m_variety.lossless);
    surface.shape = assembly::Plane{};
    if (m_dice.chance(0.5))
      surface.tilt_deg = {m_dice.around_zero(40.0), m_dice.around_zero(20.0), m_dice.around_zero(90.0)};
    add(surface, Act::pass);
  }

  void stop() {
    Surface surface;
    surface.effect = assembly::Opening{};
    surface.shape = assembly::Plane{};
    add(surface, Act::pass);
  }

  void lens_face() {
    Surface surface = interface();
    const bool in_glass = contains(m_shelf.glasses, m_medium);
    surface.beyond = m_dice.one_of(in_glass && m_dice.chance(0.8) ? m_shelf.gases : m_shelf.glasses);
    if (m_dice.chance(0.3))
      surface.tilt_deg = {m_dice.around_zero(4.0), m_dice.around_zero(4.0), m_dice.around_zero(90.0)};
    coat(surface, 0.5);
    add(surface, Act::pass);
    m_medium = *surface.beyond;
  }

  void mirror(double most_tilt = 50.0) {
    Surface surface = interface();
    surface.tilt_deg = {m_dice.around_zero(most_tilt), m_dice.around_zero(0.4 * most_tilt),
                        m_dice.around_zero(45.0)};
    if (m_dice.chance(0.15)) { // held by nothing but its coating
      surface.coating = coating(m_dice.chance(0.5) ? random_ideal(m_dice, m_variety.lossless)
                                                   : random_measured(m_dice, m_shelf, m_variety.lossless),
                                m_dice.one_of({assembly::Side::before, assembly::Side::beyond}));
    } else {
      const bool metallic = !m_shelf.metals.empty() && m_dice.chance(0.7);
      surface.beyond = m_dice.one_of(metallic ? m_shelf.metals : m_shelf.glasses);
      coat(surface, metallic ? 0.4 : 0.8);
    }
    add(surface, Act::bounce);
    if (surface.beyond && contains(m_shelf.glasses, *surface.beyond) && m_dice.chance(0.6))
      rear_face();
  }

  /// Makes the mirror added last the front of a plate.
  void rear_face() {
    Surface& front = m_result.surfaces.back();
    front.rear = {static_cast<assembly::SurfaceId>(m_result.surfaces.size()),
                  m_size * m_dice.between(0.2, 1.5),
                  {m_dice.around_zero(1.0), m_dice.around_zero(1.0)}};
    Surface rear;
    rear.effect = assembly::Interface{};
    rear.clear = front.clear;
    rear.before = *front.beyond;
    rear.beyond = front.before;
    if (m_dice.chance(0.6))
      rear.coating = coating(any_coating(), m_dice.one_of({assembly::Side::before, assembly::Side::beyond}));
    m_result.surfaces.push_back(rear);
  }

  void detector() {
    Surface surface;
    surface.effect = assembly::Sensor{{}, m_dice.between(0.0, 0.1)};
    surface.shape = m_dice.chance(0.8)
                        ? assembly::Shape(assembly::Plane{})
                        : assembly::Shape(assembly::Sphere{-m_size * m_dice.between(10.0, 40.0)});
    add(surface, Act::detect);
    m_result.surfaces.back().loss = 0.0;
    m_result.stations.back().gap = 0.0;
    m_result.stations.back().turn_deg = {};
  }

  Surface interface() {
    Surface surface;
    surface.effect = assembly::Interface{};
    surface.shape = random_shape(m_dice, m_size);
    if (!m_variety.lossless && m_dice.chance(0.25))
      surface.roughness_nm = m_dice.between(0.5, 15.0);
    return surface;
  }

  void coat(Surface& surface, double probability) {
    if (!m_dice.chance(probability))
      return;
    const bool on_the_near_side = contains(m_shelf.glasses, m_medium) && m_dice.chance(0.5);
    surface.coating =
        coating(any_coating(), on_the_near_side ? assembly::Side::before : assembly::Side::beyond);
  }

  assembly::Coating any_coating() {
    const double kind = m_dice.between(0.0, 1.0);
    if (kind < 0.6)
      return random_layers(m_dice, m_shelf);
    return kind < 0.8 ? random_ideal(m_dice, m_variety.lossless)
                      : random_measured(m_dice, m_shelf, m_variety.lossless);
  }

  assembly::CoatingUse coating(assembly::Coating coating, assembly::Side substrate) {
    coating.name += " " + std::to_string(m_result.coatings.size());
    m_result.coatings.push_back(coating);
    return {static_cast<assembly::CoatingId>(m_result.coatings.size() - 1), substrate};
  }

  /// Adds what every station has: an opening, small errors of position, loss, the way to the next.
  void add(Surface surface, Act act) {
    surface.before = m_medium;
    Station station;
    station.name = "station " + std::to_string(m_result.stations.size());
    station.surface = static_cast<assembly::SurfaceId>(m_result.surfaces.size());
    station.intended = act;
    station.gap = way(act == Act::pass ? surface.beyond.value_or(m_medium) : m_medium);
    if (m_dice.chance(0.1))
      station.turn_deg = {m_dice.around_zero(8.0), m_dice.around_zero(8.0), m_dice.around_zero(90.0)};
    const bool axis_goes_on = act != Act::bounce && station.turn_deg == std::array<double, 3>{};
    if (m_dice.chance(0.25) && (axis_goes_on || !m_variety.reversible))
      surface.shift = {m_dice.around_zero(0.15 * m_size), m_dice.around_zero(0.15 * m_size)};
    if (!m_variety.lossless && m_dice.chance(0.2))
      surface.loss = m_dice.between(0.0, 0.05);
    if (!m_variety.lossless && m_dice.chance(0.8))
      surface.clear = random_clear(m_dice, 1.5 * m_size);
    m_result.surfaces.push_back(surface);
    m_result.stations.push_back(station);
  }

  /// Some gaps lead to the focus, where that is real and near.
  void focus_where_there_is_one() {
    if (!m_dice.chance(0.3))
      return;
    Station& station = m_result.stations[static_cast<std::size_t>(
        m_dice.whole(0, static_cast<int>(m_result.stations.size()) - 2))];
    const assembly::Gap written = station.gap;
    if (std::holds_alternative<assembly::UpToSurface>(written))
      return;
    station.gap = assembly::Focus{};
    try {
      const Bench bench = lay_out(m_result);
      const auto index = static_cast<std::size_t>(&station - m_result.stations.data());
      if (bench.stations[index].gap < 50.0 * m_size)
        return;
    } catch (const std::domain_error&) { // no image: the written gap stays
    }
    station.gap = written;
  }

  Dice m_dice;
  Variety m_variety;
  assembly::Assembly m_result;
  Shelf m_shelf;
  MediumId m_medium = 0;
  double m_size = 1.0; ///< of the beam, mm
};

} // namespace

assembly::Assembly random_assembly(std::uint64_t seed, const Variety& variety) {
  return Builder(seed, variety).build();
}

} // namespace lightledger::reference
