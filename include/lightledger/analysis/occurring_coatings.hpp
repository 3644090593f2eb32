#pragma once

#include <lightledger/analysis/budget.hpp>
#include <lightledger/analysis/coating_curve.hpp>
#include <lightledger/assembly/assembly.hpp>

#include <cstddef>
#include <vector>

namespace lightledger::analysis {

/// A coating between two media as a train uses it.
struct OccurringCoating {
  std::vector<std::size_t> stations; ///< that meet it there, numbers from 0
  CoatingCurve curve;                ///< around the light's wavelengths, at angles that occur
};

/// The curves of all coatings that the light of a budget meets: each between the media it stands between, at
/// the least, mean and greatest angle of incidence over all its stations, converted to the medium outside the
/// coating. Wavelengths reach some way beyond those of the light, as far as coating and media are known.
[[nodiscard]] std::vector<OccurringCoating> occurring_coatings(const assembly::Assembly& assembly,
                                                               const Budget& budget);

} // namespace lightledger::analysis
