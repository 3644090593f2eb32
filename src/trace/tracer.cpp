#include <lightledger/optics/polarization.hpp>
#include <lightledger/trace/interact.hpp>
#include <lightledger/trace/parallel.hpp>
#include <lightledger/trace/sampling.hpp>
#include <lightledger/trace/tracer.hpp>

#include <memory>
#include <utility>

namespace lightledger::trace {
namespace {

/// The ledger of one path, and what a sink has seen at its end.
struct Entered {
  Ledger ledger;
  std::unique_ptr<Sink> sink;

  Entered& operator+=(const Entered& other) {
    ledger += other.ledger;
    if (sink)
      sink->merge(*other.sink);
    return *this;
  }
};

/// Follows rays along the intended path.
class PathSurvey {
public:
  using Found = Entered;

  PathSurvey(const Train& train, Sink* sink)
      : m_path(train.path), m_coherency(optics::coherency(train.assembly->light.polarization)),
        m_stations(train.assembly->stations.size()), m_sink(sink) {}

  [[nodiscard]] Entered blank(const Group&) const {
    return {Ledger(m_stations), m_sink != nullptr ? m_sink->fresh() : nullptr};
  }

  void follow(const Group& group, RayBlock& block, Entered& found) const {
    for (const Path::Step& step : m_path.steps) {
      if (block.alive == 0)
        return;
      Entry entry;
      StepOut out;
      out.entry = &entry;
      out.bounces = step.act == Act::bounce;
      (out.bounces ? out.bounce : out.pass) = &block;
      interact(group.plan->legs[step.leg], group.plan->ops[step.op], m_coherency, block, out);
      found.ledger.enter(step.visit, entry);
    }
    if (found.sink && block.alive != 0)
      found.sink->take({block, group.wavelength, group.field});
  }

  [[nodiscard]] bool accurate(const Samples<Entered>& samples, double goal) const {
    return error(samples) < goal;
  }

  /// Of delivered.
  [[nodiscard]] static double error(const Samples<Entered>& samples) {
    return standard_error(residuals(samples, [](const Entered& found) { return found.ledger.delivered(); }));
  }

  /// Launched = 1.
  [[nodiscard]] Ledger ledger(const Sample<Entered>& sample) const {
    Ledger ledger(m_stations);
    for (const Tally<Entered>& tally : sample.replicate)
      ledger += tally.found.ledger;
    ledger.launched = sample.launched();
    if (ledger.launched > 0.0)
      ledger *= 1.0 / ledger.launched;
    return ledger;
  }

private:
  const Path& m_path;
  optics::Coherency m_coherency;
  std::size_t m_stations;
  Sink* m_sink;
};

} // namespace

Traced trace(const Train& train, const TraceOptions& options) {
  const PathSurvey survey(train, options.sink);
  Sampling<PathSurvey> sampling(train, survey, {.shifts = options.shifts, .progress = options.progress});
  Traced traced;
  with_threads(options.threads, [&] { traced.accurate = sampling.run(); });
  traced.rays = sampling.rays();
  traced.total = Ledger(train.assembly->stations.size());
  for (const Sample<Entered>& sample : sampling.samples()) {
    Ledger ledger = survey.ledger(sample);
    Ledger weighted = ledger;
    weighted *= sample.group.share;
    traced.total += weighted;
    traced.groups.push_back(
        {sample.group.wavelength, sample.group.field, sample.group.share, std::move(ledger)});
  }
  if (sampling.scattered())
    traced.standard_error = PathSurvey::error(sampling.samples());
  if (options.sink != nullptr)
    for (const Sample<Entered>& sample : sampling.samples())
      for (const Tally<Entered>& tally : sample.replicate)
        options.sink->merge(*tally.found.sink);
  return traced;
}

} // namespace lightledger::trace
