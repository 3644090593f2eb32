#include "close_look.hpp"
#include "ghost_list.hpp"

#include <lightledger/analysis/ghosts.hpp>
#include <lightledger/assembly/document.hpp>
#include <lightledger/trace/path_tree.hpp>
#include <lightledger/trace/tree.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <charconv>

namespace lightledger::analysis {
namespace {

using assembly::Assembly;
using trace::PathTree;
using trace::TracedTree;

GhostLedger ledger(const trace::TreeFound& found) {
  const trace::TreeLedger& all = found.ledger;
  return {found.detector(), all.returned,  all.leaked, all.absorbed, all.clipped,
          all.missed,       all.scattered, all.extra,  all.bulk,     all.not_followed};
}

/// Which of the light's fields an option names: by its name, or by its number from 1.
std::optional<std::size_t> field_named(const assembly::Light& light, const std::string& name) {
  for (std::size_t f = 0; f < light.fields.size(); ++f)
    if (light.fields[f].name == name)
      return f;
  std::size_t number = 0;
  const char* const end = name.data() + name.size();
  const auto [stop, error] = std::from_chars(name.data(), end, number);
  if (error == std::errc{} && stop == end && number >= 1 && number <= light.fields.size())
    return number - 1;
  return std::nullopt;
}

assembly::Fault unknown_field(const assembly::Light& light, const std::string& name) {
  std::vector<std::string_view> known;
  for (const assembly::Field& field : light.fields)
    if (field.name)
      known.emplace_back(*field.name);
  return {{},
          fmt::format("--field: there is no field '{}'", name),
          known.empty() ? fmt::format("a number from 1 to {}", light.fields.size())
                        : fmt::format("{}", fmt::join(known, ", ")),
          std::string(assembly::nearest(name, known))};
}

std::vector<std::string> unlimited_stations(const Assembly& assembly) {
  std::vector<std::string> names;
  for (const assembly::Station& station : assembly.stations)
    if (std::holds_alternative<assembly::Clear::Unlimited>(assembly.surfaces[station.surface].clear.opening))
      names.push_back(station.name);
  return names;
}

std::vector<std::string> warnings(const Assembly& assembly, const TracedTree& traced) {
  std::vector<std::string> all;
  if (!traced.accurate)
    all.push_back(
        fmt::format("the accuracy asked for was not reached: the standard error of ghosts.total is {:.2g} "
                    "with the most rays that are traced unasked; --rays traces more",
                    traced.ghosts_error.value_or(0.0)));
  if (const auto names = unlimited_stations(assembly); !names.empty())
    all.push_back(fmt::format("no clear area: {}; ghosts pass there however far from the axis",
                              fmt::join(names, ", ")));
  return all;
}

Ghosts read(const Assembly& assembly, const PathTree& tree, const TracedTree& traced,
            const GhostOptions& options) {
  Ghosts ghosts;
  ghosts.bounces = tree.bounces();
  ghosts.paths_considered = tree.detected() - 1;
  ghosts.paths_traced = ghosts.paths_considered - cut_paths(tree, traced);
  ghosts.delivered = traced.total.image.power;
  ghosts.total = traced.total.ghosts;
  ghosts.uncertainty = traced.ghosts_error;
  ghosts.returned = traced.total.ledger.returned;
  ghosts.reflectance = traced.total.reflectance;
  ghosts.returned_uncertainty = traced.returned_error;
  ghosts.not_followed = traced.total.ledger.not_followed;
  ghosts.ledger = ledger(traced.total);
  ghosts.closure_error = 1.0 - traced.total.detector() - traced.total.ledger.sum();
  ghosts.rays = traced.rays;
  list_ghosts(assembly, tree, traced, options.top, ghosts);
  ghosts.returned_paths = returned_paths(assembly, tree, traced, options.top);
  return ghosts;
}

} // namespace

GhostsResult ghosts(const Assembly& assembly, const GhostOptions& options) {
  GhostsResult result;
  Assembly lit = assembly;
  if (options.field) {
    const auto field = field_named(assembly.light, *options.field);
    if (!field) {
      result.faults.add(unknown_field(assembly.light, *options.field));
      return result;
    }
    lit.light.fields = {assembly.light.fields[*field]};
  }
  const auto train = trace::prepare(lit, result.faults);
  if (!train)
    return result;
  const PathTree tree(lit, train->routes, options.bounces);
  const TracedTree traced = trace::trace_tree(
      *train, tree, {.floor = options.floor, .threads = options.threads, .progress = options.progress});
  if (!traced.lit) {
    const assembly::Mark mark =
        assembly.document ? assembly.document->locate("light.rays") : assembly::Mark{};
    result.faults.add({mark, "the pattern of rays puts no light on the beam", "a finer pattern", ""});
    return result;
  }
  result.ghosts = read(lit, tree, traced, options);
  look_closely(*train, tree, traced, options, *result.ghosts);
  find_cures(lit, tree, traced, *result.ghosts);
  result.ghosts->foci = hot_places(*train, options);
  result.warnings = warnings(lit, traced);
  return result;
}

} // namespace lightledger::analysis
