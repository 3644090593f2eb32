#include <lightledger/trace/routes.hpp>

namespace lightledger::trace {
namespace {

using assembly::Assembly;
using assembly::Interface;
using assembly::MediumId;

constexpr std::size_t place(State state) {
  return 2 * std::size_t{state.visit} + (state.heading == Heading::against ? 1 : 0);
}

/// The medium in which light leaves each visit along the train.
std::vector<MediumId> leaving_media(const Assembly& assembly) {
  std::vector<MediumId> media;
  MediumId medium = assembly.light.medium;
  for (const assembly::Station& station : assembly.stations) {
    const assembly::Surface& surface = assembly.surfaces[station.surface];
    if (station.intended == Act::pass && std::holds_alternative<Interface>(surface.effect))
      medium = *surface.beyond;
    media.push_back(medium);
  }
  return media;
}

} // namespace

Routes::Routes(const Assembly& assembly) : m_stations(static_cast<StationId>(assembly.stations.size())) {
  const std::vector<MediumId> media = leaving_media(assembly);
  m_legs.push_back({true, 0, 0, assembly.light.medium});
  for (StationId visit = 1; visit < m_stations; ++visit)
    m_legs.push_back({false, visit - 1, visit, media[visit - 1]});
  for (StationId visit = 1; visit < m_stations; ++visit)
    m_legs.push_back({false, visit, visit - 1, media[visit - 1]});
  for (StationId visit = 0; visit < m_stations; ++visit)
    for (const Heading heading : {Heading::along, Heading::against})
      m_meetings.push_back(meeting(assembly, {visit, heading}));
}

Hop Routes::next(State state, Act act) const {
  const Meeting& meeting = m_meetings[place(state)];
  switch (act) {
  case Act::pass:
    return meeting.pass;
  case Act::bounce:
    return meeting.bounce;
  case Act::detect:
    return meeting.detect;
  }
  return End::absorbed;
}

Routes::Meeting Routes::meeting(const Assembly& assembly, State state) const {
  const assembly::Station& station = assembly.stations[state.visit];
  const assembly::Surface& surface = assembly.surfaces[station.surface];
  const bool along = state.heading == Heading::along;
  const Hop forward = this->forward(state.visit);
  const Hop backward = this->backward(state.visit);
  if (station.intended == Act::detect)
    return {End::absorbed, backward, End::detected};
  if (station.intended == Act::bounce)
    return {End::leaked, along ? forward : backward, End::absorbed};
  const Hop across = along ? forward : backward;
  if (std::holds_alternative<Interface>(surface.effect))
    return {across, along ? backward : forward, End::absorbed};
  return {across, End::absorbed, End::absorbed};
}

Hop Routes::forward(StationId visit) const {
  if (visit + 1 == m_stations)
    return End::leaked;
  return Onward{{visit + 1, Heading::along}, visit + 1};
}

Hop Routes::backward(StationId visit) const {
  if (visit == 0)
    return End::returned;
  return Onward{{visit - 1, Heading::against}, m_stations + visit - 1};
}

OpId operator_of(const Assembly& assembly, State state) {
  const assembly::Station& station = assembly.stations[state.visit];
  const bool beyond = state.heading == Heading::against && station.intended == Act::pass;
  return 2 * station.surface + (beyond ? 1 : 0);
}

Path intended_path(const Assembly& assembly, const Routes& routes) {
  Path path{{}, End::absorbed};
  Hop hop = Onward{routes.start(), Routes::launch_leg};
  while (const auto* onward = std::get_if<Onward>(&hop)) {
    const State state = onward->state;
    const Act act = assembly.stations[state.visit].intended;
    path.steps.push_back({onward->leg, operator_of(assembly, state), state.visit, act});
    hop = routes.next(state, act);
  }
  path.end = std::get<End>(hop);
  return path;
}

} // namespace lightledger::trace
