#include "budget_quantity.hpp"
#include "polarization_quantity.hpp"

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
/// Heads of quantities that a command of the contract gives, but not yet this program.
constexpr std::array<std::string_view, 1> later{"ghosts."};
constexpr std::string_view polarization_prefix = "polarization.";
constexpr std::string_view chief_prefix = "polarization.chief.";

bool is_later(std::string_view quantity) {
  return std::ranges::any_of(later, [&](std::string_view head) { return quantity.starts_with(head); });
}

/// The path within the budget; none for a quantity of anything else.
std::optional<std::string_view> path_in_budget(std::string_view quantity) {
  if (quantity == "delivered")
    return quantity;
  if (!quantity.starts_with(budget_prefix))
    return std::nullopt;
  return quantity.substr(budget_prefix.size());
}

std::string nearest_quantity(const Budget& budget, const std::vector<PolarizationFigure>& polarization,
                             std::string_view quantity) {
  std::vector<std::string> names;
  for (const PolarizationFigure& figure : polarization)
    names.push_back(fmt::format("{}{}", polarization_prefix, figure.path));
  for (const std::string& path : budget_paths(budget))
    names.push_back(fmt::format("{}{}", budget_prefix, path));
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

bool asks_for_polarization(const Assembly& assembly) {
  return std::ranges::any_of(assembly.requirements, [](const Requirement& requirement) {
    return requirement.quantity.starts_with(polarization_prefix);
  });
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

Judgement judge_all(const Assembly& assembly, const Budget& budget, const Polarization* polarization) {
  Judgement judgement;
  const std::vector<PolarizationFigure> figures =
      polarization != nullptr ? polarization_figures(*polarization) : std::vector<PolarizationFigure>();
  for (std::size_t i = 0; i < assembly.requirements.size(); ++i) {
    const Requirement& requirement = assembly.requirements[i];
    if (polarization != nullptr && requirement.quantity.starts_with(polarization_prefix)) {
      if (auto verdict = judge_polarization(requirement, *polarization, figures))
        judgement.verdicts.push_back(std::move(*verdict));
      else
        judgement.faults.add(unknown_quantity(assembly, budget, figures, i));
      continue;
    }
    const std::optional<std::string_view> path = path_in_budget(requirement.quantity);
    const std::optional<BudgetFigure> figure = path ? budget_figure(budget, *path) : std::nullopt;
    if (figure) {
      judgement.verdicts.push_back(judge(requirement, figure->value, figure->uncertainty));
    } else if (is_later(requirement.quantity)) {
      judgement.verdicts.push_back(judge(requirement, {}, {}));
      judgement.warnings.push_back(fmt::format(
          "{} cannot be told: its analysis is not available in this version", requirement.quantity));
    } else {
      judgement.faults.add(unknown_quantity(assembly, budget, figures, i));
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
  std::optional<Polarization> polarized;
  if (asks_for_polarization(assembly)) {
    PolarizationResult found =
        polarization(assembly, {.threads = options.threads, .progress = options.progress});
    result.warnings.insert(result.warnings.end(), found.warnings.begin(), found.warnings.end());
    polarized = std::move(found.polarization);
  }
  Judgement judgement = judge_all(assembly, *budget_result.budget, polarized ? &*polarized : nullptr);
  result.warnings.insert(result.warnings.end(), judgement.warnings.begin(), judgement.warnings.end());
  result.faults = judgement.faults;
  if (result.faults.none())
    result.judgement = std::move(judgement);
  return result;
}

} // namespace lightledger::analysis
