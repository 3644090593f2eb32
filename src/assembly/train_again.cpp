#include "plain_text.hpp"
#include "train.hpp"

#include <fmt/format.h>

#include <array>
#include <utility>

namespace lightledger::assembly {

namespace {

const std::vector<std::string_view> actions{"refract", "reflect"};
constexpr std::array<std::string_view, 12> surface_keys{"radius", "conic",     "asphere", "tilt",
                                                        "shift",  "clear",     "coating", "backing",
                                                        "rear",   "roughness", "loss",    "reflectance"};

} // namespace

void Train::read_again(Mapping& station, Next next) {
  station.call("a station with 'again'");
  const Value earlier = *station.take("again");
  const Met* const met = find_earlier(earlier);
  const Does does = read_does_again(station, met);
  if (met != nullptr)
    arrive_again(*met, m_reader.mark(earlier));
  if (does == Does::reflect)
    station.call("a reflecting station with 'again'");
  if (does == Does::refract)
    refract_again(station, met);
  if (does == Does::refract && met != nullptr && met->rear)
    refuse_passing_plate(*met, m_reader.mark(earlier));
  forbid_surface_keys(station, met);
  m_current_known = m_current_known && does != Does::unavailable;
  Station result{};
  result.surface = met == nullptr ? 0 : met->surface;
  result.intended = does == Does::reflect ? Act::bounce : Act::pass;
  result.gap = read_gap(station, next);
  result.turn_deg = station.tuple_or_zero<3>("turn", Unit::degrees);
  result.name = read_again_name(station, earlier);
  if (met != nullptr && met->rear)
    reserve_rear_name(station, result.name);
  station.finish();
  if (met != nullptr && !result.name.empty())
    m_met[result.name] = Met(*met);
  keep(station, does, std::move(result), next);
}

/// An element or a stop does again what it did; a boundary may refract on one visit and reflect on another.
Train::Does Train::read_does_again(Mapping& station, const Met* met) {
  const auto value = station.take("does");
  if (met == nullptr || met->interface())
    return value ? action(*value, actions) : Does::refract;
  if (value)
    action(*value, {word(met->does)});
  return met->does;
}

std::string Train::read_again_name(Mapping& station, Value earlier) {
  if (station.has("name"))
    return read_name(station);
  station.take("name");
  const Node& name = m_reader.node(earlier);
  return name.scalar.empty() ? std::string() : new_name(earlier, name.scalar + " again");
}

const Train::Met* Train::find_earlier(Value value) {
  constexpr std::string_view accepted = "the name of a station that stands before";
  const auto name = m_reader.name(value);
  if (!name)
    return nullptr;
  const auto found = m_met.find(*name);
  if (found == m_met.end()) {
    m_reader.fault_from([&] {
      std::vector<std::string_view> names;
      for (const auto& [known, met] : m_met)
        names.emplace_back(known);
      return Fault{m_reader.mark(value), fmt::format("no station called {} stands before", quoted(*name)),
                   std::string(accepted), m_reader.suggest(*name, names)};
    });
    return nullptr;
  }
  // What a station is that has faults of its own has not become known.
  return found->second.first_visit.empty() ? nullptr : &found->second;
}

void Train::forbid_surface_keys(Mapping& station, const Met* met) {
  const std::string owner = met == nullptr ? "the station" : quoted(met->first_visit);
  for (const std::string_view key : surface_keys)
    station.forbid(key, fmt::format("belongs to {}, whose surface is met again here", owner));
}

std::string Train::between(const Met& met) const {
  const auto& media = m_assembly.media;
  if (!met.interface())
    return fmt::format("{} stands in {}", quoted(met.first_visit), media[met.before].name);
  if (!met.beyond)
    return fmt::format("{} has {} before it and nothing given behind it", quoted(met.first_visit),
                       media[met.before].name);
  return fmt::format("{} lies between {} and {}", quoted(met.first_visit), media[met.before].name,
                     media[*met.beyond].name);
}

/// Light can come to a surface only in the medium on one side of it. On which side it is, where they are
/// equal, the layout will tell.
void Train::arrive_again(const Met& met, Mark mark) {
  if (!m_current_known || !met.media_known || m_current == met.before || m_current == met.beyond)
    return;
  m_reader.fault(
      mark, fmt::format("the light arrives in {}, but {}", m_assembly.media[m_current].name, between(met)));
  m_current_known = false;
}

/// Light that passes the front of a plate meets its rear face, which no station can stand for.
void Train::refuse_passing_plate(const Met& met, Mark mark) {
  m_reader.fault(
      mark, fmt::format("the light would pass {}, behind which its 'rear' stands", quoted(met.first_visit)),
      fmt::format("{} without 'rear', and that face as a station of its own", quoted(met.first_visit)));
}

void Train::refract_again(Mapping& station, const Met* met) {
  const auto value = station.need("into");
  const auto into = value ? m_media.named(*value) : std::nullopt;
  if (into)
    m_coverage.check_transparent(*into, m_reader.mark(*value));
  if (into && met != nullptr && met->media_known && m_current_known) {
    const auto other = m_current == met->before ? met->beyond : std::optional(met->before);
    if (into != other)
      m_reader.fault(m_reader.mark(*value),
                     fmt::format("the light goes from {} into {}, but {}", m_assembly.media[m_current].name,
                                 m_assembly.media[*into].name, between(*met)),
                     other ? fmt::format("into: {}", m_assembly.media[*other].name)
                           : fmt::format("a 'backing' at {}", quoted(met->first_visit)));
  }
  m_current = into.value_or(m_current);
  m_current_known = into.has_value();
}

} // namespace lightledger::assembly
