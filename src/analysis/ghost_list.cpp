#include "ghost_list.hpp"

#include <algorithm>
#include <cmath>

namespace lightledger::analysis {
namespace {

using assembly::Assembly;
using trace::PathSums;
using trace::PathTable;
using trace::PathTree;
using trace::TracedTree;

/// Longer lists would serve nobody; what is not in them is told in sum.
constexpr std::uint64_t longest_list = 10'000;

std::optional<double> ratio(double a, double b) {
  return b > 0.0 ? std::optional(a / b) : std::nullopt;
}

GhostSpot spot(const PathSums& sums) {
  return {{sums.x, sums.y}, std::sqrt(sums.spread / sums.power)};
}

std::vector<GhostField> by_field(const Assembly& assembly, const TracedTree& traced,
                                 PathTree::PathNumber number) {
  double most = 0.0;
  for (const trace::TreeFound& field : traced.fields)
    most = std::max(most, field.image.power);
  std::vector<GhostField> rows;
  for (std::size_t f = 0; f < traced.fields.size(); ++f) {
    const assembly::Field& field = assembly.light.fields[f];
    const PathSums* sums = traced.fields[f].paths.find(number);
    const double power = sums != nullptr ? sums->power : 0.0;
    rows.push_back({field.name, field.at, power, ratio(power, most),
                    sums != nullptr ? std::optional(spot(*sums)) : std::nullopt});
  }
  return rows;
}

Ghost ghost(const Assembly& assembly, const PathTree& tree, const TracedTree& traced,
            PathTree::PathNumber number) {
  const PathSums& sums = *traced.total.paths.find(number);
  Ghost ghost;
  const PathTree::Way way = tree.way(number);
  ghost.bounces = trace::bounce_names(assembly, way);
  for (const std::size_t step : way.bounces)
    ghost.stations.push_back(std::size_t{way.states[step].visit} + 1);
  ghost.power = sums.power;
  if (!traced.path_errors.empty())
    ghost.uncertainty = traced.path_errors[traced.total.paths.place(number)];
  ghost.relative_power = ratio(sums.power, traced.total.image.power);
  ghost.spot = spot(sums);
  ghost.path_excess_mm = ratio(sums.excess, sums.shared);
  ghost.stokes = {sums.power, sums.s1, sums.s2, sums.s3};
  ghost.dop = std::min(std::hypot(sums.s1, sums.s2, sums.s3) / sums.power, 1.0);
  ghost.fringe_modulation = ratio(sums.interference, sums.intensity);
  ghost.by_field = by_field(assembly, traced, number);
  return ghost;
}

std::vector<trace::StationId> stations(const PathTree& tree, PathTree::PathNumber number) {
  const PathTree::Way way = tree.way(number);
  std::vector<trace::StationId> stations;
  stations.reserve(way.bounces.size());
  for (const std::size_t step : way.bounces)
    stations.push_back(way.states[step].visit);
  return stations;
}

} // namespace

std::vector<PathTree::PathNumber> brightest(const PathTree& tree, const PathTable& paths) {
  std::vector<const PathTable::Row*> rows;
  rows.reserve(paths.rows().size());
  for (const PathTable::Row& row : paths.rows())
    rows.push_back(&row);
  std::ranges::sort(rows, [&](const PathTable::Row* a, const PathTable::Row* b) {
    if (a->sums.power != b->sums.power)
      return a->sums.power > b->sums.power;
    return stations(tree, a->number) < stations(tree, b->number);
  });
  std::vector<PathTree::PathNumber> numbers;
  numbers.reserve(rows.size());
  for (const PathTable::Row* row : rows)
    numbers.push_back(row->number);
  return numbers;
}

std::uint64_t cut_paths(const PathTree& tree, const TracedTree& traced) {
  std::uint64_t cut = 0;
  for (const trace::PathSpans::Span& span : traced.total.cut.spans())
    cut += tree.detected_below(span.end) - tree.detected_below(span.first);
  return cut;
}

void list_ghosts(const Assembly& assembly, const PathTree& tree, const TracedTree& traced,
                 std::optional<std::uint64_t> top, Ghosts& ghosts) {
  const std::uint64_t longest = std::min(top.value_or(longest_list), longest_list);
  for (const PathTree::PathNumber number : brightest(tree, traced.total.paths)) {
    if (ghosts.paths.size() < longest) {
      ghosts.paths.push_back(ghost(assembly, tree, traced, number));
    } else {
      ++ghosts.unlisted_paths;
      ghosts.unlisted += traced.total.paths.find(number)->power;
    }
  }
}

std::vector<ReturnedPath> returned_paths(const Assembly& assembly, const PathTree& tree,
                                         const TracedTree& traced, std::optional<std::uint64_t> top) {
  std::vector<ReturnedPath> rows;
  for (const PathTree::PathNumber number : brightest(tree, traced.total.returned)) {
    if (rows.size() == std::min(top.value_or(longest_list), longest_list))
      break;
    rows.push_back(
        {trace::bounce_names(assembly, tree.way(number)), traced.total.returned.find(number)->power});
  }
  return rows;
}

} // namespace lightledger::analysis
