#pragma once

#include <lightledger/trace/launch.hpp>
#include <lightledger/trace/parallel.hpp>
#include <lightledger/trace/progress.hpp>
#include <lightledger/trace/rays.hpp>
#include <lightledger/trace/train.hpp>

#include <algorithm>
#include <array>
#include <cstdint>
#include <optional>
#include <utility>
#include <variant>
#include <vector>

namespace lightledger::trace {

/// One wavelength and one field: a share of the launched power with its own plan and launcher.
struct Group {
  std::size_t wavelength, field; ///< their numbers in the light's lists
  double share;                  ///< of all launched power
  const Plan* plan;
  Launcher launcher;
};

/// What a set of rays left behind, in the raw weights of the rays.
template <class Found>
struct Tally {
  double launched = 0.0;
  std::uint64_t rays = 0;
  Found found;

  Tally& operator+=(const Tally& other) {
    launched += other.launched;
    rays += other.rays;
    found += other.found;
    return *this;
  }
};

/// The rays of one group so far, by replicate.
template <class Found>
struct Sample {
  Group group;
  std::vector<Tally<Found>> replicate;

  [[nodiscard]] double launched() const {
    return sum([](const auto& tally) { return tally.launched; });
  }
  [[nodiscard]] std::uint64_t rays() const {
    return sum([](const auto& tally) { return tally.rays; });
  }
  /// Σ of a figure of the tallies over the replicates, in their order.
  template <class Figure>
  [[nodiscard]] auto sum(Figure figure) const {
    decltype(figure(replicate.front())) total{};
    for (const Tally<Found>& tally : replicate)
      total += figure(tally);
    return total;
  }
};

/// All groups, fields within wavelengths.
template <class Found>
using Samples = std::vector<Sample<Found>>;

/// By how much each replicate departs from the whole.
using Residuals = std::array<double, replicates>;

/// Of a figure per launched power, added up over the groups by their shares: a ratio of sums over independent
/// replicates, linearised (Cochran, Sampling Techniques, 3rd ed., eq. 6.13). `figure` takes a Found and is
/// additive. Residuals of several figures may be combined linearly to those of a function of them.
template <class Found, class Figure>
[[nodiscard]] Residuals residuals(const Samples<Found>& samples, Figure figure) {
  Residuals residual{};
  for (const Sample<Found>& sample : samples) {
    const double launched = sample.launched();
    const double ratio = sample.sum([&](const auto& tally) { return figure(tally.found); }) / launched;
    for (std::size_t r = 0; r < replicates; ++r) {
      const Tally<Found>& one = sample.replicate[r];
      residual[r] += sample.group.share * (figure(one.found) - ratio * one.launched) * replicates / launched;
    }
  }
  return residual;
}

/// Of the mean over the replicates.
[[nodiscard]] double standard_error(const Residuals& residuals);

/// One group for each wavelength and field of a light, its launcher included; the pupil must outlive them.
[[nodiscard]] std::vector<Group> groups(const Train& train, const Pupil& pupil);

struct SamplingOptions {
  std::uint64_t shifts = 0; ///< which set of shifts scatters the rays
  /// Chunks get no fewer rays than this where there are several; 0: sixteen chunks always.
  std::uint64_t rays_per_chunk = 0;
  std::optional<assembly::Sampling> instead{}; ///< of the light's own sampling
  Progress* progress = nullptr;                ///< told of every chunk
};

/// Puts a survey to the light's own samples of rays. They are cut into a list of chunks that does not depend
/// on the number of threads (16 replicates × at most 16), surveyed in parallel and summed in a fixed order:
/// the same bits always. A survey has
///   Found                              what it finds; adds up by += in the order of the rays
///   Found blank(const Group&) const    nothing found yet
///   void follow(const Group&, RayBlock&, Found&) const    called by many threads
///   bool accurate(const Samples<Found>&, double goal) const    whether a standard error is low enough
template <class Survey>
class Sampling {
public:
  using Found = typename Survey::Found;

  Sampling(const Train& train, const Survey& survey, const SamplingOptions& options = {})
      : m_light(light(train, options)), m_survey(survey), m_options(options),
        m_pupil(m_light, options.shifts) {
    for (const Group& group : groups(train, m_pupil)) {
      Sample<Found> sample{group, {}};
      for (int r = 0; r < replicates; ++r)
        sample.replicate.push_back(blank(sample.group));
      m_samples.push_back(std::move(sample));
    }
  }
  Sampling(const Sampling&) = delete;
  Sampling& operator=(const Sampling&) = delete;

