#include <lightledger/analysis/budget.hpp>
#include <lightledger/assembly/document.hpp>
#include <lightledger/trace/tracer.hpp>

#include <fmt/format.h>

#include <numbers>

namespace lightledger::analysis {
namespace {

using assembly::Assembly;
using trace::Entry;
using trace::Ledger;
using trace::Traced;

/// Power that runs backwards to the next surface is told of above this share of what was launched.
constexpr double backward_share = 1e-6;

bool interface(const Assembly& assembly, const assembly::Station& station) {
  return std::holds_alternative<assembly::Interface>(assembly.surfaces[station.surface].effect);
}

StationBudget station_budget(const Assembly& assembly, std::size_t index, const Entry& row) {
  constexpr double degrees = 180.0 / std::numbers::pi;
  const assembly::Station& station = assembly.stations[index];
  StationBudget budget{station.name,
                       assembly::does(assembly, station),
                       row.incident,
                       row.onward,
                       row.aside,
                       row.absorbed,
                       row.clipped,
                       row.missed,
                       row.scattered,
                       row.extra,
                       row.bulk,
                       {},
                       {},
                       {},
                       {}};
  if (row.inside <= 0.0)
    return budget;
  budget.transmittance = row.onward / row.inside;
  budget.incidence = {row.least_incidence * degrees, row.incidence / row.inside * degrees,
                      row.most_incidence * degrees};
  if (interface(assembly, station)) {
    budget.pass_s = row.pass_s / row.inside;
    budget.pass_p = row.pass_p / row.inside;
  }
  return budget;
}

std::vector<StationBudget> station_budgets(const Assembly& assembly, const Ledger& ledger) {
  std::vector<StationBudget> budgets;
  for (std::size_t i = 0; i < ledger.rows.size(); ++i)
    budgets.push_back(station_budget(assembly, i, ledger.rows[i]));
  return budgets;
}

/// The ledger of all groups that `chosen` picks, relative to what they launched.
template <typename Choice>
Ledger part(const Traced& traced, Choice chosen) {
  Ledger sum(traced.total.rows.size());
  for (const trace::GroupLedger& group : traced.groups) {
    if (!chosen(group))
      continue;
    Ledger weighted = group.ledger;
    weighted *= group.share;
    sum += weighted;
  }
  if (sum.launched > 0.0)
    sum *= 1.0 / sum.launched;
  return sum;
}

void split_by_wavelength(const Assembly& assembly, const Traced& traced, Split split, Budget& budget) {
  const auto& wavelengths = assembly.light.wavelengths;
  for (std::size_t i = 0; i < wavelengths.size(); ++i) {
    const Ledger ledger =
        part(traced, [&](const trace::GroupLedger& group) { return group.wavelength == i; });
    budget.by_wavelength.push_back({wavelengths[i].nm, ledger.delivered()});
    if (split == Split::wavelength || split == Split::both)
      budget.ledgers.push_back({wavelengths[i].nm, {}, station_budgets(assembly, ledger)});
  }
}

void split_by_field(const Assembly& assembly, const Traced& traced, Split split, Budget& budget) {
  const auto& fields = assembly.light.fields;
  for (std::size_t i = 0; i < fields.size(); ++i) {
    const Ledger ledger = part(traced, [&](const trace::GroupLedger& group) { return group.field == i; });
    budget.by_field.push_back({fields[i].name, fields[i].at, ledger.delivered()});
    if (split == Split::field || split == Split::both)
      budget.ledgers.push_back({{}, fields[i].name, station_budgets(assembly, ledger)});
  }
}

std::vector<std::string> warnings(const Assembly& assembly, const Traced& traced) {
  std::vector<std::string> all;
  if (!traced.accurate)
    all.push_back(
        fmt::format("the accuracy asked for was not reached: the standard error of delivered is {:.2g} "
                    "with the most rays that are traced unasked; --rays traces more",
                    traced.standard_error.value_or(0.0)));
  for (std::size_t i = 0; i < assembly.stations.size(); ++i) {
    const Entry& row = traced.total.rows[i];
    const std::string& name = assembly.stations[i].name;
    if (row.backward > backward_share)
      all.push_back(fmt::format("{}: {:.2g} % of the power runs backwards to the next surface", name,
                                100.0 * row.backward));
    if (row.extrapolated > 0.0)
      all.push_back(
          fmt::format("{}: {:.2g} % of the power falls outside its measured curves; their last row holds",
                      name, 100.0 * row.extrapolated));
  }
  return all;
}

} // namespace

BudgetResult budget(const Assembly& assembly, const BudgetOptions& options) {
  BudgetResult result;
  const auto train = trace::prepare(assembly, result.faults);
  if (!train)
    return result;
  const Traced traced = trace::trace(*train, {.threads = options.threads, .progress = options.progress});
  if (traced.total.launched <= 0.0) {
    const assembly::Mark mark =
        assembly.document ? assembly.document->locate("light.rays") : assembly::Mark{};
    result.faults.add({mark, "the pattern of rays puts no light on the beam", "a finer pattern", ""});
    return result;
  }
  Budget budget;
  budget.delivered = traced.total.delivered();
  budget.uncertainty = traced.standard_error;
  budget.rays = traced.rays;
  budget.closure_error = traced.total.closure_error();
  budget.stations = station_budgets(assembly, traced.total);
  split_by_wavelength(assembly, traced, options.split, budget);
  split_by_field(assembly, traced, options.split, budget);
  result.warnings = warnings(assembly, traced);
  result.budget = std::move(budget);
  return result;
}

} // namespace lightledger::analysis
