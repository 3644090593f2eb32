#pragma once

#include <lightledger/analysis/polarization.hpp>
#include <lightledger/trace/train.hpp>

#include <optional>
#include <vector>

namespace lightledger::analysis {

/// The chief ray on its way, past all apertures.
struct ChiefWalk {
  std::vector<optics::PauliVector> did; ///< per station before the detector, in the entrance's basis
  std::vector<optics::PauliVector>
      so_far;                 ///< in the double-pole basis behind each station, and at the detector
  std::vector<double> weight; ///< behind each station, and at the detector: what scatter, loss and bulk left
  std::vector<double> parity; ///< behind each station: −1 after an odd number of reflections
  std::vector<std::array<double, 3>> direction; ///< behind each station, in its surface's own axes
  double rotation_deg;
};

/// None where the ray cannot be aimed, misses a surface or is totally reflected at a lens.
[[nodiscard]] std::optional<ChiefWalk> walk_chief(const trace::Train& train);

/// What the walk says of the chief ray.
[[nodiscard]] ChiefRay describe_chief(const trace::Train& train, const ChiefWalk& walk);

} // namespace lightledger::analysis
