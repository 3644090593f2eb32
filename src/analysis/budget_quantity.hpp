#pragma once

#include <lightledger/analysis/budget.hpp>

#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace lightledger::analysis {

/// A figure of the budget; both are none where it does not exist (contract §5: null).
struct BudgetFigure {
  std::optional<double> value;
  std::optional<double> uncertainty;
};

/// The figure at a path in the budget's JSON, without the leading `budget.`; none where no figure can stand
/// there.
[[nodiscard]] std::optional<BudgetFigure> budget_figure(const Budget& budget, std::string_view path);

/// Every path that leads to a figure of this budget, stations and fields by name where they have one.
[[nodiscard]] std::vector<std::string> budget_paths(const Budget& budget);

} // namespace lightledger::analysis
