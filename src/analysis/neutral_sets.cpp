#include "neutral_sets.hpp"

#include <fmt/format.h>

#include <algorithm>

namespace lightledger::analysis {
namespace {

using assembly::Assembly;
using assembly::MediumId;
using assembly::Station;
using assembly::Surface;

bool is_gas(const Assembly& assembly, MediumId medium) {
  const auto index = optics::index_at(assembly.media[medium], assembly.light.wavelengths.front().nm);
  return index && optics::gas(*index);
}

/// The medium that light is in behind a station, given the one before it.
MediumId medium_behind(const Assembly& assembly, const Station& station, MediumId before) {
  const Surface& surface = assembly.surfaces[station.surface];
  const bool crosses =
      station.intended == assembly::Act::pass && std::holds_alternative<assembly::Interface>(surface.effect);
  if (!crosses)
    return before;
  return before == surface.before ? surface.beyond.value_or(before) : surface.before;
}

std::string joined_name(const Assembly& assembly, const std::vector<std::size_t>& stations) {
  return fmt::format("{} to {}", assembly.stations[stations.front()].name,
                     assembly.stations[stations.back()].name);
}

} // namespace

std::vector<NeutralSet> station_sets(const Assembly& assembly) {
  std::vector<NeutralSet> sets;
  for (std::size_t i = 0; i + 1 < assembly.stations.size(); ++i)
    sets.push_back({assembly.stations[i].name, {i}});
  return sets;
}

std::vector<NeutralSet> element_sets(const Assembly& assembly) {
  std::vector<NeutralSet> sets;
  std::vector<std::size_t> inside;
  MediumId medium = assembly.light.medium;
  for (std::size_t i = 0; i + 1 < assembly.stations.size(); ++i) {
    const MediumId behind = medium_behind(assembly, assembly.stations[i], medium);
    const bool enters = is_gas(assembly, medium) && !is_gas(assembly, behind);
    if (enters || !inside.empty())
      inside.push_back(i);
    medium = behind;
    if (!is_gas(assembly, medium))
      continue;
    if (inside.size() > 1)
      sets.push_back({joined_name(assembly, inside), inside});
    inside.clear();
  }
  return sets;
}

std::vector<NeutralSet> coating_sets(const Assembly& assembly) {
  std::vector<NeutralSet> sets;
  for (std::size_t i = 0; i + 1 < assembly.stations.size(); ++i) {
    const Surface& surface = assembly.surfaces[assembly.stations[i].surface];
    if (!std::holds_alternative<assembly::Interface>(surface.effect))
      continue;
    const std::string name = surface.coating ? assembly.coatings[surface.coating->coating].name : "bare";
    const auto known = std::ranges::find(sets, name, &NeutralSet::name);
    if (known == sets.end())
      sets.push_back({name, {i}});
    else
      known->stations.push_back(i);
  }
  return sets;
}

} // namespace lightledger::analysis
