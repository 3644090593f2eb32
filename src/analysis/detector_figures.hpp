#pragma once

#include "polarization_survey.hpp"

#include <lightledger/analysis/polarization.hpp>

#include <vector>

namespace lightledger::analysis {

/// All the figures that follow from sums over rays, or their standard errors.
struct SumFigures {
  DetectorFigures detector;
  std::vector<AttributionFigures> attribution; ///< per set
};

/// The figures of samples of rays; `parity` is −1 in a train of an odd number of mirrors.
[[nodiscard]] SumFigures sum_figures(const trace::Samples<PolarizationSums>& samples, optics::State launched,
                                     double parity);

/// Their standard errors, by leaving each of the replicates out in turn (the jackknife; Efron & Stein, Ann.
/// Statist. 9, 586 (1981)).
[[nodiscard]] SumFigures sum_errors(const trace::Samples<PolarizationSums>& samples, optics::State launched,
                                    double parity);

} // namespace lightledger::analysis
