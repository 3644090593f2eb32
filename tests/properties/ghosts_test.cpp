#include "properties/fast.hpp"
#include "reference/ghosts.hpp"

#include <lightledger/trace/path_tree.hpp>
#include <lightledger/trace/tree.hpp>

#include <gtest/gtest.h>
#include <rapidcheck/gtest.h>

#include <algorithm>
#include <cmath>
#include <map>

/// The tree of paths against ghosts traced one by one in the textbook tracer, and what must hold for all
/// trees.
namespace lightledger::properties {
namespace {

using trace::PathSums;
using trace::PathTree;
using trace::TracedTree;

/// Less is the rounding of reflectances between equal indices.
constexpr double rounding = 1e-18;

void reflect_at_detector(assembly::Assembly& assembly, double reflectance) {
  auto& effect = assembly.surfaces[assembly.stations.back().surface].effect;
  std::get<assembly::Sensor>(effect).reflectance = reflectance;
}

/// A random train whose detector reflects, lit by a few rays.
assembly::Assembly shiny(std::uint64_t seed, const reference::Variety& variety = {}) {
  assembly::Assembly assembly = reference::random_assembly(seed, variety);
  reflect_at_detector(assembly, 0.3);
  assembly.light.sampling = assembly::Rings{2, 6};
  return assembly;
}

bool meets_again(const assembly::Assembly& assembly) {
  for (std::size_t i = 0; i < assembly.stations.size(); ++i)
    if (reference::first_visit(assembly, i) != i)
      return true;
  return false;
}

/// Sums of a tree's paths by the names of their bounces.
std::map<std::vector<std::string>, PathSums> by_name(const Both& both, const PathTree& tree,
                                                     const TracedTree& traced) {
  std::map<std::vector<std::string>, PathSums> sums;
  for (const trace::PathTable::Row& row : traced.total.paths.rows())
    sums[trace::bounce_names(*both.assembly, tree.way(row.number))] = row.sums;
  return sums;
}

RC_GTEST_PROP(GhostTree, BringsAsMuchByEachPathAsTheTextbookTracer, ()) {
  const assembly::Assembly assembly = shiny(reference::any_seed());
  RC_PRE(!meets_again(assembly) && !assembly.light.beam.fill_stop);
  const Both both = prepare(assembly);
  const PathTree tree(*both.assembly, both.train.routes, 2);
  const auto found = by_name(both, tree, trace::trace_tree(both.train, tree, {.floor = 0.0, .threads = 1}));
  const reference::GhostPaths all = reference::ghost_paths(assembly, both.bench, 2);
  RC_ASSERT(tree.detected() == all.paths.size() + 1);
  for (const reference::GhostPath& path : all.paths) {
    const reference::GhostSums sums = reference::ghost_sums(all, path, both.bench);
    const auto ours = found.find(path.bounces);
    if (sums.comparable && sums.power < rounding)
      RC_ASSERT(ours == found.end() || ours->second.power < rounding);
    if (!sums.comparable || sums.power < rounding)
      continue;
    RC_ASSERT(ours != found.end());
    const PathSums& own = ours->second;
    const double tolerance = 1e-9 * sums.power + rounding;
    RC_ASSERT(std::abs(own.power - sums.power) < tolerance);
    RC_ASSERT(std::abs(own.s1 - sums.s1) < tolerance);
    RC_ASSERT(std::abs(own.s2 - sums.s2) < tolerance);
    RC_ASSERT(std::abs(own.s3 - sums.s3) < tolerance);
    // Moments of position, to what long ways between curved faces make of rounding.
    const double moment = 1e-7 * (1.0 + std::hypot(own.x, own.y)) * sums.power + 100.0 * rounding;
    RC_ASSERT(std::abs(own.x * own.power - sums.x) < moment);
    RC_ASSERT(std::abs(own.y * own.power - sums.y) < moment);
  }
}

RC_GTEST_PROP(GhostTree, AddsUpToWhatWasLaunched, ()) {
  const Both both = prepare(shiny(reference::any_seed()));
  const PathTree tree(*both.assembly, both.train.routes, 4);
  const trace::TreeFound total = trace::trace_tree(both.train, tree, {.threads = 1}).total;
  RC_ASSERT(std::abs(1.0 - total.detector() - total.ledger.sum()) < 1e-12);
}

RC_GTEST_PROP(GhostTree, DeliversWhatTheBudgetDoes, ()) {
  const Both both = prepare(shiny(reference::any_seed(), {.returning = true}));
  const PathTree tree(*both.assembly, both.train.routes, 2);
  const double delivered = trace::trace(both.train, {.threads = 1}).total.delivered();
  RC_ASSERT(std::abs(trace::trace_tree(both.train, tree, {.threads = 1}).total.image.power - delivered) <
            1e-13);
}

/// What is cut off bounds what more light would be found by following it; what the detector reflects may come
/// to it more than once.
RC_GTEST_PROP(GhostTree, BoundsWhatItDoesNotFollow, ()) {
  const Both both = prepare(shiny(reference::any_seed()));
  const PathTree two(*both.assembly, both.train.routes, 2);
  const PathTree four(*both.assembly, both.train.routes, 4);
  const trace::TreeFound cut = trace::trace_tree(both.train, two, {.floor = 1e-3, .threads = 1}).total;
  const trace::TreeFound full = trace::trace_tree(both.train, four, {.floor = 0.0, .threads = 1}).total;
  RC_ASSERT((1.0 - full.reflectance) * (full.ghosts - cut.ghosts) <= cut.ledger.not_followed + 1e-13);
}

bool same_bits(const trace::TreeFound& a, const trace::TreeFound& b) {
  return a.ghosts == b.ghosts && a.ledger.returned == b.ledger.returned &&
         a.ledger.absorbed == b.ledger.absorbed &&
         std::ranges::equal(a.paths.rows(), b.paths.rows(), [](const auto& one, const auto& other) {
           return one.number == other.number && one.sums.power == other.sums.power &&
                  one.sums.x == other.sums.x && one.sums.spread == other.sums.spread &&
                  one.sums.s3 == other.sums.s3 && one.sums.interference == other.sums.interference;
         });
}

RC_GTEST_PROP(GhostTree, HasTheSameBitsForAnyNumberOfThreads, ()) {
  assembly::Assembly assembly = shiny(reference::any_seed());
  assembly.light.sampling = assembly::Scattered{2048};
  const Both both = prepare(assembly);
  const PathTree tree(*both.assembly, both.train.routes, 2);
  RC_ASSERT(same_bits(trace::trace_tree(both.train, tree, {.threads = 1}).total,
                      trace::trace_tree(both.train, tree, {.threads = 3}).total));
}

/// Every number leads to a path of its own, and each of them ends where light is counted.
RC_GTEST_PROP(GhostTree, NumbersEachPathOnce, ()) {
  const Both both = prepare(shiny(reference::any_seed(), {.returning = true}));
  const PathTree tree(*both.assembly, both.train.routes, 4);
  const auto all = tree.paths(tree.start(), tree.bounces());
  RC_PRE(all < 3000U);
  std::map<std::vector<std::size_t>, int> seen;
  PathTree::PathNumber detected = 0;
  for (PathTree::PathNumber number = 0; number < all; ++number) {
    const PathTree::Way way = tree.way(number);
    std::vector<std::size_t> steps;
    for (const trace::Path::Step& step : way.path.steps)
      steps.insert(steps.end(), {step.leg, step.op, static_cast<std::size_t>(step.act)});
    RC_ASSERT(++seen[steps] == 1);
    RC_ASSERT(tree.detected_below(number) == detected);
    detected += way.path.end == trace::End::detected ? 1 : 0;
    RC_ASSERT(way.path.end == trace::End::detected || way.path.end == trace::End::returned);
    RC_ASSERT(static_cast<int>(way.bounces.size()) <= tree.bounces());
  }
  RC_ASSERT(detected == tree.detected());
}

} // namespace
} // namespace lightledger::properties
