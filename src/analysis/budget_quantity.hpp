#pragma once

#include "figure.hpp"

#include <lightledger/analysis/budget.hpp>

#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace lightledger::analysis {

/// The figure at a path in the budget's JSON, without the leading `budget.`; none where no figure can stand
/// there.
[[nodiscard]] std::optional<Figure> budget_figure(const Budget& budget, std::string_view path);

/// Every path that leads to a figure of this budget, stations and fields by name where they have one.
[[nodiscard]] std::vector<std::string> budget_paths(const Budget& budget);

} // namespace lightledger::analysis
