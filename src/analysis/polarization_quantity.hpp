#pragma once

#include <lightledger/analysis/polarization.hpp>

#include <optional>
#include <string>
#include <vector>

namespace lightledger::analysis {

/// A figure in the JSON of `polarization`; value and error are none where it does not exist.
struct PolarizationFigure {
  std::string path; ///< without the leading `polarization.`
  std::optional<double> value;
  std::optional<double> uncertainty;
  bool boundless = false; ///< an extinction ratio without bounds, whose value is none
};

/// Every figure that requirements may name, items of lists by their index and, after all of these, by name.
[[nodiscard]] std::vector<PolarizationFigure> polarization_figures(const Polarization& polarization);

} // namespace lightledger::analysis
