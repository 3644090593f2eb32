#pragma once

#include <lightledger/assembly/assembly.hpp>

#include <cstdint>

namespace lightledger::reference {

/// What a random assembly may hold.
struct Variety {
  bool lossless = false;   ///< no absorption, scatter or loss, no opaque backing, nothing that clips
  bool returning = false;  ///< surfaces are met again for certain, if the axis comes back to them
  bool reversible = false; ///< no shift where the axis does not leave as it arrived, and no surface met
                           ///< again, so that the train can be reversed
};

/// A plausible train of 2 to 12 stations, a few more where surfaces are met again, and its light: all shapes,
/// coatings, elements, apertures and states of polarization. Most rays of most assemblies get through; some
/// are clipped, missed or totally reflected. The same seed gives the same assembly.
[[nodiscard]] assembly::Assembly random_assembly(std::uint64_t seed, const Variety& variety = {});

} // namespace lightledger::reference
