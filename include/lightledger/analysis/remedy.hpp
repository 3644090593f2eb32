#pragma once

#include <lightledger/analysis/budget.hpp>
#include <lightledger/assembly/assembly.hpp>

#include <cstddef>
#include <vector>

namespace lightledger::analysis {

/// A better coating at one station, and what it would bring.
struct Remedy {
  std::size_t station;
  bool reflects;      ///< whether the station reflects; a face that light passes needs the contrary
  double reflectance; ///< of the coating: at least this where the station reflects, at most this elsewhere
  double delivered;   ///< with that reflectance
  bool suffices;      ///< it would meet a requirement on `delivered` that is missed now
};

/// Coatings that would bring most back of what the two stations lose that absorb or reflect most: mirrors
/// that absorb, and faces that send light aside or absorb it. The reflectance is what a missed requirement on
/// `delivered` needs, where one station alone can meet it, else what a good coating has (0.99, and 0.002 for
/// faces). Stations whose surface is met twice are left out, faces whose coating may be a filter's (measured, ideal,
/// or of more than six layers), and losses below 1e-3.
///
/// The assembly is traced with an ideal coating in place, and as it is, by the same rays; `delivered` of the
/// budget, times the ratio, is then as accurate as the budget. In the reflectance of an ideal coating that
/// light meets once the delivered power is linear, so one trace serves for all.
[[nodiscard]] std::vector<Remedy> remedies(const assembly::Assembly& assembly, const Budget& budget,
                                           const BudgetOptions& options = {});

} // namespace lightledger::analysis
