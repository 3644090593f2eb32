#pragma once

#include "neutral_sets.hpp"
#include "pauli_lanes.hpp"

#include <lightledger/trace/sampling.hpp>

#include <vector>

namespace lightledger::analysis {

struct ProperRays;

/// Sums over rays, in one list: `proper_sums` of the train as it is, then of the train with each of the sets
/// neutral, then `arriving_sums`.
struct PolarizationSums {
  std::vector<double> values;

  PolarizationSums& operator+=(const PolarizationSums& other);
  /// Adds a multiple of another list.
  void add(double factor, const PolarizationSums& other);

  [[nodiscard]] const double* train() const { return values.data(); }
  [[nodiscard]] const double* neutral(std::size_t set) const {
    return values.data() + (set + 1) * proper_sums;
  }
  [[nodiscard]] const double* arriving() const { return values.data() + values.size() - arriving_sums; }
};

/// Follows rays to the detector and sums their Mueller matrices, with every set of stations neutral in turn.
/// Products of the Jones matrices before and behind each station, kept and carried, make that O(N) for all
/// sets of neighbours together (single stations, elements), and O(N) for each other one.
class PolarizationSurvey {
public:
  using Found = PolarizationSums;

  PolarizationSurvey(const trace::Train& train, std::vector<NeutralSet> sets);

  [[nodiscard]] Found blank(const trace::Group& group) const;
  void follow(const trace::Group& group, trace::RayBlock& block, Found& found) const;
  /// Whether the largest standard error of the detector's Mueller elements, relative to M00, is low enough.
  [[nodiscard]] bool accurate(const trace::Samples<Found>& samples, double goal) const;

  [[nodiscard]] const std::vector<NeutralSet>& sets() const { return m_sets; }

private:
  void add(const ProperRays& rays, Found& found) const;
  void add_neighbours(const ProperRays& rays, Found& found) const;
  void add_scattered(const ProperRays& rays, Found& found) const;

  const trace::Train& m_train;
  std::vector<NeutralSet> m_sets;
  std::vector<std::vector<std::size_t>> m_ending; ///< per station: sets of neighbours of which it is the last
  std::vector<std::size_t> m_scattered;           ///< the other sets
};

/// The largest standard error of the detector's Mueller elements, relative to M00; none where nothing
/// arrives.
[[nodiscard]] std::optional<double> mueller_error(const trace::Samples<PolarizationSums>& samples);

} // namespace lightledger::analysis
