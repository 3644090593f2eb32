#pragma once

#include <lightledger/assembly/assembly.hpp>
#include <lightledger/assembly/diagnostics.hpp>

#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace lightledger::analysis {

/// The name under which the boundary without any coating is asked for.
inline constexpr std::string_view bare = "bare";

/// What is asked of one coating.
struct CoatingRequest {
  std::string name;                       ///< a coating of the file, or `bare`
  std::string incident = "air";           ///< the medium that light comes from
  std::optional<std::string> substrate{}; ///< none: that of the first station that uses the coating
  std::vector<double> wavelengths_nm{};   ///< empty: those of the assembly's light
  std::vector<double> angles_deg{0.0};    ///< in the medium of incidence, 0 to 90
};

/// What the coating does to one polarization: fractions of power, phases in degrees in (−180, 180].
struct CoatingComponent {
  double reflectance, transmittance, absorptance;
  std::optional<double> phase_r_deg; ///< none where nothing is reflected
  std::optional<double> phase_t_deg; ///< none where nothing is transmitted, and into an opaque substrate
};

struct CoatingRow {
  double wavelength_nm, angle_deg;
  CoatingComponent s, p;
};

struct CoatingCurve {
  std::string name, incident, substrate;
  std::vector<CoatingRow> rows; ///< angles within wavelengths
};

struct CoatingCurveResult {
  std::optional<CoatingCurve> curve; ///< none where there are faults
  assembly::Faults faults;           ///< of the request; only those of layers have a place in the file
};

/// What a coating does against wavelength and angle (contract §5, coating). Light meets the last-listed layer
/// first; the medium of incidence counts with its real index, the substrate with its complex one where it is
/// opaque, and what enters that is its transmittance. Names that do not exist, wavelengths at which a medium
/// is not known, an opaque medium of incidence and a missing substrate are faults.
[[nodiscard]] CoatingCurveResult coating_curve(const assembly::Assembly& assembly,
                                               const CoatingRequest& request);

} // namespace lightledger::analysis
