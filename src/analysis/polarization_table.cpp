#include "polarization_table.hpp"

#include "detector_figures.hpp"
#include "polarization_survey.hpp"

#include <algorithm>
#include <cmath>
#include <numbers>

namespace lightledger::analysis {
namespace {

using assembly::Assembly;
using assembly::Field;

constexpr int steps = 40;
constexpr std::uint64_t rays_per_row = 1024;
constexpr double around = 0.05;       ///< of the only wavelength, to both sides
constexpr double outermost_deg = 1.0; ///< where all light is on the axis

bool covers(const assembly::Coating& coating, double nm) {
  const auto* measured = std::get_if<assembly::Measured>(&coating.kind);
  if (measured == nullptr)
    return true;
  return nm >= measured->wavelengths_nm.front() && nm <= measured->wavelengths_nm.back();
}

/// Whether all that the assembly is made of is known there.
bool known_at(const Assembly& assembly, double nm) {
  return std::ranges::all_of(assembly.media,
                             [&](const auto& medium) { return optics::index_at(medium, nm).has_value(); }) &&
         std::ranges::all_of(assembly.coatings, [&](const auto& coating) { return covers(coating, nm); });
}

std::vector<double> spaced(double from, double to) {
  std::vector<double> places;
  for (int i = 0; i <= steps; ++i)
    places.push_back(from + (to - from) * i / steps);
  return places;
}

PolarizationRow row_of(const Assembly& assembly, double at, int threads) {
  PolarizationRow row{};
  row.at = at;
  assembly::Faults faults;
  const auto train = trace::prepare(assembly, faults);
  if (!train)
    return row;
  const PolarizationSurvey survey(*train, {});
  trace::Sampling<PolarizationSurvey> sampling(*train, survey, {.rays_per_chunk = rays_per_row});
  trace::with_threads(threads, [&] { sampling.run(); });
  // Only S2's and S3's signs know of the parity.
  const auto bounces = std::ranges::count(train->path.steps, trace::Act::bounce, &trace::Path::Step::act);
  const DetectorFigures found =
      sum_figures(sampling.samples(), assembly.light.polarization, bounces % 2 == 0 ? 1.0 : -1.0).detector;
  row.dop = found.dop;
  row.azimuth_deg = found.azimuth_deg;
  row.ellipticity_deg = found.ellipticity_deg;
  row.diattenuation = found.diattenuation;
  row.retardance_deg = found.retardance_deg;
  row.delivered = found.stokes[0];
  return row;
}

PolarizationTable against_wavelength(Assembly assembly, int threads) {
  const auto [least, most] = std::ranges::minmax(assembly.light.wavelengths, {}, &assembly::Wavelength::nm);
  const bool single = least.nm == most.nm;
  PolarizationTable table{Against::wavelength, {}};
  for (const double nm :
       spaced(least.nm * (single ? 1.0 - around : 1.0), most.nm * (single ? 1.0 + around : 1.0))) {
    if (!known_at(assembly, nm))
      continue;
    assembly.light.wavelengths = {{nm, 1.0}};
    table.rows.push_back(row_of(assembly, nm, threads));
  }
  return table;
}

/// The outermost field; where all are on the axis, one upward.
std::array<double, 2> outermost(const assembly::Light& light) {
  const auto size = [](const Field& field) { return std::hypot(field.at[0], field.at[1]); };
  const Field& widest = *std::ranges::max_element(light.fields, {}, size);
  if (size(widest) > 0.0)
    return widest.at;
  const double slope = std::tan(outermost_deg * std::numbers::pi / 180.0);
  return {0.0, light.object_distance ? slope * std::abs(*light.object_distance) : outermost_deg};
}

PolarizationTable against_angle(Assembly assembly, int threads) {
  const std::array<double, 2> edge = outermost(assembly.light);
  PolarizationTable table{Against::angle, {}};
  for (const double share : spaced(0.0, 1.0)) {
    assembly.light.fields = {{{share * edge[0], share * edge[1]}, 1.0, {}}};
    table.rows.push_back(row_of(assembly, share * std::hypot(edge[0], edge[1]), threads));
  }
  return table;
}

} // namespace

PolarizationTable polarization_table(const Assembly& assembly, Against against, int threads) {
  Assembly sparse = assembly;
  sparse.light.sampling = assembly::Scattered{rays_per_row};
  if (against == Against::wavelength)
    return against_wavelength(std::move(sparse), threads);
  if (against == Against::angle)
    return against_angle(std::move(sparse), threads);
  return {};
}

} // namespace lightledger::analysis
