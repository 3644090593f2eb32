#include "reflecting_detector.hpp"

#include <lightledger/optics/polarization.hpp>
#include <lightledger/trace/interact.hpp>
#include <lightledger/trace/landings.hpp>
#include <lightledger/trace/sampling.hpp>

#include <algorithm>
#include <utility>

namespace lightledger::trace {
namespace {

/// Sums at one step.
struct Met {
  double arriving = 0.0, reflected = 0.0;
};

struct Seen {
  std::vector<Landing> rays;
  std::vector<Met> steps;

  Seen& operator+=(const Seen& other) {
    rays.insert(rays.end(), other.rays.begin(), other.rays.end());
    for (std::size_t i = 0; i < steps.size(); ++i) {
      steps[i].arriving += other.steps[i].arriving;
      steps[i].reflected += other.steps[i].reflected;
    }
    return *this;
  }
};

class StepSurvey {
public:
  using Found = Seen;

  StepSurvey(const Train& train, const Path& path)
      : m_steps(path.steps), m_coherency(optics::coherency(train.assembly->light.polarization)),
        m_detector(train.path.steps.back().op), m_detectors(reflecting_detectors(train)) {}

  [[nodiscard]] Seen blank(const Group&) const { return {{}, std::vector<Met>(m_steps.size())}; }

  void follow(const Group& group, RayBlock& block, Seen& seen) const {
    for (std::size_t i = 0; i < m_steps.size() && block.alive != 0; ++i) {
      const Path::Step& step = m_steps[i];
      Entry entry;
      StepOut out;
      out.entry = &entry;
      out.bounces = step.act == Act::bounce;
      (out.bounces ? out.bounce : out.pass) = &block;
      const bool at_detector = step.op == m_detector && out.bounces;
      const PlanOp& op = at_detector ? m_detectors[group.wavelength] : group.plan->ops[step.op];
      interact(group.plan->legs[step.leg], op, m_coherency, block, out);
      seen.steps[i].arriving += entry.inside;
      if (out.bounces)
        seen.steps[i].reflected += entry.onward + entry.scattered + entry.extra;
    }
    for (int lane = 0; lane < block.count; ++lane)
      if (((block.alive >> lane) & 1U) != 0)
        seen.rays.push_back({block.p[0][lane], block.p[1][lane], power(block, lane)});
  }

  [[nodiscard]] static bool accurate(const Samples<Seen>&, double) { return true; }

private:
  /// w · tr(J Φ J†).
  [[nodiscard]] double power(const RayBlock& block, int lane) const {
    double sum = 0.0;
    for (int row = 0; row < 8; row += 4) {
      const double x_re = block.J[row][lane];
      const double x_im = block.J[row + 1][lane];
      const double y_re = block.J[row + 2][lane];
      const double y_im = block.J[row + 3][lane];
      const double cross_re = x_re * y_re + x_im * y_im;
      const double cross_im = x_im * y_re - x_re * y_im;
      sum += m_coherency.xx * (x_re * x_re + x_im * x_im) + m_coherency.yy * (y_re * y_re + y_im * y_im) +
             2.0 * (cross_re * m_coherency.xy.real() - cross_im * m_coherency.xy.imag());
    }
    return block.w[lane] * sum;
  }

  const std::vector<Path::Step>& m_steps;
  optics::Coherency m_coherency;
  OpId m_detector;
  std::vector<PlanOp> m_detectors;
};

} // namespace

Landings land(const Train& train, const Path& path, std::uint64_t rays, int threads) {
  const StepSurvey survey(train, path);
  SamplingOptions options;
  options.rays_per_chunk = RayBlock::lanes;
  options.instead = assembly::Scattered{rays};
  Sampling<StepSurvey> sampling(train, survey, options);
  with_threads(threads, [&] { sampling.run(); });
  Landings landings;
  std::vector<Met> steps(path.steps.size());
  for (const Sample<Seen>& sample : sampling.samples()) {
    const double scale = sample.launched() > 0.0 ? sample.group.share / sample.launched() : 0.0;
    for (const Tally<Seen>& tally : sample.replicate) {
      for (const Landing& ray : tally.found.rays)
        landings.rays.push_back({ray.x, ray.y, ray.power * scale});
      for (std::size_t i = 0; i < steps.size(); ++i) {
        steps[i].arriving += scale * tally.found.steps[i].arriving;
        steps[i].reflected += scale * tally.found.steps[i].reflected;
      }
    }
  }
  for (const Met& step : steps)
    landings.reflectances.push_back(step.arriving > 0.0 ? step.reflected / step.arriving : 0.0);
  return landings;
}

} // namespace lightledger::trace
