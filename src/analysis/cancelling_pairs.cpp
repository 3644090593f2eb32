#include "polarization_advice.hpp"

#include <algorithm>
#include <cmath>
#include <utility>

namespace lightledger::analysis {
namespace {

using optics::PauliVector;

/// Retardance below this, in degrees, is not worth a sentence.
constexpr double noticeable_deg = 0.1;
/// A pair cancels where it leaves less than this of the weaker one's retardance.
constexpr double left_over = 0.2;

/// 0 where there is none.
double retardance_deg(const PauliVector& k) {
  const auto found = optics::retardance(k);
  return found ? found->size : 0.0;
}

/// K⁻¹ but for a factor, which no retardance knows of.
PauliVector inverse(const PauliVector& k) {
  return {k[0], -k[1], -k[2], -k[3]};
}

/// What two stations do together, as if the second stood right behind the first.
PauliVector together(const PauliVector& first, const PauliVector& between, const PauliVector& second) {
  return optics::product(optics::product(inverse(between), second), optics::product(between, first));
}

/// How much of the weaker one's retardance is gone, in degrees.
double gain(const CancellingPair& pair) {
  return std::min(pair.first_deg, pair.second_deg) - pair.together_deg;
}

std::vector<CancellingPair> candidates(const std::vector<PauliVector>& did) {
  std::vector<CancellingPair> found;
  for (std::size_t i = 0; i < did.size(); ++i) {
    const double first_deg = retardance_deg(did[i]);
    if (first_deg < noticeable_deg)
      continue;
    PauliVector between{1.0, 0.0, 0.0, 0.0};
    for (std::size_t j = i + 1; j < did.size(); ++j) {
      const double second_deg = retardance_deg(did[j]);
      const auto both = optics::retardance(together(did[i], between, did[j]));
      if (second_deg >= noticeable_deg && both && both->size < left_over * std::min(first_deg, second_deg))
        found.push_back({i, j, first_deg, second_deg, both->size});
      between = optics::product(did[j], between);
    }
  }
  return found;
}

} // namespace

std::vector<CancellingPair> cancelling_pairs(const ChiefWalk& walk) {
  std::vector<CancellingPair> found = candidates(walk.did);
  // Of pairs as good to a thousandth of a degree the nearer to each other.
  std::ranges::stable_sort(found, {}, [](const CancellingPair& pair) {
    return std::pair(-std::round(1e3 * gain(pair)), pair.second - pair.first);
  });
  std::vector<CancellingPair> kept;
  std::vector<bool> taken(walk.did.size(), false);
  for (const CancellingPair& pair : found) {
    if (taken[pair.first] || taken[pair.second])
      continue;
    taken[pair.first] = taken[pair.second] = true;
    kept.push_back(pair);
  }
  return kept;
}

} // namespace lightledger::analysis
