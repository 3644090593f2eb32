#pragma once

#include <lightledger/trace/path_sums.hpp>
#include <lightledger/trace/path_tree.hpp>
#include <lightledger/trace/progress.hpp>
#include <lightledger/trace/train.hpp>

#include <cstdint>
#include <optional>
#include <vector>

namespace lightledger::trace {

/// What became of all light of a tree of paths, but for that which a detector turned into signal.
struct TreeLedger {
  double returned = 0.0; ///< left through the first station after a bounce
  double leaked = 0.0;   ///< left sideways or behind a mirror
  double absorbed = 0.0;
  double clipped = 0.0;
  double missed = 0.0;
  double scattered = 0.0;
  double extra = 0.0;
  double bulk = 0.0;
  double not_followed = 0.0; ///< of beams cut off: too faint, or bouncing once too often

  TreeLedger& operator+=(const TreeLedger& other);
  TreeLedger& operator*=(double factor);
  [[nodiscard]] double sum() const;
};

/// What the rays of a tree left behind.
struct TreeFound {
  TreeLedger ledger;
  double reflectance = 0.0; ///< of the detector
  double ghosts = 0.0;      ///< power that arrives by paths with bounces, before the detector's reflectance
  PathSums image;           ///< what arrives as intended
  PathTable paths;          ///< what arrives by each path with bounces
  PathTable returned;       ///< what leaves through the first station by each path; powers alone
  PathSpans cut;            ///< paths that some of the light was not followed along

  /// (1 − reflectance)(delivered + ghosts).
  [[nodiscard]] double detector() const { return (1.0 - reflectance) * (image.power + ghosts); }

  TreeFound& operator+=(const TreeFound& other);
  TreeFound& operator*=(double factor);
};

struct TreeOptions {
  double floor = 1e-12; ///< beams that may bring less than this share of their field's and wavelength's power
                        ///< are cut off
  int threads = 0;      ///< 0: as many as the machine has
  std::uint64_t shifts = 0; ///< which set of shifts scatters the rays
  Progress* progress = nullptr;
};

struct TracedTree {
  TreeFound total;               ///< launched = 1
  std::vector<TreeFound> fields; ///< per field, relative to what was launched from it
  std::vector<double> shares;    ///< per field, of all launched power
  bool lit = false;              ///< whether the pattern puts light on the beam
  bool accurate = true;          ///< false where an accuracy asked for was not reached
  std::uint64_t rays = 0;

  /// Standard errors; none for patterns that give none.
  std::optional<double> delivered_error, ghosts_error, returned_error;
  std::vector<double> path_errors; ///< of the rows of total.paths
};

/// Follows the light of a train along all paths of a tree that shares its branches. Where an accuracy is
/// asked for, rays are doubled until the standard error of the ghosts is at most 1 % of them, less in
/// proportion for accuracies below 1e-4.
[[nodiscard]] TracedTree trace_tree(const Train& train, const PathTree& tree,
                                    const TreeOptions& options = {});

} // namespace lightledger::trace
