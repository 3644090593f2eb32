#include "parallel.hpp"

#include <lightledger/optics/polarization.hpp>
#include <lightledger/trace/interact.hpp>
#include <lightledger/trace/tracer.hpp>

#include <array>
#include <cmath>
#include <numeric>
#include <utility>

namespace lightledger::trace {
namespace {

using assembly::Assembly;
using assembly::Light;
using assembly::ToAccuracy;

constexpr int chunks_per_replicate = 16;
constexpr std::uint64_t first_count = 4096;
constexpr std::uint64_t largest_count = std::uint64_t{1} << 20;

/// What a chunk of rays left behind; chunks add up in a fixed order.
struct Tally {
  Ledger ledger;
  std::uint64_t rays = 0;
  std::unique_ptr<Sink> sink;

  Tally& operator+=(const Tally& other) {
    ledger += other.ledger;
    rays += other.rays;
    if (sink)
      sink->merge(*other.sink);
    return *this;
  }
};

/// Sums neighbours, then neighbouring sums, …: short error growth, and the same order always.
Tally pairwise(std::array<Tally, chunks_per_replicate>& tallies) {
  for (std::size_t step = 1; step < tallies.size(); step *= 2)
    for (std::size_t i = 0; i + step < tallies.size(); i += 2 * step)
      tallies[i] += tallies[i + step];
  return std::move(tallies.front());
}

/// One wavelength and one field: a share of the launched power with its own plan and launcher.
struct Group {
  std::size_t wavelength, field;
  double share;
  const Plan* plan;
  Launcher launcher;
  std::vector<Tally> replicate; ///< raw sums so far
};

template <typename List>
double weights(const List& list) {
  return std::accumulate(list.begin(), list.end(), 0.0,
                         [](double sum, const auto& item) { return sum + item.weight; });
}

class Tracing {
public:
  Tracing(const Train& train, const TraceOptions& options)
      : m_light(train.assembly->light), m_pupil(m_light, options.shifts), m_path(train.path),
        m_coherency(optics::coherency(m_light.polarization)), m_stations(train.assembly->stations.size()),
        m_sink(options.sink) {
    const double all = weights(m_light.wavelengths) * weights(m_light.fields);
    for (std::size_t w = 0; w < m_light.wavelengths.size(); ++w)
      for (std::size_t f = 0; f < m_light.fields.size(); ++f) {
        const assembly::Field& field = m_light.fields[f];
        m_groups.push_back({w,
                            f,
                            m_light.wavelengths[w].weight * field.weight / all,
                            &train.plans[w],
                            Launcher(Source(m_light, field), m_pupil, train.footprints[f]),
                            {}});
        m_groups.back().replicate.resize(replicates);
        for (Tally& tally : m_groups.back().replicate)
          tally = blank();
      }
  }

  bool run() {
    if (const auto* goal = std::get_if<ToAccuracy>(&m_light.sampling))
      return double_until(goal->standard_error);
    extend(0, m_pupil.size());
    return true;
  }

  [[nodiscard]] Traced collect(bool accurate) const {
    Traced traced;
    traced.accurate = accurate;
    traced.total = Ledger(m_stations);
    for (const Group& group : m_groups) {
      Ledger ledger = raw(group);
      traced.rays += rays(group);
      if (ledger.launched > 0.0)
        ledger *= 1.0 / ledger.launched;
      Ledger weighted = ledger;
      weighted *= group.share;
      traced.total += weighted;
      traced.groups.push_back({group.wavelength, group.field, group.share, std::move(ledger)});
    }
    if (m_pupil.scattered())
      traced.standard_error = standard_error();
    if (m_sink != nullptr)
      for (const Group& group : m_groups)
        for (const Tally& tally : group.replicate)
          m_sink->merge(*tally.sink);
    return traced;
  }

private:
  [[nodiscard]] Tally blank() const {
    return {Ledger(m_stations), 0, m_sink != nullptr ? m_sink->fresh() : nullptr};
  }

  bool double_until(double goal) {
    std::uint64_t done = 0;
    for (std::uint64_t count = first_count; count <= largest_count; count *= 2) {
      extend(done, count / replicates);
      done = count / replicates;
      if (standard_error() < goal)
        return true;
    }
    return false;
  }

