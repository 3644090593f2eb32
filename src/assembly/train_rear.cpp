#include "plain_text.hpp"
#include "train.hpp"

#include <fmt/format.h>

#include <cmath>

namespace lightledger::assembly {

namespace {

constexpr std::string_view rear_form = "{thickness: 3, coating: ar, wedge: [0, 0.5]}";

std::array<double, 2> read_wedge(Reader& reader, Mapping& rear) {
  const auto value = rear.take("wedge");
  const auto wedge = value ? reader.tuple<2>(*value, Unit::degrees, Bound::any) : std::nullopt;
  if (wedge && (std::abs((*wedge)[0]) >= 90.0 || std::abs((*wedge)[1]) >= 90.0))
    reader.fault(reader.mark(*value), "'wedge' turns the rear face by 90 degrees or more",
                 "angles between -90 and 90 degrees");
  return wedge.value_or(std::array<double, 2>{});
}

} // namespace

/// The back face of the plate whose front a reflecting station is; the front learns of it.
std::optional<Surface> Train::read_rear(Mapping& station, const std::string& name, Surface& front) {
  const auto value = station.take("rear");
  auto rear = value ? Mapping::read(m_reader, *value, "a rear face", rear_form) : std::nullopt;
  if (!rear)
    return std::nullopt;
  check_plate(station, front);
  reserve_rear_name(station, name);
  Surface face{};
  face.shape = Plane{};
  face.clear = front.clear;
  face.effect = Interface{};
  face.before = front.beyond.value_or(front.before);
  face.beyond = front.before;
  const auto thickness = rear->need_number("thickness", Unit::millimetres, Bound::positive);
  const auto wedge = read_wedge(m_reader, *rear);
  if (const auto coating = read_coating(*rear); coating && front.beyond)
    face.coating = placed(*coating, face);
  rear->finish();
  front.rear = Rear{static_cast<SurfaceId>(m_assembly.surfaces.size() + 1), thickness.value_or(1.0), wedge};
  return face;
}

/// A plate is made of the front's backing, and light must go on in it.
void Train::check_plate(const Mapping& station, const Surface& front) {
  const Mark mark = station.key_mark("rear");
  if (!station.has("backing"))
    m_reader.fault(mark,
                   "'rear' is the back face of a plate, and needs a 'backing' that the plate is made of",
                   "backing: fused-silica");
  const auto opaque = front.beyond ? m_coverage.opaque_at_nm(*front.beyond) : std::nullopt;
  if (opaque)
    m_reader.fault(
        mark,
        fmt::format("the plate is of {}, which is opaque at {} nm, so no light comes to its 'rear'",
                    m_assembly.media[*front.beyond].name, *opaque),
        "a backing of kappa up to 1e-3");
}

/// Bounces at the rear face go by a name of its own, which no station may have.
void Train::reserve_rear_name(const Mapping& station, const std::string& name) {
  if (name.empty())
    return;
  const std::string rear = name + " rear";
  if (m_met.contains(rear))
    m_reader.fault(station.key_mark("rear"),
                   fmt::format("the rear face is called {}, as a station before is", quoted(rear)),
                   "a name of its own for every station and every rear face");
  m_rears.try_emplace(rear, name);
}

} // namespace lightledger::assembly
