#pragma once

#include <lightledger/trace/path_tree.hpp>
#include <lightledger/trace/train.hpp>

#include <cstddef>
#include <optional>
#include <vector>

namespace lightledger::trace {

/// Where light of one field draws together in a solid or liquid medium, or on a surface.
struct Focus {
  std::vector<State> bounces;    ///< so far; none for the intended beam
  std::size_t field;
  std::optional<StationId> from; ///< the meeting before; none at the launch
  StationId to;                  ///< the meeting after
  /// In the medium between them, or where its focus lies near a surface, on that of `from` or `to`.
  enum class Where { between, at_from, at_to } where;
  assembly::MediumId medium; ///< between them
  double distance_mm;        ///< from the meeting before to the place, along the mean ray
  double power;              ///< of what was launched from the field
  double radius_mm;          ///< √2 · rms of the rays there, but not below λ/(π NA)
  double irradiance_ratio;   ///< power/(π radius²) over that of the launched beam
};

/// Foci of the intended beam and of all beams that bounced, with 16 rays of each field at the first
/// wavelength, brightest first, at most `most` of them; one a run of light from meeting to meeting, and only
/// those brighter than the launched beam. A focus is near a surface where the irradiance on that is at least a
/// tenth of what it is in the focus.
[[nodiscard]] std::vector<Focus> hot_foci(const Train& train, const PathTree& tree, double floor,
                                          std::size_t most);

} // namespace lightledger::trace