  /// Traces the numbers from `first` to below `end` of every replicate of every group.
  void extend(std::uint64_t first, std::uint64_t end) {
    parallel_jobs(m_groups.size() * replicates, [&](std::size_t job) {
      Group& group = m_groups[job / replicates];
      const int replicate = static_cast<int>(job % replicates);
      std::array<Tally, chunks_per_replicate> tallies;
      parallel_jobs(chunks_per_replicate, [&](std::size_t chunk) {
        const auto cut = [&](std::size_t part) {
          return first + (end - first) * part / chunks_per_replicate;
        };
        tallies[chunk] = trace_chunk(group, replicate, cut(chunk), cut(chunk + 1));
      });
      group.replicate[static_cast<std::size_t>(replicate)] += pairwise(tallies);
    });
  }

  [[nodiscard]] Tally trace_chunk(const Group& group, int replicate, std::uint64_t number,
                                  std::uint64_t end) const {
    Tally tally = blank();
    RayBlock block;
    while (number < end) {
      number = group.launcher.fill(block, replicate, number, end);
      for (int lane = 0; lane < block.count; ++lane)
        tally.ledger.launched += block.w[lane];
      tally.rays += static_cast<std::uint64_t>(block.count);
      follow(group, block, tally);
    }
    return tally;
  }

  void follow(const Group& group, RayBlock& block, Tally& tally) const {
    for (const Path::Step& step : m_path.steps) {
      if (block.alive == 0)
        return;
      Entry entry;
      StepOut out;
      out.entry = &entry;
      out.bounces = step.act == Act::bounce;
      (out.bounces ? out.bounce : out.pass) = &block;
      interact(group.plan->legs[step.leg], group.plan->ops[step.op], m_coherency, block, out);
      tally.ledger.enter(step.visit, entry);
    }
    if (tally.sink && block.alive != 0)
      tally.sink->take({block, group.wavelength, group.field});
  }

  [[nodiscard]] Ledger raw(const Group& group) const {
    Ledger ledger(m_stations);
    for (const Tally& tally : group.replicate)
      ledger += tally.ledger;
    return ledger;
  }

  [[nodiscard]] static std::uint64_t rays(const Group& group) {
    return std::accumulate(group.replicate.begin(), group.replicate.end(), std::uint64_t{0},
                           [](std::uint64_t sum, const Tally& tally) { return sum + tally.rays; });
  }

  /// Of delivered, a ratio of sums over independent replicates: from the spread of its linearised residuals
  /// (Cochran, Sampling Techniques, 3rd ed., eq. 6.13).
  [[nodiscard]] double standard_error() const {
    std::array<double, replicates> residual{};
    for (const Group& group : m_groups) {
      const Ledger sum = raw(group);
      const double ratio = sum.delivered() / sum.launched;
      for (std::size_t r = 0; r < replicates; ++r) {
        const Ledger& one = group.replicate[r].ledger;
        residual[r] += group.share * (one.delivered() - ratio * one.launched) * replicates / sum.launched;
      }
    }
    double squares = 0.0;
    for (const double value : residual)
      squares += value * value;
    return std::sqrt(squares / (replicates * (replicates - 1.0)));
  }

  const Light& m_light;
  Pupil m_pupil;
  const Path& m_path;
  optics::Coherency m_coherency;
  std::size_t m_stations;
  Sink* m_sink;
  std::vector<Group> m_groups;
};

} // namespace

std::optional<Train> prepare(const Assembly& assembly, assembly::Faults& faults) {
  auto bench = lay_out(assembly, faults);
  if (!bench)
    return std::nullopt;
  const Routes routes(assembly, bench->from);
  std::vector<Plan> plans;
  for (const assembly::Wavelength& wavelength : assembly.light.wavelengths)
    plans.push_back(compile(assembly, *bench, routes, wavelength.nm));
  Path path = intended_path(assembly, routes);
  auto launches = footprints(assembly, path, plans.front(), faults);
  if (!launches)
    return std::nullopt;
  return Train{&assembly, std::move(*bench), routes, std::move(plans), std::move(path), std::move(*launches)};
}

Traced trace(const Train& train, const TraceOptions& options) {
  Tracing tracing(train, options);
  bool accurate = true;
  with_threads(options.threads, [&] { accurate = tracing.run(); });
  return tracing.collect(accurate);
}

} // namespace lightledger::trace
