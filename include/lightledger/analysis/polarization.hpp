#pragma once

#include <lightledger/assembly/assembly.hpp>
#include <lightledger/assembly/diagnostics.hpp>
#include <lightledger/optics/mueller.hpp>
#include <lightledger/trace/progress.hpp>

#include <array>
#include <cstdint>
#include <optional>
#include <string>
#include <vector>

/// What the train does to the state of polarization (contract §5, polarization). Figures that do not exist
/// are none.
namespace lightledger::analysis {

/// The state behind a station, and what that station alone does to the chief ray.
struct ChiefStation {
  std::string name;
  optics::Stokes stokes; ///< per launched power, in the double-pole basis about the axis that leaves
  std::optional<double> dop, azimuth_deg, ellipticity_deg;
  std::optional<double> diattenuation, retardance_deg;
};

struct ChiefRay {
  double wavelength_nm;
  std::optional<std::string> field;
  std::array<double, 2> at; ///< the field's place: degrees at infinity, mm at a finite object
  optics::Jones jones;      ///< entrance basis to detector basis; its common phase is arbitrary
  optics::Mueller mueller;
  std::optional<double> diattenuation;
  std::optional<double> retardance_deg;
  double rotation_deg; ///< azimuth, in the detector's basis, of the entrance's x carried geometrically
  std::vector<ChiefStation> stations;
};

/// Of all the light at the detector.
struct DetectorFigures {
  optics::Stokes stokes{};
  optics::Mueller mueller{};
  std::optional<double> dop, azimuth_deg, ellipticity_deg;
  std::optional<double> depolarization_index;
  std::optional<double> diattenuation, polarizance;
  std::optional<double> retardance_deg;
  std::optional<double> depolarization; ///< 1 − |tr m_Δ|/3 of Lu & Chipman, geometric transport divided out
  std::optional<double> linear_extinction, extinction; ///< none also where it knows no bounds
  std::optional<double> cross_leakage;
  std::optional<double> coherent_share; ///< |Σ w tr(Q†J)/2|²/(Σ w · Σ w tr(JJ†)/2)
  std::optional<double> rotation_deg;   ///< mean over the light, weighted by power
};

/// The train's figure minus its figure with some stations neutral; of the degree of polarization the other
/// way round.
struct AttributionFigures {
  std::optional<double> diattenuation, retardance_deg, dop_loss, cross_leakage;
};

struct Attribution {
  std::string name;
  std::vector<std::size_t> stations;
  AttributionFigures value;
  AttributionFigures error; ///< standard errors; none for patterns that give none
};

/// Two stations of which one takes back on the chief ray what the other does: neutral alone, either would
/// leave the other's retardance.
struct CancellingPair {
  std::size_t first, second;
  double first_deg, second_deg; ///< what each retards alone
  double together_deg;          ///< what both do, seen through all that stands between them
};

/// The turn of a fold, and of all behind it, about the axis that arrives at it, with which mirrors and lenses
/// retard the chief ray least; plates, polarizers and rotators, which are meant to act, are left out.
struct FoldTurn {
  std::size_t station;
  double turn_deg;                      ///< in (−90, 90]
  std::array<double, 3> tilt_deg;       ///< the fold's `tilt` when so turned
  std::array<double, 3> turn_after_deg; ///< the `turn` after it with which all behind it turns along
  double retardance_deg, retardance_now_deg;
};

/// The settings of the train's one or two wave plates that give the chief ray the launched state again.
struct PlateSettings {
  struct Plate {
    std::size_t station;
    double axis_deg, axis_now_deg;
  };
  std::vector<Plate> plates;
  double cross_leakage, cross_leakage_now;
};

/// One row of a table against the wavelength or the angle.
struct PolarizationRow {
  double at; ///< nm, degrees, or mm at a finite object
  std::optional<double> dop, azimuth_deg, ellipticity_deg, diattenuation, retardance_deg, delivered;
};

enum class Against { nothing, wavelength, angle };

struct PolarizationTable {
  Against against = Against::nothing;
  std::vector<PolarizationRow> rows;
};

/// What happens to the rays of one field, at points of the launch plane. Grids are row-major, first row at
/// y_from; none where no ray arrives.
struct PupilMap {
  std::size_t field;
  double wavelength_nm;
  double x_from, x_to, y_from, y_to; ///< outer edges of the cells, mm
  std::size_t columns, rows;
  struct Point {
    double transmittance, diattenuation, diattenuation_axis_deg;
    std::optional<double> retardance_deg, retardance_axis_deg, cross_leakage;
  };
  std::vector<std::optional<Point>> points;
};

struct Polarization {
  std::optional<ChiefRay> chief;
  DetectorFigures detector;
  DetectorFigures error;             ///< standard errors; zero or none for patterns that give none
  std::optional<double> uncertainty; ///< the largest of the detector's Mueller elements, relative to M00
  std::uint64_t rays = 0;
  std::vector<Attribution> attribution, by_element, by_coating;
  std::vector<CancellingPair> cancelling;
  std::optional<FoldTurn> fold_turn;
  std::optional<PlateSettings> plates;
  std::array<std::array<double, 3>, 2> detector_axes; ///< its x and y in bench coordinates
  PolarizationTable table;
  std::vector<PupilMap> maps;
};

struct PolarizationOptions {
  Against against = Against::nothing;
  bool maps = false;
  int threads = 0; ///< 0: as many as the machine has
  trace::Progress* progress = nullptr;
};

struct PolarizationResult {
  std::optional<Polarization> polarization; ///< none where there are faults
  std::vector<std::string> warnings;
  assembly::Faults faults;
};

/// Follows the chief ray and the light's own sample of rays.
[[nodiscard]] PolarizationResult polarization(const assembly::Assembly& assembly,
                                              const PolarizationOptions& options = {});

} // namespace lightledger::analysis
