#pragma once

#include "reference/disc.hpp"
#include "reference/ledger.hpp"
#include "reference/random_test.hpp"

#include <lightledger/trace/tracer.hpp>

#include <functional>
#include <memory>
#include <vector>

/// Random assemblies on the road of the program itself, side by side with the textbook tracer.
namespace lightledger::properties {

/// A random assembly made ready for both tracers.
struct Both {
  std::unique_ptr<assembly::Assembly> assembly;
  reference::Bench bench;
  trace::Train train;
};
[[nodiscard]] Both prepare(const assembly::Assembly& assembly);

/// One ray as a block, with the double-pole basis, unit Jones matrix and weight 1.
[[nodiscard]] trace::RayBlock block_of(const std::vector<reference::Ray>& rays);

/// The rows of the stations that a block reaches along the intended path, and the block behind each of them;
/// `meddle` may spoil each of these.
struct Run {
  trace::Ledger ledger;
  std::vector<trace::RayBlock> behind;
  std::size_t reached = 0; ///< stations
};
using Meddle = std::function<void(std::size_t station, trace::RayBlock& behind)>;
[[nodiscard]] Run run(const trace::Train& train, const trace::RayBlock& launched, std::size_t wavelength = 0,
                      const Meddle& meddle = {});

/// The polarization matrix, in bench coordinates, of a block's first ray behind a station.
[[nodiscard]] reference::PolarizationMatrix polarization_matrix(const trace::Train& train,
                                                                const trace::RayBlock& launched,
                                                                const trace::RayBlock& behind,
                                                                std::size_t station);

/// The ledger of all the light by the textbook tracer, for patterns of rings and grids; `doubtful` counts
/// rays.
struct Textbook {
  reference::Ledger ledger;
  int left_out = 0;
};
[[nodiscard]] Textbook textbook(const Both& both);

/// The points where a field's rays start: on the disc, or with `fill_stop` on the ellipse that it is mapped
/// to.
[[nodiscard]] std::vector<reference::DiscPoint> launch_points(const Both& both, std::size_t field);

/// Replaces a scattered pattern, whose points are the program's own choice, by rings.
void use_fixed_pattern(assembly::Assembly& assembly);

/// Delivered power and all rows of two ledgers agree within a tolerance.
[[nodiscard]] bool alike(const trace::Ledger& one, const trace::Ledger& other, double tolerance);

} // namespace lightledger::properties
