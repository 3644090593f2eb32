#pragma once

#include <lightledger/assembly/assembly.hpp>
#include <lightledger/trace/rays.hpp>

#include <cstdint>
#include <variant>
#include <vector>

namespace lightledger::trace {

struct Launching;

/// Independent shifts of a scattered set, from whose spread the standard error follows.
inline constexpr int replicates = 16;

/// A point of the disc of launch relative to its radius, and its weight.
struct PupilPoint {
  double x, y, weight;
};

/// Points on the disc of launch by number. A scattered set is a Kronecker lattice in integers modulo 2⁶⁴ with
/// the generalised golden ratio (Roberts 2018), shifted per replicate; rings are Gauss–Legendre nodes in r²
/// (Forbes, J. Opt. Soc. Am. A 5, 1943 (1988)); a grid takes the cells whose centres lie on the disc.
class Pupil {
public:
  /// `shifts` numbers independent sets of shifts; results are those of 0.
  explicit Pupil(const assembly::Light& light, std::uint64_t shifts = 0);

  /// Points a replicate holds in a pattern of fixed size; for scattered sets a sixteenth of the count,
  /// rounded up.
  [[nodiscard]] std::uint64_t size() const { return m_size; }
  [[nodiscard]] bool scattered() const { return m_scattered; }
  /// The point of a number below size() of a replicate; weight 0 where a grid's cell is off the disc.
  [[nodiscard]] PupilPoint point(std::uint64_t number, int replicate) const;
  /// Hands a block of a scattered set to the kernel, from the number `first` on.
  void scatter(Launching& from, std::uint64_t first, int replicate) const;

private:
  struct RingNode {
    double r_squared, weight;
  };
  [[nodiscard]] PupilPoint on_disc(double fraction_of_area, double azimuth_turns, double weight) const;

  assembly::Sampling m_sampling;
  std::uint64_t m_first_shift;
  bool m_scattered;
  std::uint64_t m_size;
  double m_inner_squared;  ///< of the hole, relative to the radius
  double m_gaussian_decay; ///< 2 radius²/w², 0 for even irradiance
  std::vector<RingNode> m_rings;
};

/// Where rays of one field come from: a direction at infinity, or an object point before or behind the launch
/// plane, in the first station's arriving frame.
class Source {
public:
  Source(const assembly::Light& light, const assembly::Field& field);

  /// Gives the ray of a lane, whose point is set, its direction, double-pole basis and unit Jones matrix.
  void aim(RayBlock& block, int lane) const;
  /// The same for the kernel.
  void describe(Launching& from) const;

private:
  bool m_infinite;
  bool m_converging;
  std::array<double, 3> m_object; ///< direction at infinity, else the object point
};

/// The part of the launch plane that a field's rays cross: centre + x · first + y · second for (x, y) on the
/// unit disc, in mm.
struct Footprint {
  std::array<double, 2> centre, first, second;
};

/// Fills blocks with the rays of one field, in the first station's arriving frame, at the launch plane z = 0.
class Launcher {
public:
  Launcher(const Source& source, const Pupil& pupil, const Footprint& footprint)
      : m_source(source), m_pupil(pupil), m_footprint(footprint) {}

  /// Rays `first` … of a replicate, as many as fit below `end`; returns the number of the next ray.
  std::uint64_t fill(RayBlock& block, int replicate, std::uint64_t first, std::uint64_t end) const;

private:
  std::uint64_t scatter(RayBlock& block, int replicate, std::uint64_t first, std::uint64_t end) const;

  Source m_source;
  const Pupil& m_pupil;
  Footprint m_footprint;
};

} // namespace lightledger::trace
