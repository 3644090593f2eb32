#include "budget_quantity.hpp"
#include "ghost_quantity.hpp"
#include "polarization_quantity.hpp"

#include <lightledger/analysis/requirements.hpp>
#include <lightledger/assembly/document.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <utility>

namespace lightledger::analysis {
namespace {

using assembly::Assembly;
using assembly::Fault;
using assembly::Requirement;

constexpr std::string_view budget_prefix = "budget.";
constexpr std::string_view ghosts_prefix = "ghosts.";
constexpr std::string_view polarization_prefix = "polarization.";
constexpr std::string_view chief_prefix = "polarization.chief.";

std::optional<Figure> figure(const Budget& budget, const Ghosts* ghosts, std::string_view quantity) {
  if (quantity == "delivered")
    return budget_figure(budget, quantity);
  if (quantity.starts_with(budget_prefix))
    return budget_figure(budget, quantity.substr(budget_prefix.size()));
  if (ghosts != nullptr && quantity.starts_with(ghosts_prefix))
    return ghost_figure(*ghosts, quantity.substr(ghosts_prefix.size()));
  return std::nullopt;
}

std::string nearest_quantity(const Budget& budget, const std::vector<PolarizationFigure>& polarization,
                             std::string_view quantity) {
  std::vector<std::string> names;
  names.reserve(polarization.size());
  for (const PolarizationFigure& figure : polarization)
    names.push_back(fmt::format("{}{}", polarization_prefix, figure.path));
  for (const std::string& path : budget_paths(budget))
    names.push_back(fmt::format("{}{}", budget_prefix, path));
  for (const std::string_view path : ghost_paths())
    names.push_back(fmt::format("{}{}", ghosts_prefix, path));
  std::vector<std::string_view> candidates{"delivered"};
  candidates.insert(candidates.end(), names.begin(), names.end());
  return std::string(assembly::nearest(quantity, candidates));
}

Fault unknown_quantity(const Assembly& assembly, const Budget& budget,
                       const std::vector<PolarizationFigure>& polarization, std::size_t index) {
  const std::string& quantity = assembly.requirements[index].quantity;
  const std::string where = fmt::format("requirements[{}].quantity", index);
  return {assembly.document ? assembly.document->locate(where) : assembly::Mark{},
          fmt::format("there is no quantity '{}'", quantity),
          "a path in the JSON of a command, as delivered or budget.stations.NAME.absorbed",
          nearest_quantity(budget, polarization, quantity)};
}

/// The verdict on a figure of polarization; an extinction without bounds meets every at_least. None where
/// there is no such figure.
std::optional<Verdict> judge_polarization(const Requirement& requirement, const Polarization& polarization,
                                          const std::vector<PolarizationFigure>& figures) {
  const std::string_view path = std::string_view(requirement.quantity).substr(polarization_prefix.size());
  const auto found = std::ranges::find(figures, path, &PolarizationFigure::path);
  if (found == figures.end()) {
    // Where there is no chief ray nothing about it can be told.
    if (requirement.quantity.starts_with(chief_prefix) && !polarization.chief)
      return judge(requirement, {}, {});
    return std::nullopt;
  }
  Verdict verdict = judge(requirement, found->value, found->uncertainty);
  if (found->boundless)
    verdict.met = requirement.sense == assembly::Sense::at_least;
  return verdict;
}

bool asks_for(const Assembly& assembly, std::string_view head) {
  return std::ranges::any_of(assembly.requirements, [&](const Requirement& requirement) {
    return requirement.quantity.starts_with(head);
  });
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

Judgement judge_all(const Assembly& assembly, const Budget& budget, const Polarization* polarization,
                    const Ghosts* ghosts) {
  Judgement judgement;
  const std::vector<PolarizationFigure> figures =
      polarization != nullptr ? polarization_figures(*polarization) : std::vector<PolarizationFigure>();
  for (std::size_t i = 0; i < assembly.requirements.size(); ++i) {
    const Requirement& requirement = assembly.requirements[i];
    std::optional<Verdict> verdict;
    if (polarization != nullptr && requirement.quantity.starts_with(polarization_prefix))
      verdict = judge_polarization(requirement, *polarization, figures);
    else if (const auto found = figure(budget, ghosts, requirement.quantity))
      verdict = judge(requirement, found->value, found->uncertainty);
    const bool not_analysed =
        (polarization == nullptr && requirement.quantity.starts_with(polarization_prefix)) ||
        (ghosts == nullptr && requirement.quantity.starts_with(ghosts_prefix));
    if (not_analysed) {
      verdict = judge(requirement, {}, {});
      judgement.warnings.push_back(
          fmt::format("{} cannot be told: its analysis was not made", requirement.quantity));
    }
    if (verdict)
      judgement.verdicts.push_back(std::move(*verdict));
    else
      judgement.faults.add(unknown_quantity(assembly, budget, figures, i));
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
  std::optional<Ghosts> ghosts_found;
  if (asks_for(assembly, ghosts_prefix)) {
    GhostsResult found = ghosts(assembly, {.threads = options.threads, .progress = options.progress});
    result.faults = std::move(found.faults);
    if (!found.ghosts)
      return result;
    add_new(found.warnings, result.warnings);
    ghosts_found = std::move(found.ghosts);
  }
  std::optional<Polarization> polarized;
  if (asks_for(assembly, polarization_prefix)) {
    PolarizationResult found =
        polarization(assembly, {.threads = options.threads, .progress = options.progress});
    add_new(found.warnings, result.warnings);
    polarized = std::move(found.polarization);
  }
  Judgement judgement = judge_all(assembly, *budget_result.budget, polarized ? &*polarized : nullptr,
                                  ghosts_found ? &*ghosts_found : nullptr);
  result.warnings.insert(result.warnings.end(), judgement.warnings.begin(), judgement.warnings.end());
  result.faults = judgement.faults;
  if (result.faults.none())
    result.judgement = std::move(judgement);
  return result;
}

} // namespace lightledger::analysis