  /// Traces the pattern, or scattered rays until they are accurate enough; false where they never were.
  bool run() {
    if (const auto* goal = std::get_if<assembly::ToAccuracy>(&m_light.sampling))
      return double_until(goal->standard_error);
    extend(0, m_pupil.size());
    return true;
  }

  [[nodiscard]] const Samples<Found>& samples() const { return m_samples; }
  /// Whether the sample is one that a standard error follows from.
  [[nodiscard]] bool scattered() const { return m_pupil.scattered(); }
  [[nodiscard]] std::uint64_t rays() const {
    std::uint64_t all = 0;
    for (const Sample<Found>& sample : m_samples)
      all += sample.rays();
    return all;
  }

private:
  static constexpr std::uint64_t most_chunks = 16;
  static constexpr std::uint64_t first_count = 4096;
  static constexpr std::uint64_t largest_count = std::uint64_t{1} << 20;

  [[nodiscard]] static assembly::Light light(const Train& train, const SamplingOptions& options) {
    assembly::Light light = train.assembly->light;
    if (options.instead)
      light.sampling = *options.instead;
    return light;
  }

  [[nodiscard]] Tally<Found> blank(const Group& group) const { return {0.0, 0, m_survey.blank(group)}; }

  bool double_until(double goal) {
    std::uint64_t done = 0;
    for (std::uint64_t count = first_count; count <= largest_count; count *= 2) {
      extend(done, count / replicates);
      done = count / replicates;
      if (m_survey.accurate(m_samples, goal))
        return true;
    }
    return false;
  }

  [[nodiscard]] std::uint64_t chunks(std::uint64_t rays) const {
    if (m_options.rays_per_chunk == 0)
      return most_chunks;
    return std::clamp<std::uint64_t>(rays / m_options.rays_per_chunk, 1, most_chunks);
  }

  /// Traces the numbers from `first` to below `end` of every replicate of every group.
  void extend(std::uint64_t first, std::uint64_t end) {
    const std::uint64_t parts = chunks(end - first);
    const auto cut = [&](std::uint64_t part) { return first + (end - first) * part / parts; };
    if (m_options.progress != nullptr)
      m_options.progress->expect((end - first) * replicates * m_samples.size());
    parallel_jobs(m_samples.size() * replicates, [&](std::size_t job) {
      Sample<Found>& sample = m_samples[job / replicates];
      const auto replicate = static_cast<int>(job % replicates);
      std::vector<Tally<Found>> tallies(parts);
      parallel_jobs(parts, [&](std::size_t chunk) {
        tallies[chunk] = survey_chunk(sample.group, replicate, cut(chunk), cut(chunk + 1));
        if (m_options.progress != nullptr)
          m_options.progress->advance(cut(chunk + 1) - cut(chunk));
      });
      sample.replicate[static_cast<std::size_t>(replicate)] += pairwise(tallies);
    });
  }

  /// Sums neighbours, then neighbouring sums, …: short error growth, and the same order always.
  [[nodiscard]] static Tally<Found> pairwise(std::vector<Tally<Found>>& tallies) {
    for (std::size_t step = 1; step < tallies.size(); step *= 2)
      for (std::size_t i = 0; i + step < tallies.size(); i += 2 * step)
        tallies[i] += tallies[i + step];
    return std::move(tallies.front());
  }

  [[nodiscard]] Tally<Found> survey_chunk(const Group& group, int replicate, std::uint64_t number,
                                          std::uint64_t end) const {
    Tally<Found> tally = blank(group);
    RayBlock block;
    while (number < end) {
      number = group.launcher.fill(block, replicate, number, end);
      for (int lane = 0; lane < block.count; ++lane)
        tally.launched += block.w[lane];
      tally.rays += static_cast<std::uint64_t>(block.count);
      m_survey.follow(group, block, tally.found);
    }
    return tally;
  }

  assembly::Light m_light;
  const Survey& m_survey;
  SamplingOptions m_options;
  Pupil m_pupil;
  Samples<Found> m_samples;
};

} // namespace lightledger::trace
