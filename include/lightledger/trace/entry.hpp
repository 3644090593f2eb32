#pragma once

#include <limits>

namespace lightledger::trace {

/// What became of the power that met one surface, in the unit of the rays' weights (contract §5, budget).
struct Entry {
  double incident = 0.0;
  double missed = 0.0;
  double clipped = 0.0;
  double onward = 0.0;
  double aside = 0.0;
  double absorbed = 0.0;
  double scattered = 0.0;
  double extra = 0.0;
  double bulk = 0.0;     ///< in the leg that leads here; a Ledger's row: in the gap that follows
  double backward = 0.0; ///< power that ran against its direction on that leg; a row: on the leg that follows

  /// Where both beams are followed, what goes on in the other one, and what it loses before; 0 where it is
  /// not.
  double turned = 0.0;
  double turned_scattered = 0.0;
  double turned_extra = 0.0;

  double extrapolated = 0.0; ///< arriving power that a measured curve was extended for
  double inside = 0.0;       ///< arriving power inside the clear area
  double pass_s = 0.0;       ///< Σ arriving power · |a_s|² over the same rays
  double pass_p = 0.0;
  double incidence = 0.0; ///< Σ arriving power · angle of incidence, rad
  double least_incidence = std::numeric_limits<double>::infinity();
  double most_incidence = -std::numeric_limits<double>::infinity();

  Entry& operator+=(const Entry& other);
  /// All powers times a factor; angles stay.
  Entry& operator*=(double factor);
};

} // namespace lightledger::trace
