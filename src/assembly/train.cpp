#include "train.hpp"

#include "clear.hpp"
#include "plain_text.hpp"
#include "shape.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <utility>

namespace lightledger::assembly {

namespace {

constexpr std::string_view station_example = "{name: window front, into: fused-silica, gap: 4}, …";
constexpr std::string_view actions_text = "refract, reflect, stop, detect";
const std::vector<std::string_view> actions{"refract", "reflect", "stop", "detect"}; // in the order of Does
constexpr std::array<std::string_view, 3> later_actions{"polarize", "retard", "rotate"};
constexpr std::array<std::string_view, 4> kinds{"a refracting station", "a reflecting station", "a stop",
                                                "a detector"}; // in the order of Does
constexpr std::uint64_t most_pixels = std::uint64_t{1} << 28U;

} // namespace

void Train::read(Value section) {
  const auto stations = m_reader.items(section, "a list of stations in the order of the light");
  if (!stations)
    return;
  for (std::size_t i = 0; i < stations->size(); ++i)
    read_station((*stations)[i], i + 1 == stations->size());
}

void Train::read_station(Value value, bool last) {
  auto station = Mapping::read(m_reader, {value.id, "station"}, "a station", station_example);
  m_current_known = m_current_known && station;
  if (!station)
    return;
  Station result{};
  read_name(*station, result);
  const Does does = read_does(*station);
  m_current_known = m_current_known && does != Does::unavailable;
  if (does == Does::unavailable)
    return;
  station->call(kinds[static_cast<std::size_t>(does)]);
  Surface surface = read_surface(*station, does);
  result.gap = read_gap(*station, last);
  result.turn_deg = does == Does::detect ? result.turn_deg : station->tuple_or_zero<3>("turn", Unit::degrees);
  result.intended = does == Does::detect ? Act::detect : does == Does::reflect ? Act::bounce : Act::pass;
  station->finish();
  if (last && does != Does::detect)
    m_reader.fault(station->mark(), "the train ends without a detector", "a last station that does: detect");
  if (!last && does == Does::detect)
    m_reader.fault(station->key_mark("does"), "a detector stands before the end of the train",
                   "one detector, at the end");
  if (m_reader.fault_count() != 0)
    return; // nothing will come of it, so nothing is kept
  result.surface = static_cast<SurfaceId>(m_assembly.surfaces.size());
  m_assembly.surfaces.push_back(surface);
  m_assembly.stations.push_back(std::move(result));
}

void Train::read_name(Mapping& station, Station& result) {
  const auto value = station.need("name");
  const auto name = value ? m_reader.name(*value) : std::nullopt;
  if (!name)
    return;
  if (!m_names.insert(*name).second)
    m_reader.fault_from([&] {
      return Fault{m_reader.mark(*value),
                   fmt::format("a station called {} stands before", quoted(*name)),
                   "a name of its own for every station",
                   {}};
    });
  result.name = *name;
}

Train::Does Train::read_does(Mapping& station) {
  bool later = station.unavailable("again");
  for (const std::string_view action : later_actions)
    later = station.unavailable(action) || later;
  if (later)
    return Does::unavailable;
  station.unavailable("rear");
  const auto value = station.take("does");
  return value ? action(*value) : Does::refract;
}

Train::Does Train::action(Value value) {
  const Node& word = m_reader.node(value);
  if (word.kind != Node::Kind::scalar) {
    m_reader.wrong_kind(value, actions_text);
    return Does::unavailable;
  }
  if (std::find(later_actions.begin(), later_actions.end(), word.scalar) != later_actions.end()) {
    m_reader.fault(word.mark, fmt::format("{} is not available in this version", quoted(word.scalar)),
                   std::string(actions_text));
    return Does::unavailable;
  }
  std::string meant = word.scalar;
  if (std::find(actions.begin(), actions.end(), meant) == actions.end()) {
    meant = m_reader.suggest(meant, actions);
    m_reader.fault(word.mark, fmt::format("'does' is {}", quoted(word.scalar)), std::string(actions_text),
                   meant);
  }
  const auto found = std::find(actions.begin(), actions.end(), meant);
  return found == actions.end() ? Does::unavailable : static_cast<Does>(found - actions.begin());
}

Gap Train::read_gap(Mapping& station, bool last) {
  const auto value = last ? station.take("gap") : station.need("gap");
  if (!value)
    return 0.0;
  const Node& node = m_reader.node(*value);
  if (node.kind == Node::Kind::scalar && node.scalar == "focus") {
    if (last)
      m_reader.fault(node.mark, "no station follows that a focus could place");
    return Focus{};
  }
  return m_reader.number(*value, Unit::millimetres, Bound::not_negative).value_or(0.0);
}

Surface Train::read_surface(Mapping& station, Does does) {
  Surface surface;
  surface.before = m_current;
  if (const auto clear = station.take("clear"))
    surface.clear = read_clear(m_reader, *clear);
  surface.tilt_deg = station.tuple_or_zero<3>("tilt", Unit::degrees);
  surface.shift = station.tuple_or_zero<2>("shift", Unit::millimetres);
  if (does == Does::stop)
    surface.effect = Opening{};
  else
    surface.shape = read_shape(m_reader, station);
  if (does == Does::detect)
    surface.effect = read_sensor(station);
  else
    surface.loss = station.number_or(0.0, "loss", Unit::fraction, Bound::share);
  if (does == Does::refract)
    read_refracting(station, surface);
  if (does == Does::reflect)
    read_reflecting(station, surface);
  return surface;
}

Sensor Train::read_sensor(Mapping& station) {
  Sensor sensor;
  sensor.reflectance = station.number_or(0.0, "reflectance", Unit::fraction, Bound::share);
  const auto value = station.take("pixels");
  if (!value)
    return sensor;
  const Node& pixels = m_reader.node(*value);
  if (pixels.kind != Node::Kind::sequence || pixels.items.size() != 2) {
    m_reader.fault(pixels.mark, "'pixels' is not two counts", "[columns along x, rows along y]");
    return sensor;
  }
  const auto columns = m_reader.count({pixels.items[0], value->label});
  const auto rows = m_reader.count({pixels.items[1], value->label});
  if (!columns || !rows)
    return sensor;
  if (*columns > most_pixels / *rows)
    m_reader.fault(pixels.mark, fmt::format("'pixels' are {} × {}; at most {} in all are kept", *columns,
                                            *rows, most_pixels));
  else
    sensor.pixels = {static_cast<std::uint32_t>(*columns), static_cast<std::uint32_t>(*rows)};
  return sensor;
}

} // namespace lightledger::assembly
