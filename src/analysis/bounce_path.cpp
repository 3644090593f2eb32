#include "bounce_path.hpp"

#include <variant>

namespace lightledger::analysis {
namespace {

using trace::Act;
using trace::End;
using trace::Face;
using trace::Hop;
using trace::Routes;
using trace::State;

/// Between two bounces light meets each face at most once, so a name tells where it bounces next; only at the
/// front of a plate must both ways be tried.
class Finder {
public:
  Finder(const assembly::Assembly& assembly, const Routes& routes, const std::vector<std::string>& bounces)
      : m_assembly(assembly), m_routes(routes), m_bounces(bounces) {}

  std::optional<trace::Path> find() {
    if (!follow(trace::Onward{m_routes.start(), Routes::launch_leg}, 0))
      return std::nullopt;
    return std::move(m_path);
  }

private:
  /// Extends the path along a hop with so many bounces done; takes back what leads nowhere.
  bool follow(const Hop& hop, std::size_t done) {
    const auto* onward = std::get_if<trace::Onward>(&hop);
    if (onward == nullptr)
      return std::get<End>(hop) == End::detected && done == m_bounces.size();
    const State state = onward->state;
    if (Routes::bounces(m_assembly, state)) {
      const Act main = m_assembly.stations[state.visit].intended == Act::detect ? Act::detect : Act::pass;
      return (is_next(Routes::bounce_name(m_assembly, state), done) && go(*onward, Act::bounce, done + 1)) ||
             go(*onward, main, done);
    }
    return go(*onward, Act::bounce, done) || (waits_for_rear(state, done) && go(*onward, Act::pass, done));
  }

  bool go(const trace::Onward& onward, Act act, std::size_t done) {
    m_path.steps.push_back({onward.leg, m_routes.op(m_assembly, onward.state), onward.state.visit, act});
    if (follow(m_routes.next(onward.state, act), done))
      return true;
    m_path.steps.pop_back();
    return false;
  }

  [[nodiscard]] bool is_next(const std::string& name, std::size_t done) const {
    return done < m_bounces.size() && m_bounces[done] == name;
  }

  [[nodiscard]] bool waits_for_rear(State state, std::size_t done) const {
    const assembly::Surface& surface = m_assembly.surfaces[m_assembly.stations[state.visit].surface];
    state.face = Face::rear;
    return surface.rear && is_next(Routes::bounce_name(m_assembly, state), done);
  }

  const assembly::Assembly& m_assembly;
  const Routes& m_routes;
  const std::vector<std::string>& m_bounces;
  trace::Path m_path{{}, End::detected};
};

} // namespace

std::optional<trace::Path> path_of_bounces(const assembly::Assembly& assembly, const Routes& routes,
                                           const std::vector<std::string>& bounces) {
  return Finder(assembly, routes, bounces).find();
}

} // namespace lightledger::analysis
