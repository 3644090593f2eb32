#include <lightledger/analysis/occurring_coatings.hpp>
#include <lightledger/trace/bench.hpp>

#include <algorithm>
#include <cmath>
#include <numbers>
#include <optional>

namespace lightledger::analysis {
namespace {

using assembly::Assembly;
using assembly::MediumId;
using assembly::Side;
using optics::Range;

/// The same number of rows for few coatings and many.
constexpr std::size_t most_wavelengths = 240;
constexpr std::size_t steps_of_one = 60;
constexpr std::size_t least_steps = 12;
constexpr double degrees = 180.0 / std::numbers::pi;
/// Angles nearer to each other than this, in degrees, are drawn as one.
constexpr double distinct = 0.05;
constexpr double most_angle = 89.0;

/// A coating in its place, and the angles outside it.
struct Use {
  assembly::CoatingId coating;
  MediumId incident, substrate;
  std::vector<std::size_t> stations;
  double least, sum, greatest;
};

/// From the medium the light arrives in to that outside the coating (Snell).
double outside_angle(const Assembly& assembly, MediumId arriving, MediumId outside, double angle_deg) {
  if (arriving == outside)
    return std::min(angle_deg, most_angle);
  const double nm = assembly.light.wavelengths.front().nm;
  const auto here = optics::index_at(assembly.media[arriving], nm);
  const auto there = optics::index_at(assembly.media[outside], nm);
  if (!here || !there)
    return std::min(angle_deg, most_angle);
  const double sine = here->n / there->n * std::sin(angle_deg / degrees);
  return sine >= 1.0 ? most_angle : std::min(std::asin(sine) * degrees, most_angle);
}

std::optional<Use> use_of(const Assembly& assembly, std::size_t station, Side from,
                          const StationBudget::Incidence& incidence) {
  const assembly::Surface& surface = assembly.surfaces[assembly.stations[station].surface];
  if (!surface.coating)
    return std::nullopt;
  const MediumId beyond = surface.beyond.value_or(surface.before);
  const bool stands_beyond = surface.coating->substrate == Side::beyond;
  const MediumId substrate = stands_beyond ? beyond : surface.before;
  const MediumId outside = stands_beyond ? surface.before : beyond;
  const MediumId arriving = from == Side::before ? surface.before : beyond;
  const auto angle = [&](double deg) { return outside_angle(assembly, arriving, outside, deg); };
  return Use{surface.coating->coating,
             outside,
             substrate,
             {station},
             angle(incidence.min_deg),
             angle(incidence.mean_deg),
             angle(incidence.max_deg)};
}

void merge(std::vector<Use>& uses, const Use& use) {
  const auto same = [&](const Use& other) {
    return other.coating == use.coating && other.incident == use.incident && other.substrate == use.substrate;
  };
  const auto found = std::ranges::find_if(uses, same);
  if (found == uses.end()) {
    uses.push_back(use);
    return;
  }
  found->stations.insert(found->stations.end(), use.stations.begin(), use.stations.end());
  found->least = std::min(found->least, use.least);
  found->sum += use.sum;
  found->greatest = std::max(found->greatest, use.greatest);
}

std::vector<Use> uses(const Assembly& assembly, const Budget& budget) {
  assembly::Faults faults;
  const auto bench = trace::lay_out(assembly, faults);
  std::vector<Use> found;
  for (std::size_t i = 0; bench && i < budget.stations.size(); ++i)
    if (budget.stations[i].incidence)
      if (const auto use = use_of(assembly, i, bench->from[i], *budget.stations[i].incidence))
        merge(found, *use);
  return found;
}

std::vector<double> angles(const Use& use) {
  const auto rounded = [](double deg) { return std::round(deg * 100.0) / 100.0; };
  const double mean = use.sum / static_cast<double>(use.stations.size());
  if (use.greatest - use.least < distinct)
    return {rounded(mean)};
  std::vector<double> list{rounded(use.least), rounded(mean), rounded(use.greatest)};
  list.erase(std::unique(list.begin(), list.end()), list.end());
  return list;
}

/// Wavelengths at which coating and media are known.
Range known(const Assembly& assembly, const Use& use) {
  Range range = assembly.media[use.incident].range.overlap(assembly.media[use.substrate].range);
  const assembly::Coating& coating = assembly.coatings[use.coating];
  if (const auto* layers = std::get_if<assembly::Layers>(&coating.kind))
    for (const assembly::Film& film : layers->films)
      range = range.overlap(assembly.media[film.medium].range);
  if (const auto* measured = std::get_if<assembly::Measured>(&coating.kind))
    range = range.overlap({measured->wavelengths_nm.front(), measured->wavelengths_nm.back()});
  return range;
}

std::vector<double> wavelengths(const Assembly& assembly, const Use& use, std::size_t steps) {
  const auto [first, last] = std::ranges::minmax(assembly.light.wavelengths, {}, &assembly::Wavelength::nm);
  const double beyond = std::max(0.12 * first.nm, 0.5 * (last.nm - first.nm));
  const Range wanted = Range{first.nm - beyond, last.nm + beyond}.overlap(known(assembly, use));
  const double from = std::ceil(wanted.from_nm);
  const double to = std::floor(wanted.to_nm);
  std::vector<double> list;
  for (std::size_t i = 0; from < to && i <= steps; ++i)
    list.push_back(from + (to - from) * static_cast<double>(i) / static_cast<double>(steps));
  return list;
}

} // namespace

std::vector<OccurringCoating> occurring_coatings(const Assembly& assembly, const Budget& budget) {
  std::vector<OccurringCoating> coatings;
  const std::vector<Use> all = uses(assembly, budget);
  const std::size_t steps =
      std::clamp(most_wavelengths / std::max<std::size_t>(all.size(), 1), least_steps, steps_of_one);
  for (const Use& use : all) {
    CoatingRequest request{.name = assembly.coatings[use.coating].name};
    request.incident = assembly.media[use.incident].name;
    request.substrate = assembly.media[use.substrate].name;
    request.angles_deg = angles(use);
    request.wavelengths_nm = wavelengths(assembly, use, steps);
    CoatingCurveResult result = coating_curve(assembly, request);
    if (!result.curve) {
      request.wavelengths_nm.clear();
      result = coating_curve(assembly, request);
    }
    if (result.curve)
      coatings.push_back({use.stations, std::move(*result.curve)});
  }
  return coatings;
}

} // namespace lightledger::analysis
