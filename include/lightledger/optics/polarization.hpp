#pragma once

#include <lightledger/optics/index.hpp>

namespace lightledger::optics {

/// A state of polarization relative to its power: Stokes parameters S1, S2, S3 over S0, in a transverse basis
/// x, y (contract §2: S3 > 0 is right-handed (IEEE)). Zero is unpolarized light.
struct State {
  double s1 = 0.0;
  double s2 = 0.0;
  double s3 = 0.0;
};

/// Linear light at an azimuth, from x toward y, in degrees.
[[nodiscard]] State linear(double azimuth_deg);

/// Fully polarized light; azimuth and ellipticity in degrees, the latter positive for right-handed (IEEE).
[[nodiscard]] State elliptical(double azimuth_deg, double ellipticity_deg);

/// The coherency matrix ⟨E E†⟩ of a state, of trace 1 (Born & Wolf, 7th ed., §10.9.1):
/// [[xx, xy], [conj(xy), yy]].
struct Coherency {
  double xx = 0.5;
  double yy = 0.5;
  Complex xy = 0.0;
};

[[nodiscard]] Coherency coherency(State state);

} // namespace lightledger::optics
