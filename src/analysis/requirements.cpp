#include "budget_quantity.hpp"
#include "ghost_quantity.hpp"

#include <lightledger/analysis/requirements.hpp>
#include <lightledger/assembly/document.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cmath>
#include <utility>

namespace lightledger::analysis {
namespace {

using assembly::Assembly;
using assembly::Fault;
using assembly::Requirement;

constexpr std::string_view budget_prefix = "budget.";
constexpr std::string_view ghosts_prefix = "ghosts.";
/// Heads of quantities that a command of the contract gives, but not yet this program.
constexpr std::array<std::string_view, 1> later{"polarization."};

bool is_later(std::string_view quantity) {
  return std::ranges::any_of(later, [&](std::string_view head) { return quantity.starts_with(head); });
}

std::optional<Figure> figure(const Budget& budget, const Ghosts* ghosts, std::string_view quantity) {
  if (quantity == "delivered")
    return budget_figure(budget, quantity);
  if (quantity.starts_with(budget_prefix))
    return budget_figure(budget, quantity.substr(budget_prefix.size()));
  if (ghosts != nullptr && quantity.starts_with(ghosts_prefix))
    return ghost_figure(*ghosts, quantity.substr(ghosts_prefix.size()));
  return std::nullopt;
}

std::string nearest_quantity(const Budget& budget, std::string_view quantity) {
  std::vector<std::string> names;
  for (const std::string& path : budget_paths(budget))
    names.push_back(fmt::format("{}{}", budget_prefix, path));
  for (const std::string_view path : ghost_paths())
    names.push_back(fmt::format("{}{}", ghosts_prefix, path));
  std::vector<std::string_view> candidates{"delivered"};
  candidates.insert(candidates.end(), names.begin(), names.end());
  return std::string(assembly::nearest(quantity, candidates));
}

Fault unknown_quantity(const Assembly& assembly, const Budget& budget, std::size_t index) {
  const std::string& quantity = assembly.requirements[index].quantity;
  const std::string where = fmt::format("requirements[{}].quantity", index);
  return {assembly.document ? assembly.document->locate(where) : assembly::Mark{},
          fmt::format("there is no quantity '{}'", quantity),
          "a path in the JSON of a command, as delivered or budget.stations.NAME.absorbed",
          nearest_quantity(budget, quantity)};
}

/// Warnings that were not given before.
void add_new(const std::vector<std::string>& warnings, std::vector<std::string>& all) {
  for (const std::string& warning : warnings)
    if (std::ranges::find(all, warning) == all.end())
      all.push_back(warning);
}

} // namespace

Verdict judge(const Requirement& requirement, std::optional<double> value,
              std::optional<double> uncertainty) {
  Verdict verdict{requirement.quantity, requirement.sense, requirement.limit, value, uncertainty, {}, {}};
  if (!value)
    return verdict;
  const bool at_least = requirement.sense == assembly::Sense::at_least;
  const double margin = at_least ? *value - requirement.limit : requirement.limit - *value;
  const double rounding = 1e-12 * std::max(1.0, std::abs(requirement.limit));
  verdict.margin = margin;
  if (const double doubt = 2.0 * uncertainty.value_or(0.0); doubt <= rounding || std::abs(margin) >= doubt)
    verdict.met = margin >= -rounding;
  return verdict;
}

bool Judgement::all_met() const {
  return std::ranges::all_of(verdicts, [](const Verdict& verdict) { return verdict.met == true; });
}

bool asks_for_ghosts(const Assembly& assembly) {
  return std::ranges::any_of(assembly.requirements, [](const Requirement& requirement) {
    return requirement.quantity.starts_with(ghosts_prefix);
  });
}

Judgement judge_all(const Assembly& assembly, const Budget& budget, const Ghosts* ghosts) {
  Judgement judgement;
  for (std::size_t i = 0; i < assembly.requirements.size(); ++i) {
    const Requirement& requirement = assembly.requirements[i];
    if (const auto found = figure(budget, ghosts, requirement.quantity)) {
      judgement.verdicts.push_back(judge(requirement, found->value, found->uncertainty));
    } else if (is_later(requirement.quantity)) {
      judgement.verdicts.push_back(judge(requirement, {}, {}));
      judgement.warnings.push_back(fmt::format(
          "{} cannot be told: its analysis is not available in this version", requirement.quantity));
    } else {
      judgement.faults.add(unknown_quantity(assembly, budget, i));
    }
  }
  return judgement;
}

CheckResult check(const Assembly& assembly, const BudgetOptions& options) {
  constexpr std::uint64_t rays_for_soundness = 16;
  CheckResult result;
  Assembly traced = assembly;
  if (assembly.requirements.empty())
    traced.light.sampling = assembly::Scattered{rays_for_soundness};

  BudgetResult budget_result = budget(traced, options);
  result.warnings = std::move(budget_result.warnings);
  result.faults = std::move(budget_result.faults);
  if (!budget_result.budget)
    return result;
  GhostsResult ghosts_result;
  if (asks_for_ghosts(assembly)) {
    ghosts_result = ghosts(assembly, {.threads = options.threads});
    result.faults = std::move(ghosts_result.faults);
    if (!ghosts_result.ghosts)
      return result;
    add_new(ghosts_result.warnings, result.warnings);
  }
  Judgement judgement =
      judge_all(assembly, *budget_result.budget, ghosts_result.ghosts ? &*ghosts_result.ghosts : nullptr);
  result.warnings.insert(result.warnings.end(), judgement.warnings.begin(), judgement.warnings.end());
  result.faults = judgement.faults;
  if (result.faults.none())
    result.judgement = std::move(judgement);
  return result;
}

} // namespace lightledger::analysis
