#include "polarization_advice.hpp"

#include <algorithm>
#include <cmath>

namespace lightledger::analysis {
namespace {

using optics::PauliVector;

constexpr PauliVector identity{1.0, 0.0, 0.0, 0.0};
/// Retardance below this, in degrees, is not worth a sentence.
constexpr double noticeable_deg = 0.1;

double retardance_or_nan(const PauliVector& k) {
  const auto found = optics::retardance(k);
  return found ? found->size : std::nan("");
}

/// The products of a walk: before each station, and behind each.
struct Products {
  std::vector<PauliVector> before, behind;

  explicit Products(const std::vector<PauliVector>& did) : before{identity}, behind(did.size(), identity) {
    for (const PauliVector& k : did)
      before.push_back(optics::product(k, before.back()));
    for (std::size_t i = did.size(); i-- > 1;)
      behind[i - 1] = optics::product(behind[i], did[i]);
  }
};

/// What is left of a cancellation when one of the two is taken out: at least this much comes back.
double rise(const CancellingPair& pair) {
  return std::min(pair.without_first, pair.without_second) - pair.retardance_deg;
}

bool cancels(const CancellingPair& pair) {
  return rise(pair) > noticeable_deg && std::abs(pair.without_both - pair.retardance_deg) < 0.5 * rise(pair);
}

std::vector<CancellingPair> candidates(const std::vector<PauliVector>& did) {
  const Products products(did);
  const double now = retardance_or_nan(products.before.back());
  std::vector<CancellingPair> found;
  for (std::size_t i = 0; i < did.size(); ++i) {
    const double without_first = retardance_or_nan(optics::product(products.behind[i], products.before[i]));
    PauliVector up_to_second = products.before[i]; // with the first station neutral
    for (std::size_t j = i + 1; j < did.size(); ++j) {
      const CancellingPair pair{i,
                                j,
                                now,
                                without_first,
                                retardance_or_nan(optics::product(products.behind[j], products.before[j])),
                                retardance_or_nan(optics::product(products.behind[j], up_to_second))};
      if (cancels(pair))
        found.push_back(pair);
      up_to_second = optics::product(did[j], up_to_second);
    }
  }
  return found;
}

} // namespace

std::vector<CancellingPair> cancelling_pairs(const ChiefWalk& walk) {
  std::vector<CancellingPair> found = candidates(walk.did);
  std::ranges::stable_sort(found, std::ranges::greater{}, rise);
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
