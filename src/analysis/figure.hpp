#pragma once

#include <optional>

namespace lightledger::analysis {

/// A figure of a result; both are none where it does not exist (contract §5: null).
struct Figure {
  std::optional<double> value;
  std::optional<double> uncertainty;
};

} // namespace lightledger::analysis
