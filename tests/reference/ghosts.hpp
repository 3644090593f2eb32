#pragma once

#include "reference/tracer.hpp"

#include <map>
#include <string>
#include <vector>

namespace lightledger::reference {

/// A way of light to the detector that bounces, written out.
struct GhostPath {
  std::vector<std::string> bounces;
  std::vector<Encounter> encounters;
};

/// An assembly whose detector may also be met as an interface that reflects what it reflects, and all ways of
/// its light to the detector with one to so many bounces. Each is found by going from station to station:
/// where light should pass it may turn back, where it should be reflected it is, and behind a mirror with a
/// rear face it goes there and back. Not for trains that meet a surface again.
struct GhostPaths {
  assembly::Assembly assembly;
  std::vector<GhostPath> paths;
};
[[nodiscard]] GhostPaths ghost_paths(const assembly::Assembly& assembly, const Bench& bench, int bounces);

/// Power, Stokes parameters in the detector's basis and Σ power · (x, y, optical path), by path.
struct GhostSums {
  double power = 0.0, s1 = 0.0, s2 = 0.0, s3 = 0.0, x = 0.0, y = 0.0, optical_path = 0.0;
  bool comparable = true; ///< no ray was doubtful
};
[[nodiscard]] GhostSums ghost_sums(const GhostPaths& all, const GhostPath& path, const Bench& bench);

} // namespace lightledger::reference
