#pragma once

#include <lightledger/trace/train.hpp>

#include <cstdint>
#include <vector>

namespace lightledger::trace {

/// A ray on the detector: where, in its own axes in mm, and its share of all launched power.
struct Landing {
  double x, y, power;
};

/// What rays do along one path.
struct Landings {
  std::vector<Landing> rays;        ///< that arrive inside the clear area
  std::vector<double> reflectances; ///< per step, mean share reflected, by arriving power; 0 where it passes
};

/// Follows scattered rays along one path, so many a field and wavelength. The same rays in the same order for
/// any number of threads.
[[nodiscard]] Landings land(const Train& train, const Path& path, std::uint64_t rays, int threads);

} // namespace lightledger::trace
