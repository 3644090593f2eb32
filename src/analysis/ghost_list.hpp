#pragma once

#include <lightledger/analysis/ghosts.hpp>
#include <lightledger/trace/path_tree.hpp>
#include <lightledger/trace/tree.hpp>

namespace lightledger::analysis {

/// Numbers of the paths that brought light to the detector, brightest first, ties in the order of the train.
[[nodiscard]] std::vector<trace::PathTree::PathNumber> brightest(const trace::PathTree& tree,
                                                                 const trace::PathTable& paths);

/// Of the paths to the detector, how many light was not followed along.
[[nodiscard]] std::uint64_t cut_paths(const trace::PathTree& tree, const trace::TracedTree& traced);

/// Fills in the list of ghosts, as many as are wanted, and what the others bring.
void list_ghosts(const assembly::Assembly& assembly, const trace::PathTree& tree,
                 const trace::TracedTree& traced, std::optional<std::uint64_t> top, Ghosts& ghosts);

/// What leaves through the first station, path by path.
[[nodiscard]] std::vector<ReturnedPath> returned_paths(const assembly::Assembly& assembly,
                                                       const trace::PathTree& tree,
                                                       const trace::TracedTree& traced,
                                                       std::optional<std::uint64_t> top);

} // namespace lightledger::analysis
