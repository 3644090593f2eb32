#pragma once

#include <lightledger/assembly/assembly.hpp>
#include <lightledger/assembly/diagnostics.hpp>
#include <lightledger/trace/progress.hpp>

#include <array>
#include <cstdint>
#include <optional>
#include <string>
#include <vector>

namespace lightledger::analysis {

/// What a ghost is on the detector: moments over the rays inside the clear area, in the detector's own axes,
/// mm. None where it brings nothing.
struct GhostSpot {
  std::array<double, 2> centroid_mm;
  double rms_radius_mm; ///< about the centroid
};

/// A ghost's share of the light of one field.
struct GhostField {
  std::optional<std::string> name;
  std::array<double, 2> at;             ///< degrees at infinity, mm at a finite object
  double power;                         ///< of what was launched from this field
  std::optional<double> relative_power; ///< over the largest share that any field delivers
  std::optional<GhostSpot> spot;
};

/// A bounce of a ghost, and what would cure it.
struct GhostBounce {
  double reflectance;                       ///< mean over the rays of this path, by arriving power
  std::optional<double> needed_reflectance; ///< that alone brings the ghosts under their limit; none where
                                            ///< there is no limit, it is kept, or this alone cannot do it
};

/// Light that reaches the detector by one path with bounces (contract §5, ghosts).
struct Ghost {
  std::vector<std::string> bounces;  ///< in the order of bouncing
  std::vector<std::size_t> stations; ///< their numbers in the train, from 1
  double power;                      ///< of launched power, before the detector's reflectance
  std::optional<double> uncertainty;
  std::optional<double> relative_power; ///< over delivered
  GhostSpot spot;
  std::optional<double> path_excess_mm; ///< over rays that arrive as intended too
  std::optional<double> peak_ratio;     ///< none without pixels, or where it was not asked for
  std::array<double, 4> stokes;         ///< in the detector's basis, S0 = power
  double dop;
  std::optional<double> fringe_modulation;
  std::optional<double> defocus_mm; ///< paraxial, from the detector to the ghost's image along the axis
  std::vector<GhostField> by_field;
  std::vector<GhostBounce> cure; ///< per bounce; empty below the paths that are looked at closely
};

/// The surface whose bounces take part in the largest share of the ghosts.
struct GhostCulprit {
  std::string name;
  double power;                             ///< of all paths that bounce there
  std::optional<double> reflectance;        ///< there, on the brightest of these paths
  std::optional<double> needed_reflectance; ///< as for a bounce, all its paths helped at once
};

/// Light on the detector, per launched power and area, over a rectangle of its own x, y.
struct DetectorMap {
  double x_from, x_to, y_from, y_to; ///< mm
  std::size_t columns, rows;
  std::vector<double> per_mm2; ///< row by row, the row of least y first
};

/// Light that leaves through the first station by one path.
struct ReturnedPath {
  std::vector<std::string> bounces;
  double power; ///< of launched power
};

/// A place in a medium or on a surface where light draws together and a pulse may damage it.
struct HotFocus {
  std::vector<std::string> bounces; ///< so far; none for the intended beam
  std::optional<std::string> field;
  std::string from, to;              ///< the stations before and after
  std::optional<std::string> medium; ///< that it lies in; none on a surface
  std::optional<std::string> on;     ///< the station whose surface it lies on; none in a medium
  double distance_mm;                ///< from the station before
  double power;                      ///< of what was launched from the field
  double radius_mm;                  ///< √2 · rms, never below λ/(π NA)
  double irradiance_ratio;           ///< to that of the launched beam
};

/// The whole tree, delivered light included; adds up to 1.
struct GhostLedger {
  double detector = 0.0; ///< (1 − reflectance)(delivered + total)
  double returned = 0.0;
  double leaked = 0.0;
  double absorbed = 0.0;
  double clipped = 0.0;
  double missed = 0.0;
  double scattered = 0.0;
  double extra = 0.0;
  double bulk = 0.0;
  double not_followed = 0.0;
};

struct Ghosts {
  int bounces = 2;                    ///< followed at most
  std::uint64_t paths_considered = 0; ///< of 1 to `bounces` bounces that end at the detector
  std::uint64_t paths_traced = 0;     ///< of these, with no light cut off
  double delivered = 0.0;             ///< by the intended path
  double total = 0.0;                 ///< by all paths with bounces
  std::optional<double> uncertainty;  ///< standard error of `total`; none for patterns that give none
  double returned = 0.0;
  std::optional<double> returned_uncertainty;
  double reflectance = 0.0;  ///< of the detector
  double not_followed = 0.0; ///< bounds what any path not traced could bring
  GhostLedger ledger;
  double closure_error = 0.0;
  std::uint64_t rays = 0;
  std::vector<Ghost> paths;                 ///< brightest first, ties in the order of the train
  std::uint64_t unlisted_paths = 0;         ///< that bring light and are not in the list
  double unlisted = 0.0;                    ///< their power
  std::vector<ReturnedPath> returned_paths; ///< brightest first
  /// Where they are asked for: of the image, and of each ghost that was looked at closely.
  std::optional<DetectorMap> image_map;
  std::vector<DetectorMap> maps;
  std::vector<HotFocus> foci;  ///< brightest first
  std::optional<double> limit; ///< the file's smallest at_most of `ghosts.total`
  std::optional<GhostCulprit> culprit;
};

struct GhostOptions {
  int bounces = 2;
  double floor = 1e-12;               ///< beams that may bring less of the launched power are not followed
  std::optional<std::uint64_t> top{}; ///< how many paths to list; none: all, within reason
  std::optional<std::string> field{}; ///< the light of this field alone: its name, or its number from 1
  bool maps = false;                  ///< make the maps of light on the detector
  int threads = 0;                    ///< 0: as many as the machine has
  trace::Progress* progress = nullptr;
};

struct GhostsResult {
  std::optional<Ghosts> ghosts; ///< none where there are faults
  std::vector<std::string> warnings;
  assembly::Faults faults;
};

/// Follows all light of an assembly that bounces, with the sampling it asks for.
[[nodiscard]] GhostsResult ghosts(const assembly::Assembly& assembly, const GhostOptions& options = {});

} // namespace lightledger::analysis
