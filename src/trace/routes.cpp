#include <lightledger/trace/routes.hpp>

namespace lightledger::trace {
namespace {

using assembly::Assembly;
using assembly::Interface;
using assembly::MediumId;
using assembly::Side;

constexpr std::size_t place(State state) {
  return 2 * std::size_t{state.visit} + (state.heading == Heading::against ? 1 : 0);
}

constexpr Side other(Side side) {
  return side == Side::before ? Side::beyond : Side::before;
}

} // namespace

Routes::Routes(const Assembly& assembly, std::vector<Side> from)
    : m_stations(static_cast<StationId>(assembly.stations.size())), m_entry(std::move(from)) {
  for (StationId visit = 0; visit < m_stations; ++visit)
    m_exit.push_back(assembly.stations[visit].intended == Act::pass ? other(m_entry[visit]) : m_entry[visit]);
  lay_legs(assembly);
  for (StationId visit = 0; visit < m_stations; ++visit)
    for (const Heading heading : {Heading::along, Heading::against})
      m_meetings.push_back(meeting(assembly, {visit, heading}));
}

void Routes::lay_legs(const Assembly& assembly) {
  const auto medium_behind = [&](StationId visit) {
    const assembly::Surface& surface = assembly.surfaces[assembly.stations[visit].surface];
    return m_exit[visit] == Side::before ? surface.before : surface.beyond.value_or(surface.before);
  };
  m_legs.push_back({true, 0, 0, assembly.light.medium});
  for (StationId visit = 1; visit < m_stations; ++visit)
    m_legs.push_back({false, visit - 1, visit, medium_behind(visit - 1)});
  for (StationId visit = 1; visit < m_stations; ++visit)
    m_legs.push_back({false, visit, visit - 1, medium_behind(visit - 1)});
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

OpId Routes::op(const Assembly& assembly, State state) const {
  const Side met = state.heading == Heading::along ? m_entry[state.visit] : m_exit[state.visit];
  return 2 * assembly.stations[state.visit].surface + (met == Side::beyond ? 1 : 0);
}

Routes::Meeting Routes::meeting(const Assembly& assembly, State state) const {
  const assembly::Station& station = assembly.stations[state.visit];
  const assembly::Surface& surface = assembly.surfaces[station.surface];
  const bool along = state.heading == Heading::along;
  if (station.intended == Act::detect)
    return {End::absorbed, backward(state.visit), End::detected};
  if (station.intended == Act::bounce)
    return {End::leaked, along ? forward(state.visit) : backward(state.visit), End::absorbed};
  const Hop across = along ? forward(state.visit) : backward(state.visit);
  if (std::holds_alternative<Interface>(surface.effect))
    return {across, turned_back(assembly, state), End::absorbed};
  return {across, End::absorbed, End::absorbed};
}

/// Light reflected where it should pass joins the leg that leaves the surface on the same side on another
/// visit, or goes back on its own.
Hop Routes::turned_back(const Assembly& assembly, State state) const {
  const bool along = state.heading == Heading::along;
  const Side side = along ? m_entry[state.visit] : m_exit[state.visit];
  for (StationId visit = 0; visit < m_stations; ++visit) {
    const bool same_surface = assembly.stations[visit].surface == assembly.stations[state.visit].surface;
    if (visit == state.visit || !same_surface)
      continue;
    if (along && m_exit[visit] == side)
      return forward(visit);
    if (!along && m_entry[visit] == side)
      return backward(visit);
  }
  return along ? backward(state.visit) : forward(state.visit);
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

Path intended_path(const Assembly& assembly, const Routes& routes) {
  Path path{{}, End::absorbed};
  Hop hop = Onward{routes.start(), Routes::launch_leg};
  while (const auto* onward = std::get_if<Onward>(&hop)) {
    const State state = onward->state;
    const Act act = assembly.stations[state.visit].intended;
    path.steps.push_back({onward->leg, routes.op(assembly, state), state.visit, act});
    hop = routes.next(state, act);
  }
  path.end = std::get<End>(hop);
  return path;
}

} // namespace lightledger::trace
