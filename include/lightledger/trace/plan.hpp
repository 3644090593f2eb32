#pragma once

#include <lightledger/trace/bench.hpp>
#include <lightledger/trace/operator.hpp>
#include <lightledger/trace/routes.hpp>

#include <cstdint>
#include <memory>
#include <vector>

namespace lightledger::trace {

/// Everything the tracer needs at one wavelength: all legs, and two operators a surface.
struct Plan {
  double wavelength_nm;
  std::vector<PlanLeg> legs;
  std::vector<PlanOp> ops;
  std::vector<std::unique_ptr<CurvePoint[]>> curves;
  std::vector<std::unique_ptr<PlanLayer[]>> stacks;          ///< what the operators' `layers` point into
  std::vector<std::shared_ptr<const AmplitudeTable>> tables; ///< and their `table`
};

/// Compiles a train that was loaded and laid out without faults.
[[nodiscard]] Plan compile(const assembly::Assembly& assembly, const Bench& bench, const Routes& routes,
                           double wavelength_nm);

} // namespace lightledger::trace
