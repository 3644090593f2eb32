#include <lightledger/trace/path_tree.hpp>

#include <variant>

namespace lightledger::trace {
namespace {

using assembly::Assembly;

constexpr PathTree::Exit ends(End end) {
  return {false, 0, 0, end};
}

/// Whether light reflected at a meeting bounces, and does so with any power.
bool costs_a_bounce(const Assembly& assembly, State state) {
  const auto& effect = assembly.surfaces[assembly.stations[state.visit].surface].effect;
  if (const auto* sensor = std::get_if<assembly::Sensor>(&effect))
    return sensor->reflectance > 0.0;
  return std::holds_alternative<assembly::Interface>(effect) && Routes::bounces(assembly, state);
}

} // namespace

PathTree::PathTree(const Assembly& assembly, const Routes& routes, int bounces) : m_bounces(bounces) {
  m_start = {true, Routes::launch_leg, add(routes.start()), End::absorbed};
  for (JunctionId id = 0; id < m_junctions.size(); ++id)
    connect(assembly, routes, id);
  count();
}

PathTree::JunctionId PathTree::add(State state) {
  const auto [known, added] = m_known.try_emplace({state.visit, state.heading, state.face},
                                                  static_cast<JunctionId>(m_junctions.size()));
  if (added)
    m_junctions.emplace_back().state = state;
  return known->second;
}

PathTree::Exit PathTree::exit(const Hop& hop) {
  if (const auto* end = std::get_if<End>(&hop))
    return ends(*end);
  const auto& onward = std::get<Onward>(hop);
  return {true, onward.leg, add(onward.state), End::absorbed};
}

/// Finds the meetings that the beams of one lead to.
void PathTree::connect(const Assembly& assembly, const Routes& routes, JunctionId id) {
  Junction junction = m_junctions[id];
  const State state = junction.state;
  const Act intended = assembly.stations[state.visit].intended;
  junction.op = routes.op(assembly, state);
  junction.detects = intended == Act::detect;
  junction.main_bounces = intended == Act::bounce && state.face == Face::front;
  junction.side_bounces = costs_a_bounce(assembly, state);
  junction.main = junction.detects
                      ? ends(End::detected)
                      : exit(routes.next(state, junction.main_bounces ? Act::bounce : Act::pass));
  const bool reflects_aside = !junction.main_bounces;
  junction.side = reflects_aside && !junction.side_bounces
                      ? ends(End::absorbed)
                      : exit(routes.next(state, reflects_aside ? Act::bounce : Act::pass));
  m_junctions[id] = junction;
}

/// By bounces left, and within them each meeting after those that its beams reach without a bounce. No run of
/// light without a bounce meets the same twice, for it goes on along the train or on against it.
void PathTree::count() {
  m_counts.resize(m_junctions.size() * static_cast<std::size_t>(m_bounces + 1));
  std::vector<JunctionId> open;
  for (int left = 0; left <= m_bounces; ++left) {
    std::vector<bool> known(m_junctions.size(), false);
    const auto pending = [&](const Exit& exit) { return exit.onward && !known[exit.to]; };
    for (JunctionId first = 0; first < m_junctions.size(); ++first)
      for (open.assign(1, first); !open.empty();) {
        const JunctionId id = open.back();
        const Junction& junction = m_junctions[id];
        if (pending(junction.main)) {
          open.push_back(junction.main.to);
        } else if (!junction.side_bounces && pending(junction.side)) {
          open.push_back(junction.side.to);
        } else {
          m_counts[place(id, left)] = counts_at(id, left);
          known[id] = true;
          open.pop_back();
        }
      }
  }
}

PathTree::Counts PathTree::counts_at(JunctionId id, int left) const {
  const Junction& junction = m_junctions[id];
  Counts counts = counts_from(junction.main, left);
  if (follows_side(junction, left)) {
    const Counts side = counts_from(junction.side, left_aside(junction, left));
    counts.detected += side.detected;
    counts.returned += side.returned;
  }
  return counts;
}

PathTree::Counts PathTree::counts_from(const Exit& exit, int left) const {
  if (exit.onward)
    return m_counts[place(exit.to, left)];
  return {exit.end == End::detected ? PathNumber{1} : 0, exit.end == End::returned ? PathNumber{1} : 0};
}

PathTree::PathNumber PathTree::paths(const Exit& exit, int left) const {
  const Counts counts = counts_from(exit, left);
  return counts.detected + counts.returned;
}

PathTree::PathNumber PathTree::detected_below(PathNumber number) const {
  PathNumber below = 0;
  int left = m_bounces;
  Exit next = m_start;
  while (next.onward) {
    const Junction& junction = m_junctions[next.to];
    next = junction.main;
    if (!follows_side(junction, left))
      continue;
    const int aside = left_aside(junction, left);
    const Counts within = counts_from(junction.side, aside);
    if (number >= within.detected + within.returned) {
      number -= within.detected + within.returned;
      below += within.detected;
    } else {
      next = junction.side;
      left = aside;
    }
  }
  return below + (number > 0 && next.end == End::detected ? 1 : 0);
}

PathTree::Way PathTree::way(PathNumber number) const {
  Way way{{{}, End::absorbed}, {}, {}};
  int left = m_bounces;
  Exit next = m_start;
  while (next.onward) {
    const Junction& junction = m_junctions[next.to];
    bool aside = false;
    if (follows_side(junction, left)) {
      const PathNumber within = paths(junction.side, left_aside(junction, left));
      aside = number < within;
      if (!aside)
        number -= within;
    }
    const bool reflected = junction.main_bounces != aside;
    const Act act = reflected ? Act::bounce : junction.detects ? Act::detect : Act::pass;
    if (aside && junction.side_bounces) {
      way.bounces.push_back(way.states.size());
      --left;
    }
    way.path.steps.push_back({next.leg, junction.op, junction.state.visit, act});
    way.states.push_back(junction.state);
    next = aside ? junction.side : junction.main;
  }
  way.path.end = next.end;
  return way;
}

std::vector<std::string> bounce_names(const Assembly& assembly, const PathTree::Way& way) {
  std::vector<std::string> names;
  for (const std::size_t step : way.bounces)
    names.push_back(Routes::bounce_name(assembly, way.states[step]));
  return names;
}

} // namespace lightledger::trace
