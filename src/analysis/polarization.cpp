#include "chief_ray.hpp"
#include "detector_figures.hpp"
#include "neutral_sets.hpp"
#include "polarization_advice.hpp"
#include "polarization_survey.hpp"
#include "polarization_table.hpp"

#include <lightledger/analysis/polarization.hpp>
#include <lightledger/assembly/document.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <span>
#include <utility>

namespace lightledger::analysis {
namespace {

using assembly::Assembly;
using trace::Train;
using Sampling = trace::Sampling<PolarizationSurvey>;

/// Chunks below this size cost more than they spread.
constexpr std::uint64_t rays_per_chunk = 64;

std::vector<NeutralSet> all_sets(const Assembly& assembly) {
  std::vector<NeutralSet> sets = station_sets(assembly);
  for (const auto& more : {element_sets(assembly), coating_sets(assembly)})
    sets.insert(sets.end(), more.begin(), more.end());
  return sets;
}

double parity(const Train& train) {
  const auto bounces = std::ranges::count(train.path.steps, trace::Act::bounce, &trace::Path::Step::act);
  return bounces % 2 == 0 ? 1.0 : -1.0;
}

/// Cuts a list of attributions, in the order of all_sets, into its three parts.
void attribute(const Assembly& assembly, const std::vector<NeutralSet>& sets, const SumFigures& figures,
               const SumFigures& errors, Polarization& result) {
  std::vector<Attribution> all;
  for (std::size_t i = 0; i < sets.size(); ++i)
    all.push_back({sets[i].name, sets[i].stations, figures.attribution[i], errors.attribution[i]});
  const auto stations = static_cast<std::ptrdiff_t>(station_sets(assembly).size());
  const auto elements = static_cast<std::ptrdiff_t>(element_sets(assembly).size());
  result.attribution.assign(all.begin(), all.begin() + stations);
  result.by_element.assign(all.begin() + stations, all.begin() + stations + elements);
  result.by_coating.assign(all.begin() + stations + elements, all.end());
}

bool launches_light(const Sampling& sampling) {
  return std::ranges::all_of(sampling.samples(), [](const auto& sample) { return sample.launched() > 0.0; });
}

void describe_axes(const Train& train, Polarization& result) {
  const Eigen::Matrix3d& axes = train.bench.arriving.back().axes;
  for (int axis = 0; axis < 2; ++axis)
    result.detector_axes[static_cast<std::size_t>(axis)] = {axes(0, axis), axes(1, axis), axes(2, axis)};
}

void follow_chief(const Train& train, Polarization& result) {
  const auto walk = walk_chief(train);
  if (!walk)
    return;
  result.chief = describe_chief(train, *walk);
  result.cancelling = cancelling_pairs(*walk);
  result.fold_turn = fold_turn(train, *walk);
  result.plates = plate_settings(train, *walk);
}

} // namespace

PolarizationResult polarization(const Assembly& assembly, const PolarizationOptions& options) {
  PolarizationResult result;
  const auto train = trace::prepare(assembly, result.faults);
  if (!train)
    return result;
  const PolarizationSurvey survey(*train, all_sets(assembly));
  Sampling sampling(*train, survey, {.rays_per_chunk = rays_per_chunk, .progress = options.progress});
  bool accurate = true;
  trace::with_threads(options.threads, [&] { accurate = sampling.run(); });
  if (!launches_light(sampling)) {
    const assembly::Mark mark =
        assembly.document ? assembly.document->locate("light.rays") : assembly::Mark{};
    result.faults.add({mark, "the pattern of rays puts no light on the beam", "a finer pattern", ""});
    return result;
  }
  Polarization found;
  const optics::State launched = assembly.light.polarization;
  const SumFigures figures = sum_figures(sampling.samples(), launched, parity(*train));
  SumFigures errors;
  errors.attribution.resize(survey.sets().size());
  if (sampling.scattered()) {
    errors = sum_errors(sampling.samples(), launched, parity(*train));
    found.uncertainty = mueller_error(sampling.samples());
  }
  found.detector = figures.detector;
  found.error = errors.detector;
  found.rays = sampling.rays();
  attribute(assembly, survey.sets(), figures, errors, found);
  describe_axes(*train, found);
  follow_chief(*train, found);
  found.table = polarization_table(assembly, options.against, options.threads);
  if (options.maps)
    found.maps = pupil_maps(*train);
  if (!accurate)
    result.warnings.push_back(fmt::format(
        "the accuracy asked for was not reached: the standard error of the Mueller elements is {:.2g} of M00 "
        "with the most rays that are traced unasked; --rays traces more",
        found.uncertainty.value_or(0.0)));
  result.polarization = std::move(found);
  return result;
}

} // namespace lightledger::analysis
