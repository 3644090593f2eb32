#include "reflecting_detector.hpp"

#include <variant>

namespace lightledger::trace {

double detector_reflectance(const Train& train) {
  const assembly::Assembly& assembly = *train.assembly;
  const auto& effect = assembly.surfaces[assembly.stations.back().surface].effect;
  const auto* sensor = std::get_if<assembly::Sensor>(&effect);
  return sensor != nullptr ? sensor->reflectance : 0.0;
}

std::vector<PlanOp> reflecting_detectors(const Train& train) {
  const OpId own = train.path.steps.back().op;
  std::vector<PlanOp> ops;
  for (const Plan& plan : train.plans) {
    PlanOp op = plan.ops[own];
    op.amplitude = AmplitudeKind::ideal;
    op.reflect_s = op.reflect_p = detector_reflectance(train);
    op.transmit_s = op.transmit_p = 1.0;
    ops.push_back(op);
  }
  return ops;
}

} // namespace lightledger::trace
