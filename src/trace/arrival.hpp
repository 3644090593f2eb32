#pragma once

#include <lightledger/optics/polarization.hpp>
#include <lightledger/trace/path_sums.hpp>
#include <lightledger/trace/rays.hpp>
#include <lightledger/trace/train.hpp>

#include <array>
#include <cstdint>

namespace lightledger::trace {

/// Of each lane of a block, the lane of another that holds the same ray.
using LaneMap = std::array<std::uint8_t, RayBlock::lanes>;

/// A block of rays on the detector's surface: the field of each in its double-pole basis about the axis that
/// arrives there, and what follows from it.
struct Arrival {
  std::uint64_t alive = 0;
  int count = 0;
  double x[RayBlock::lanes], y[RayBlock::lanes]; ///< in the detector's own axes
  double opl[RayBlock::lanes];
  double field[8][RayBlock::lanes]; ///< J √w: rows x, y, columns x, y of the entrance, real and imaginary
  double xx[RayBlock::lanes], yy[RayBlock::lanes]; ///< of the coherency matrix J Φ J† w
  double xy[2][RayBlock::lanes];                   ///< ⟨Ex Ey*⟩
};

/// Reads blocks as they stand on the detector.
class ArrivalReader {
public:
  explicit ArrivalReader(const Train& train);

  void read(const RayBlock& rays, Arrival& arrival) const;
  /// Sums over the rays of a block; `image` holds the same rays as they arrive along the intended path, each
  /// in the lane that the map tells.
  [[nodiscard]] PathSums sums(const Arrival& arrival, const Arrival& image, const LaneMap& in_image) const;

private:
  optics::Coherency m_coherency;
  double m_to_axis[3][3]; ///< from the detector's surface to the axes that arrive there
};

} // namespace lightledger::trace
