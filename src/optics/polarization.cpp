#include <lightledger/optics/polarization.hpp>

#include <cmath>
#include <numbers>

namespace lightledger::optics {

State linear(double azimuth_deg) {
  return elliptical(azimuth_deg, 0.0);
}

State elliptical(double azimuth_deg, double ellipticity_deg) {
  constexpr double twice = 2.0 * std::numbers::pi / 180.0;
  const double azimuth = twice * azimuth_deg;
  const double ellipticity = twice * ellipticity_deg;
  return {std::cos(ellipticity) * std::cos(azimuth), std::cos(ellipticity) * std::sin(azimuth),
          std::sin(ellipticity)};
}

Coherency coherency(State state) {
  return {0.5 * (1.0 + state.s1), 0.5 * (1.0 - state.s1), 0.5 * Complex{state.s2, -state.s3}};
}

} // namespace lightledger::optics
