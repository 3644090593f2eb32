#include <lightledger/trace/routes.hpp>

namespace lightledger::trace {
namespace {

using assembly::Assembly;
using assembly::Interface;
using assembly::MediumId;
using assembly::Side;

constexpr std::size_t place(State state) {
  const std::size_t face = 3 * std::size_t{state.visit} + static_cast<std::size_t>(state.face);
  return 2 * face + (state.heading == Heading::against ? 1 : 0);
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
  lay_legs_in_plates(assembly);
  for (StationId visit = 0; visit < m_stations; ++visit)
    for (const Face face : {Face::front, Face::rear, Face::inside})
      for (const Heading heading : {Heading::along, Heading::against})
        m_meetings.push_back(meeting(assembly, {visit, heading, face}));
}

void Routes::lay_legs(const Assembly& assembly) {
  const auto medium_behind = [&](StationId visit) {
    const assembly::Surface& surface = assembly.surfaces[assembly.stations[visit].surface];
    return m_exit[visit] == Side::before ? surface.before : surface.beyond.value_or(surface.before);
  };
  const auto surface = [&](StationId visit) { return assembly.stations[visit].surface; };
  m_legs.push_back({true, 0, surface(0), assembly.light.medium});
  for (StationId visit = 1; visit < m_stations; ++visit)
    m_legs.push_back({false, surface(visit - 1), surface(visit), medium_behind(visit - 1)});
  for (StationId visit = 1; visit < m_stations; ++visit)
    m_legs.push_back({false, surface(visit), surface(visit - 1), medium_behind(visit - 1)});
}

void Routes::lay_legs_in_plates(const Assembly& assembly) {
  m_into_plate.resize(assembly.surfaces.size());
  for (assembly::SurfaceId front = 0; front < assembly.surfaces.size(); ++front) {
    const auto& rear = assembly.surfaces[front].rear;
    if (!rear)
      continue;
    const MediumId plate = assembly.surfaces[rear->surface].before;
    m_into_plate[front] = static_cast<LegId>(m_legs.size());
    m_legs.push_back({false, front, rear->surface, plate});
    m_legs.push_back({false, rear->surface, front, plate});
  }
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
  const assembly::SurfaceId surface = assembly.stations[state.visit].surface;
  if (state.face == Face::rear)
    return 2 * assembly.surfaces[surface].rear.value().surface;
  const Side outside = state.heading == Heading::along ? m_entry[state.visit] : m_exit[state.visit];
  const Side met = state.face == Face::inside ? other(outside) : outside;
  return 2 * surface + (met == Side::beyond ? 1 : 0);
}

bool Routes::bounces(const Assembly& assembly, State state) {
  return state.face != Face::front || assembly.stations[state.visit].intended != Act::bounce;
}

std::string Routes::bounce_name(const Assembly& assembly, State state) {
  const std::string& name = assembly.stations[state.visit].name;
  return state.face == Face::rear ? name + " rear" : name;
}

Routes::Meeting Routes::meeting(const Assembly& assembly, State state) const {
  const assembly::Station& station = assembly.stations[state.visit];
  const assembly::Surface& surface = assembly.surfaces[station.surface];
  if (state.face != Face::front && !surface.rear)
    return {End::absorbed, End::absorbed, End::absorbed}; // where there is no plate, nothing comes
  if (state.face != Face::front)
    return meeting_in_plate(state, m_into_plate[station.surface]);
  if (station.intended == Act::detect)
    return {End::absorbed, backward(state.visit), End::detected};
  if (station.intended == Act::bounce)
    return {behind_mirror(assembly, state), onward(state), End::absorbed};
  if (std::holds_alternative<Interface>(surface.effect))
    return {onward(state), turned_back(assembly, state), End::absorbed};
  return {onward(state), End::absorbed, End::absorbed};
}

/// Light that passes a mirror is lost, unless a plate's rear face stands behind.
Hop Routes::behind_mirror(const Assembly& assembly, State state) const {
  const assembly::SurfaceId surface = assembly.stations[state.visit].surface;
  if (!assembly.surfaces[surface].rear)
    return End::leaked;
  return Onward{{state.visit, state.heading, Face::rear}, m_into_plate[surface]};
}

/// Between the faces of a plate: what passes the rear is lost, and what passes the front from inside joins
/// what the front reflects.
Routes::Meeting Routes::meeting_in_plate(State state, LegId into_plate) const {
  const auto to = [&](Face face, LegId leg) -> Hop {
    return Onward{{state.visit, state.heading, face}, leg};
  };
  if (state.face == Face::rear)
    return {End::leaked, to(Face::inside, into_plate + 1), End::absorbed};
  return {onward(state), to(Face::rear, into_plate), End::absorbed};
}

/// As the train means it, in the light's heading.
Hop Routes::onward(State state) const {
  return state.heading == Heading::along ? forward(state.visit) : backward(state.visit);
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
