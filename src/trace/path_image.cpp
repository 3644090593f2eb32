#include "paraxial.hpp"

#include <lightledger/trace/path_image.hpp>

namespace lightledger::trace {
namespace {

/// Along the axis, of the run of light that arrives in a state.
double gap_before(const Train& train, State state) {
  const Bench& bench = train.bench;
  const assembly::Assembly& assembly = *train.assembly;
  if (state.face != Face::front)
    return assembly.surfaces[assembly.stations[state.visit].surface].rear->thickness;
  return state.heading == Heading::along ? bench.gap[state.visit - 1] : bench.gap[state.visit];
}

} // namespace

std::optional<double> paraxial_image(const Train& train, const PathTree::Way& way) {
  const assembly::Assembly& assembly = *train.assembly;
  ParaxialRay ray(assembly);
  for (std::size_t i = 0; i < way.states.size(); ++i) {
    if (i > 0)
      ray.advance(gap_before(train, way.states[i]));
    if (i + 1 == way.states.size())
      break;
    const Path::Step& step = way.path.steps[i];
    const auto from = step.op % 2 == 0 ? assembly::Side::before : assembly::Side::beyond;
    ray.meet(assembly.surfaces[step.op / 2], from, step.act == Act::bounce);
  }
  return ray.signed_image_distance();
}

} // namespace lightledger::trace
