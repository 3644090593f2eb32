#include "close_look.hpp"

#include <algorithm>
#include <map>
#include <set>

namespace lightledger::analysis {
namespace {

using assembly::Assembly;
using trace::PathTree;
using trace::TracedTree;

std::optional<double> limit(const Assembly& assembly) {
  std::optional<double> least;
  for (const assembly::Requirement& requirement : assembly.requirements)
    if (requirement.quantity == "ghosts.total" && requirement.sense == assembly::Sense::at_most)
      least = std::min(least.value_or(requirement.limit), requirement.limit);
  return least;
}

/// To what share a power must fall so that a total that is too large by `excess` keeps its limit.
std::optional<double> needed_factor(double excess, double power) {
  return excess > 0.0 && power >= excess ? std::optional(1.0 - excess / power) : std::nullopt;
}

std::optional<double> times(std::optional<double> factor, std::optional<double> reflectance) {
  return factor && reflectance ? std::optional(*factor * *reflectance) : std::nullopt;
}

/// The power of all paths that bounce at each surface.
std::map<std::string, double> shares(const Assembly& assembly, const PathTree& tree,
                                     const TracedTree& traced) {
  std::map<std::string, double> shares;
  for (const trace::PathTable::Row& row : traced.total.paths.rows()) {
    const std::vector<std::string> names = trace::bounce_names(assembly, tree.way(row.number));
    for (const std::string& name : std::set<std::string>(names.begin(), names.end()))
      shares[name] += row.sums.power;
  }
  return shares;
}

/// Of the first listed path that bounces at a surface.
std::optional<double> reflectance_at(const Ghosts& ghosts, const std::string& name) {
  for (const Ghost& ghost : ghosts.paths)
    for (std::size_t i = 0; i < ghost.cure.size(); ++i)
      if (ghost.bounces[i] == name)
        return ghost.cure[i].reflectance;
  return std::nullopt;
}

} // namespace

void find_cures(const Assembly& assembly, const PathTree& tree, const TracedTree& traced, Ghosts& ghosts) {
  ghosts.limit = limit(assembly);
  const double excess = ghosts.limit ? ghosts.total - *ghosts.limit : 0.0;
  for (Ghost& ghost : ghosts.paths)
    for (GhostBounce& bounce : ghost.cure)
      bounce.needed_reflectance = times(needed_factor(excess, ghost.power), bounce.reflectance);

  const auto all = shares(assembly, tree, traced);
  const auto most = std::ranges::max_element(all, {}, [](const auto& share) { return share.second; });
  if (most == all.end())
    return;
  ghosts.culprit = {most->first, most->second, reflectance_at(ghosts, most->first), {}};
  ghosts.culprit->needed_reflectance =
      times(needed_factor(excess, most->second), ghosts.culprit->reflectance);
}

} // namespace lightledger::analysis
