#pragma once

#include <lightledger/assembly/assembly.hpp>
#include <lightledger/assembly/diagnostics.hpp>
#include <lightledger/trace/aim.hpp>
#include <lightledger/trace/bench.hpp>
#include <lightledger/trace/plan.hpp>
#include <lightledger/trace/routes.hpp>

#include <optional>
#include <vector>

namespace lightledger::trace {

/// A train made ready to be traced.
struct Train {
  const assembly::Assembly* assembly;
  Bench bench;
  Routes routes;
  std::vector<Plan> plans;           ///< per wavelength
  Path path;                         ///< as intended
  std::vector<Footprint> footprints; ///< per field
};

/// Lays out, compiles and aims; none where that finds faults. The assembly must outlive the train.
[[nodiscard]] std::optional<Train> prepare(const assembly::Assembly& assembly, assembly::Faults& faults);

} // namespace lightledger::trace
