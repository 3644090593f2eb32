#include <lightledger/analysis/remedy.hpp>

#include <algorithm>
#include <optional>
#include <span>
#include <variant>

namespace lightledger::analysis {
namespace {

using assembly::Act;
using assembly::Assembly;

constexpr std::size_t most_remedies = 2;
constexpr double least_loss = 1e-3;
constexpr double good_mirror = 0.99;
constexpr double good_face = 0.002;
/// Enough for the ratio of two traces by the same rays.
constexpr std::uint64_t enough_rays = 4096;

bool met_once(const Assembly& assembly, std::size_t station) {
  return std::ranges::count(assembly.stations, assembly.stations[station].surface,
                            &assembly::Station::surface) == 1;
}

/// Whether a face may have a coating that is there for more than letting light pass, such as a filter's. Of
/// curves and of powers given as such nobody knows what they stand for.
bool may_filter(const Assembly& assembly, const assembly::Surface& surface) {
  constexpr std::size_t most_films_of_a_clear_coating = 6;
  if (!surface.coating)
    return false;
  const auto& kind = assembly.coatings[surface.coating->coating].kind;
  const auto* const layers = std::get_if<assembly::Layers>(&kind);
  return layers == nullptr || layers->films.size() > most_films_of_a_clear_coating;
}

/// What a coating could bring back. A mirror that lets light through is meant to.
double curable(const Assembly& assembly, const Budget& budget, std::size_t station) {
  const StationBudget& row = budget.stations[station];
  const auto& surface = assembly.surfaces[assembly.stations[station].surface];
  if (!std::holds_alternative<assembly::Interface>(surface.effect) || !met_once(assembly, station))
    return 0.0;
  if (assembly.stations[station].intended == Act::bounce)
    return row.absorbed >= row.aside ? row.absorbed : 0.0;
  return may_filter(assembly, surface) ? 0.0 : row.absorbed + row.aside;
}

/// The stations that lose most to what a coating could cure, most of all first.
std::vector<std::size_t> candidates(const Assembly& assembly, const Budget& budget) {
  std::vector<std::size_t> stations;
  for (std::size_t i = 0; i < budget.stations.size(); ++i)
    if (curable(assembly, budget, i) >= least_loss)
      stations.push_back(i);
  std::ranges::stable_sort(stations, std::ranges::greater{},
                           [&](std::size_t i) { return curable(assembly, budget, i); });
  return stations;
}

Assembly with_few_rays(Assembly assembly) {
  const auto* const scattered = std::get_if<assembly::Scattered>(&assembly.light.sampling);
  const bool many = scattered != nullptr && scattered->count > enough_rays;
  if (many || std::holds_alternative<assembly::ToAccuracy>(assembly.light.sampling))
    assembly.light.sampling = assembly::Scattered{enough_rays};
  return assembly;
}

/// A coating that reflects all or nothing, and absorbs nothing.
Assembly with_perfect_coating(Assembly assembly, std::size_t station) {
  const assembly::Station& visit = assembly.stations[station];
  const assembly::Ideal::Powers powers =
      visit.intended == Act::bounce ? assembly::Ideal::Powers{1.0, 0.0} : assembly::Ideal::Powers{0.0, 1.0};
  const auto id = static_cast<assembly::CoatingId>(assembly.coatings.size());
  assembly.coatings.push_back({"perfect", assembly::Ideal{powers, powers}});
  assembly.surfaces[visit.surface].coating = assembly::CoatingUse{id};
  return assembly;
}

double delivered(const Assembly& assembly, const BudgetOptions& options) {
  const BudgetResult result = budget(assembly, options);
  return result.budget ? result.budget->delivered : 0.0;
}

/// The highest limit on `delivered` that is missed; none where there is none.
std::optional<double> missed_limit(const Assembly& assembly, const Budget& budget) {
  std::optional<double> highest;
  for (const assembly::Requirement& requirement : assembly.requirements) {
    const bool about_delivered =
        requirement.quantity == "delivered" || requirement.quantity == "budget.delivered";
    if (about_delivered && requirement.sense == assembly::Sense::at_least &&
        requirement.limit > budget.delivered)
      highest = std::max(highest.value_or(0.0), requirement.limit);
  }
  return highest;
}

/// What a station could bring: `perfect` is what would be delivered if it lost nothing to its coating.
Remedy remedy(std::size_t station, bool reflects, double perfect, std::optional<double> limit) {
  const bool suffices = limit && *limit <= perfect;
  const double share = suffices ? *limit / perfect : reflects ? good_mirror : 1.0 - good_face;
  return {station, reflects, reflects ? share : 1.0 - share, share * perfect, suffices};
}

} // namespace

std::vector<Remedy> remedies(const Assembly& assembly, const Budget& budget, const BudgetOptions& options) {
  std::vector<Remedy> found;
  const std::vector<std::size_t> stations = candidates(assembly, budget);
  if (stations.empty() || !(budget.delivered > 0.0))
    return found;
  const Assembly sampled = with_few_rays(assembly);
  const double as_it_is = delivered(sampled, options);
  if (!(as_it_is > 0.0))
    return found;
  const std::optional<double> limit = missed_limit(assembly, budget);
  for (const std::size_t station : std::span(stations).first(std::min(stations.size(), most_remedies))) {
    const double ratio = delivered(with_perfect_coating(sampled, station), options) / as_it_is;
    const bool reflects = assembly.stations[station].intended == Act::bounce;
    const Remedy better = remedy(station, reflects, budget.delivered * ratio, limit);
    if (better.delivered > budget.delivered * (1.0 + least_loss))
      found.push_back(better);
  }
  return found;
}

} // namespace lightledger::analysis
