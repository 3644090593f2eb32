#pragma once

#include "chief_ray.hpp"

#include <optional>
#include <vector>

/// What the chief ray's walk says about remedies.
namespace lightledger::analysis {

/// Pairs of stations that take back each other's retardance on the chief ray, the strongest first, no station
/// in two of them.
[[nodiscard]] std::vector<CancellingPair> cancelling_pairs(const ChiefWalk& walk);

/// The fold, the train's first excepted, whose turn about the axis that arrives at it lowers the retardance of
/// mirrors and lenses on the chief ray most; none where no turn halves it.
[[nodiscard]] std::optional<FoldTurn> fold_turn(const trace::Train& train, const ChiefWalk& walk);

/// Settings of one or two wave plates with the least cross leakage on the chief ray; none without such plates
/// or a fully polarized launched state, or where they do not halve it.
[[nodiscard]] std::optional<PlateSettings> plate_settings(const trace::Train& train, const ChiefWalk& walk);

} // namespace lightledger::analysis
