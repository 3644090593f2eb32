#include "train.hpp"

#include "clear.hpp"
#include "elements.hpp"
#include "plain_text.hpp"
#include "shape.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <iterator>
#include <utility>

namespace lightledger::assembly {

namespace {

constexpr std::string_view station_example = "{name: window front, into: fused-silica, gap: 4}, …";
const std::vector<std::string_view> actions{"refract",  "reflect", "stop",  "detect",
                                            "polarize", "retard",  "rotate"}; // in the order of Does
const std::vector<std::string_view> effects{"polarize", "retard", "rotate"};
constexpr std::array<std::string_view, 7> kinds{
    "a refracting station", "a reflecting station", "a stop",   "a detector",
    "a polarizer",          "a retarder",           "a rotator"}; // in the order of Does
constexpr std::uint64_t most_pixels = std::uint64_t{1} << 28U;

} // namespace

void Train::read(Value section, Mark beam) {
  const auto stations = m_reader.items(section, "a list of stations in the order of the light");
  if (!stations)
    return;
  for (std::size_t i = 0; i < stations->size(); ++i)
    read_station((*stations)[i], next_of(*stations, i));
  if (m_assembly.light.beam.fill_stop && m_actions_known && !m_stop_met)
    m_reader.fault(beam, "'fill_stop' needs a stop in the train to fill",
                   "{name: pupil, does: stop, clear: {diameter: 8}, gap: 3} among the stations");
}

Train::Next Train::next_of(const std::vector<Value>& stations, std::size_t i) const {
  if (i + 1 == stations.size())
    return Next::nothing;
  const auto& entries = m_reader.node(stations[i + 1]).entries;
  const bool again = std::any_of(entries.begin(), entries.end(),
                                 [](const Node::Entry& entry) { return entry.key == "again"; });
  return again ? Next::visit : Next::station;
}

void Train::read_station(Value value, Next next) {
  auto station = Mapping::read(m_reader, {value.id, "station"}, "a station", station_example);
  m_current_known = m_current_known && station;
  m_actions_known = m_actions_known && station;
  if (!station)
    return;
  if (station->has("again"))
    return read_again(*station, next);
  const Does does = read_does(*station);
  m_current_known = m_current_known && does != Does::unavailable;
  m_actions_known = m_actions_known && does != Does::unavailable;
  if (does == Does::unavailable)
    read_name(*station);
  else
    read_first_visit(*station, does, next);
}

std::string_view Train::word(Does does) {
  return actions[static_cast<std::size_t>(does)];
}

void Train::read_first_visit(Mapping& station, Does does, Next next) {
  station.call(kinds[static_cast<std::size_t>(does)]);
  Station result{};
  result.name = read_name(station);
  result.surface = static_cast<SurfaceId>(m_assembly.surfaces.size());
  Met met{result.name, result.surface, does, false, false, 0, {}};
  const bool arriving_known = m_current_known;
  const std::size_t faults = m_reader.fault_count();
  Surface surface = read_surface(station, does);
  const auto rear = does == Does::reflect ? read_rear(station, result.name, surface) : std::nullopt;
  met.media_known =
      arriving_known && m_reader.fault_count() == faults && (does != Does::refract || surface.beyond);
  met.rear = rear.has_value();
  met.before = surface.before;
  met.beyond = surface.beyond;
  if (does == Does::stop)
    check_stop(station, surface);
  result.gap = read_gap(station, next);
  if (does != Does::detect)
    result.turn_deg = station.tuple_or_zero<3>("turn", Unit::degrees);
  result.intended = does == Does::detect ? Act::detect : does == Does::reflect ? Act::bounce : Act::pass;
  station.finish();
  if (!result.name.empty())
    m_met[result.name] = met;
  if (m_reader.fault_count() == 0) { // else nothing will come of it, so nothing is kept
    m_assembly.surfaces.push_back(surface);
    if (rear)
      m_assembly.surfaces.push_back(*rear);
  }
  keep(station, does, std::move(result), next);
}

void Train::keep(const Mapping& station, Does does, Station result, Next next) {
  if (next == Next::nothing && does != Does::detect)
    m_reader.fault(station.mark(), "the train ends without a detector", "a last station that does: detect");
  if (next != Next::nothing && does == Does::detect)
    m_reader.fault(station.key_mark("does"), "a detector stands before the end of the train",
                   "one detector, at the end");
  if (m_reader.fault_count() == 0)
    m_assembly.stations.push_back(std::move(result));
}

std::string Train::read_name(Mapping& station) {
  const auto value = station.need("name");
  const auto name = value ? m_reader.name(*value) : std::nullopt;
  return name ? new_name(*value, *name) : std::string();
}

std::string Train::new_name(Value value, const std::string& name) {
  if (!m_met.try_emplace(name).second)
    m_reader.fault_from([&] {
      return Fault{m_reader.mark(value),
                   fmt::format("a station called {} stands before", quoted(name)),
                   "a name of its own for every station",
                   {}};
    });
  if (const auto front = std::as_const(m_rears).find(name); front != m_rears.end())
    m_reader.fault(m_reader.mark(value),
                   fmt::format("the rear face of {} is called {}", quoted(front->second), quoted(name)),
                   "a name of its own for every station");
  return name;
}

/// The action of a station, which a mapping of that name may stand for.
Train::Does Train::read_does(Mapping& station) {
  const auto value = station.take("does");
  const Does does = value ? action(*value, actions) : Does::refract;
  std::vector<std::string_view> written;
  std::copy_if(effects.begin(), effects.end(), std::back_inserter(written),
               [&station](std::string_view effect) { return station.has(effect); });
  if (written.empty() && !value)
    for (const std::string_view key : {"again", "polarize", "retard", "rotate"})
      station.take(key); // where nothing is said, each of these could have been meant
  if (written.empty())
    return does;
  if (written.size() > 1) {
    station.one_of(written, "one effect at a station");
    return Does::unavailable;
  }
  const auto meant =
      static_cast<Does>(std::find(actions.begin(), actions.end(), written[0]) - actions.begin());
  if (value && does != meant && does != Does::unavailable)
    m_reader.fault(station.key_mark(written[0]),
                   fmt::format("'{}' stands at a station that does: {}", written[0],
                               actions[static_cast<std::size_t>(does)]),
                   fmt::format("does: {}, which may be left out", written[0]));
  return meant;
}

Train::Does Train::action(Value value, const std::vector<std::string_view>& accepted) {
  const Node& word = m_reader.node(value);
  const std::string all = fmt::format("{}", fmt::join(accepted, ", "));
  if (word.kind != Node::Kind::scalar) {
    m_reader.wrong_kind(value, all);
    return Does::unavailable;
  }
  std::string meant = word.scalar;
  if (std::find(accepted.begin(), accepted.end(), meant) == accepted.end()) {
    meant = m_reader.suggest(meant, accepted);
    m_reader.fault(word.mark, fmt::format("'does' is {}", quoted(word.scalar)), all, meant);
  }
  const auto found = std::find(actions.begin(), actions.end(), meant);
  return found == actions.end() ? Does::unavailable : static_cast<Does>(found - actions.begin());
}

Gap Train::read_gap(Mapping& station, Next next) {
  if (next == Next::visit) {
    station.forbid("gap",
                   "is given, but the next station meets a surface again, and the place of that decides",
                   "no gap before a station with 'again'");
    return UpToSurface{};
  }
  const auto value = next == Next::nothing ? station.take("gap") : station.need("gap");
  if (!value)
    return 0.0;
  const Node& node = m_reader.node(*value);
  if (node.kind == Node::Kind::scalar && node.scalar == "focus") {
    if (next == Next::nothing)
      m_reader.fault(node.mark, "no station follows that a focus could place");
    return Focus{};
  }
  return m_reader.number(*value, Unit::millimetres, Bound::not_negative).value_or(0.0);
}

/// The first stop of a train whose beam fills it must have an outline.
void Train::check_stop(const Mapping& station, const Surface& surface) {
  const bool first = !std::exchange(m_stop_met, true);
  if (first && m_assembly.light.beam.fill_stop &&
      std::holds_alternative<Clear::Unlimited>(surface.clear.opening))
    m_reader.fault(station.mark(), "the beam is to fill this stop, which has no outline",
                   "clear: {diameter: 8}");
}

Surface Train::read_surface(Mapping& station, Does does) {
  Surface surface;
  surface.before = m_current;
  if (const auto clear = station.take("clear"))
    surface.clear = read_clear(m_reader, *clear);
  surface.tilt_deg = station.tuple_or_zero<3>("tilt", Unit::degrees);
  surface.shift = station.tuple_or_zero<2>("shift", Unit::millimetres);
  if (does == Does::refract || does == Does::reflect || does == Does::detect)
    surface.shape = read_shape(m_reader, station);
  surface.effect = read_effect(station, does);
  if (does != Does::detect)
    surface.loss = station.number_or(0.0, "loss", Unit::fraction, Bound::share);
  if (does == Does::refract)
    read_refracting(station, surface);
  if (does == Does::reflect)
    read_reflecting(station, surface);
  return surface;
}

Effect Train::read_effect(Mapping& station, Does does) {
  if (does == Does::stop)
    return Opening{};
  if (does == Does::detect)
    return read_sensor(station);
  if (does == Does::refract || does == Does::reflect || does == Does::unavailable)
    return Interface{};
  const auto value = station.need(actions[static_cast<std::size_t>(does)]);
  if (!value)
    return Opening{};
  if (does == Does::polarize)
    return read_polarizer(m_reader, *value);
  if (does == Does::retard)
    return read_retarder(m_reader, *value);
  return read_rotator(m_reader, *value);
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
