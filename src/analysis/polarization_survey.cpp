#include "polarization_survey.hpp"

#include "proper_walk.hpp"

#include <algorithm>
#include <utility>

namespace lightledger::analysis {
namespace {

/// What a thread needs for a block, kept from one block to the next.
struct Scratch {
  ProperRays rays;
  std::vector<PauliLanes> before; ///< per station: the product of all stations before it
  struct Amplitude {
    LaneArray of;
  };
  std::vector<Amplitude> neutral; ///< per station: its mean amplitude
};

Scratch& scratch() {
  static thread_local Scratch own;
  return own;
}

bool are_neighbours(const NeutralSet& set) {
  return set.stations.back() - set.stations.front() + 1 == set.stations.size();
}

} // namespace

PolarizationSums& PolarizationSums::operator+=(const PolarizationSums& other) {
  add(1.0, other);
  return *this;
}

void PolarizationSums::add(double factor, const PolarizationSums& other) {
  for (std::size_t i = 0; i < values.size(); ++i)
    values[i] += factor * other.values[i];
}

PolarizationSurvey::PolarizationSurvey(const trace::Train& train, std::vector<NeutralSet> sets)
    : m_train(train), m_sets(std::move(sets)), m_ending(train.path.steps.size()) {
  for (std::size_t i = 0; i < m_sets.size(); ++i) {
    if (are_neighbours(m_sets[i]))
      m_ending[m_sets[i].stations.back()].push_back(i);
    else
      m_scattered.push_back(i);
  }
}

PolarizationSums PolarizationSurvey::blank(const trace::Group&) const {
  return {std::vector<double>((1 + m_sets.size()) * proper_sums + arriving_sums, 0.0)};
}

void PolarizationSurvey::follow(const trace::Group& group, trace::RayBlock& block, Found& found) const {
  ProperRays& rays = scratch().rays;
  rays.follow(m_train, Optics(*group.plan), block);
  if (rays.count == 0)
    return;
  add(rays, found);
}

void PolarizationSurvey::add(const ProperRays& rays, Found& found) const {
  const std::size_t stations = rays.did.size();
  auto& [own, before, neutral] = scratch();
  before.resize(stations + 1);
  neutral.resize(stations);
  set_identity(before[0]);
  for (std::size_t i = 0; i < stations; ++i) {
    mean_amplitude(rays.did[i], rays.count, neutral[i].of);
    multiply(rays.did[i], before[i], rays.count, before[i + 1]);
  }
  const optics::State& state = m_train.assembly->light.polarization;
  add_proper(before[stations], rays.arrival, state, rays.count, found.values.data());
  add_arriving(before[stations], rays.arrival, rays.count,
               found.values.data() + found.values.size() - arriving_sums);
  add_neighbours(rays, found);
  add_scattered(rays, found);
}

/// From the last station to the first, the product of all behind it in hand.
void PolarizationSurvey::add_neighbours(const ProperRays& rays, Found& found) const {
  const Scratch& at = scratch();
  PauliLanes product[2];
  PauliLanes* behind = product;
  PauliLanes* next = product + 1;
  set_identity(*behind);
  for (std::size_t i = rays.did.size(); i-- > 0;) {
    for (const std::size_t set : m_ending[i]) {
      PauliLanes all;
      multiply(*behind, at.before[m_sets[set].stations.front()], rays.count, all);
      for (const std::size_t station : m_sets[set].stations)
        scale(all, at.neutral[station].of, rays.count);
      add_proper(all, rays.arrival, m_train.assembly->light.polarization, rays.count,
                 found.values.data() + (set + 1) * proper_sums);
    }
    multiply(*behind, rays.did[i], rays.count, *next);
    std::swap(behind, next);
  }
}

void PolarizationSurvey::add_scattered(const ProperRays& rays, Found& found) const {
  const Scratch& at = scratch();
  for (const std::size_t set : m_scattered) {
    const std::vector<std::size_t>& members = m_sets[set].stations;
    PauliLanes product[2];
    PauliLanes* before = product;
    PauliLanes* next = product + 1;
    *before = at.before[members.front()];
    for (std::size_t i = members.front(); i < rays.did.size(); ++i) {
      if (std::ranges::binary_search(members, i)) {
        scale(*before, at.neutral[i].of, rays.count);
        continue;
      }
      multiply(rays.did[i], *before, rays.count, *next);
      std::swap(before, next);
    }
    add_proper(*before, rays.arrival, m_train.assembly->light.polarization, rays.count,
               found.values.data() + (set + 1) * proper_sums);
  }
}

bool PolarizationSurvey::accurate(const trace::Samples<Found>& samples, double goal) const {
  const std::optional<double> error = mueller_error(samples);
  return !error || *error < goal;
}

std::optional<double> mueller_error(const trace::Samples<PolarizationSums>& samples) {
  double power = 0.0;
  for (const auto& sample : samples)
    power += sample.group.share / sample.launched() * sample.sum([](const auto& tally) {
      return optics::mueller(coherency_at(tally.found.arriving()))[0][0];
    });
  if (!(power > 0.0))
    return std::nullopt;
  double largest = 0.0;
  for (std::size_t row = 0; row < 4; ++row)
    for (std::size_t column = 0; column < 4; ++column)
      largest = std::max(largest, trace::standard_error(trace::residuals(samples, [&](const auto& found) {
                           return optics::mueller(coherency_at(found.arriving()))[row][column];
                         })));
  return largest / power;
}

} // namespace lightledger::analysis
