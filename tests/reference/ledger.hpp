#pragma once

#include "reference/tracer.hpp"

#include <limits>
#include <vector>

namespace lightledger::reference {

/// One station's line of the ledger, in fractions of what was launched (contract §5, budget).
struct StationLedger {
  double incident = 0.0, onward = 0.0, aside = 0.0, absorbed = 0.0, clipped = 0.0, missed = 0.0,
         scattered = 0.0, extra = 0.0, bulk = 0.0;
  double inside = 0.0; ///< arriving power of the rays within the clear area, the weight of the means below
  double pass_s = 0.0, pass_p = 0.0; ///< sums; the means are these over `inside`
  double incidence_deg = 0.0;
  double least_deg = std::numeric_limits<double>::infinity();
  double most_deg = -std::numeric_limits<double>::infinity();
};

struct Ledger {
  std::vector<StationLedger> stations;
  double launched = 0.0;
  double delivered = 0.0;

  /// Enters a ray that carries this share of the power.
  void enter(const RayRecord& ray, double weight);
  /// launched − delivered − the losses of all stations.
  [[nodiscard]] double closure_error() const;
};

/// What a ray loses in all.
[[nodiscard]] double lost(const RayRecord& ray);

} // namespace lightledger::reference
