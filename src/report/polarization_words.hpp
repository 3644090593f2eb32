#pragma once

#include <lightledger/analysis/polarization.hpp>
#include <lightledger/assembly/assembly.hpp>

#include <array>
#include <string>
#include <vector>

namespace lightledger::report {

/// A figure that stations are blamed for.
struct Blame {
  const char* name;    ///< in JSON and CSV
  const char* heading; ///< in a table
  const char* words;   ///< in a sentence
  std::optional<double> analysis::AttributionFigures::*figure;
  bool angle;
};

inline constexpr std::array<Blame, 4> blames{
    {{"diattenuation", "diattenuation", "diattenuation", &analysis::AttributionFigures::diattenuation, false},
     {"retardance_deg", "retard. deg", "retardance", &analysis::AttributionFigures::retardance_deg, true},
     {"dop_loss", "DoP loss", "depolarization", &analysis::AttributionFigures::dop_loss, false},
     {"cross_leakage", "cross leak.", "cross leakage", &analysis::AttributionFigures::cross_leakage, false}}};

/// `at 532 nm, field axis`.
[[nodiscard]] std::string place_of(const analysis::ChiefRay& chief);

/// Which way the detector's axes point, and whose right is meant.
[[nodiscard]] std::string axes_sentence(const analysis::Polarization& polarization);

/// Who is to blame, what cancels, and what can be done: a sentence each.
[[nodiscard]] std::vector<std::string> blame_sentences(const assembly::Assembly& assembly,
                                                       const analysis::Polarization& polarization);
[[nodiscard]] std::vector<std::string> remedy_sentences(const assembly::Assembly& assembly,
                                                        const analysis::Polarization& polarization);

/// A figure of either sign: `+0.0123`, `-4.10`; a dash for nothing, and where there is none.
[[nodiscard]] std::string signed_figure(std::optional<double> value, bool angle);
/// An angle in degrees with two decimals; a dash where there is none.
[[nodiscard]] std::string angle(std::optional<double> degrees);
/// An azimuth, in (−90, 90] also as it is printed.
[[nodiscard]] std::string azimuth(std::optional<double> degrees);
/// A figure from 0 to 1 with four decimals; a dash for nothing, and where there is none.
[[nodiscard]] std::string share(std::optional<double> value);

} // namespace lightledger::report
