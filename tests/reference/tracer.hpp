#pragma once

#include "reference/bench.hpp"

#include <vector>

namespace lightledger::reference {

using PolarizationMatrix = Eigen::Matrix3cd;

/// What became at one station of a ray's power, as fractions of what was launched (contract §5, budget), and
/// where. A ray's last step is the one at which it ends: missed, clipped, or with nothing onward.
struct Step {
  double incident = 0.0;
  double missed = 0.0, clipped = 0.0, aside = 0.0, absorbed = 0.0, scattered = 0.0, extra = 0.0;
  double onward = 0.0; ///< leaves the station along the train, before `bulk`
  double bulk = 0.0;   ///< absorbed in the gap that follows

  bool hit = false;    ///< it met the surface: the rest is known
  bool inside = false; ///< within the clear area
  Vector point = Vector::Zero(),
         local_point = Vector::Zero(); ///< on the bench, and in the surface's own axes from its vertex, in mm
  double optical_path = 0.0;           ///< from the launch point to here, in mm
  double cos_incidence = 0.0, incidence_deg = 0.0;
  double pass_s = 0.0, pass_p = 0.0; ///< |a|² of the intended action, 0 at total reflection
  Vector direction = Vector::Zero(); ///< behind the station
  /// Takes the launched electric field (in bench coordinates) to the one behind the station; powers lost to
  /// scatter, `loss` and bulk are not in it. Yun, Crabtree & Chipman, Appl. Opt. 50, 2855 (2011).
  PolarizationMatrix P = PolarizationMatrix::Zero();
};

struct RayRecord {
  std::vector<Step> steps;
  double delivered = 0.0; ///< onward at the detector
  /// Rounding alone decides about this ray at one of its stations, or moves its result by more than the
  /// agreement asked for.
  bool doubtful = false;
  bool steep = false; ///< it met an asphere where that is steep (Meeting)

  [[nodiscard]] bool comparable() const { return !doubtful && !steep; }
};

/// A meeting of light with a surface, wherever it comes from: at which of its sides, and what it does there.
struct Encounter {
  assembly::SurfaceId surface;
  Frame frame; ///< of the surface, on the bench
  assembly::Side from;
  assembly::Act act;
};

/// Follows a ray of unit power from meeting to meeting, in the light's state of polarization.
[[nodiscard]] RayRecord follow(const std::vector<Encounter>& path, const assembly::Assembly& assembly,
                               double wavelength_nm, const Ray& ray);

/// Follows a ray of unit power along the train, in the light's state of polarization.
[[nodiscard]] RayRecord trace(const Bench& bench, const assembly::Assembly& assembly, double wavelength_nm,
                              const Ray& ray);

} // namespace lightledger::reference
