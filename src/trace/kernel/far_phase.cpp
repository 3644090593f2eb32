#include "far_phase.hpp"

#include <cmath>

namespace lightledger::trace {

void far_phases(const double* angles, double* sines, double* cosines, int count) {
  for (int i = 0; i < count; ++i) {
    sines[i] = std::sin(angles[i]);
    cosines[i] = std::cos(angles[i]);
  }
}

} // namespace lightledger::trace
