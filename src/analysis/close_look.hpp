#pragma once

#include <lightledger/analysis/ghosts.hpp>
#include <lightledger/trace/path_tree.hpp>
#include <lightledger/trace/tree.hpp>

namespace lightledger::analysis {

/// Follows rays along the brightest of the listed paths once more, each by itself, and fills in what that
/// tells: peaks, defocus, reflectances.
void look_closely(const trace::Train& train, const trace::PathTree& tree, const trace::TracedTree& traced,
                  const GhostOptions& options, Ghosts& ghosts);

/// Fills in the limit, the surface with the largest share, and the reflectances that would keep the limit.
void find_cures(const assembly::Assembly& assembly, const trace::PathTree& tree,
                const trace::TracedTree& traced, Ghosts& ghosts);

/// Foci of the beams with at most two bounces, by name.
[[nodiscard]] std::vector<HotFocus> hot_places(const trace::Train& train, const GhostOptions& options);

} // namespace lightledger::analysis
