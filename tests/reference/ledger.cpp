#include "reference/ledger.hpp"

#include <algorithm>

namespace lightledger::reference {
namespace {

void enter_incidence(StationLedger& line, const Step& step, double weight) {
  line.inside += weight * step.incident;
  line.pass_s += weight * step.incident * step.pass_s;
  line.pass_p += weight * step.incident * step.pass_p;
  line.incidence_deg += weight * step.incident * step.incidence_deg;
  line.least_deg = std::min(line.least_deg, step.incidence_deg);
  line.most_deg = std::max(line.most_deg, step.incidence_deg);
}

void enter_step(StationLedger& line, const Step& step, double weight) {
  line.incident += weight * step.incident;
  line.onward += weight * step.onward;
  line.aside += weight * step.aside;
  line.absorbed += weight * step.absorbed;
  line.clipped += weight * step.clipped;
  line.missed += weight * step.missed;
  line.scattered += weight * step.scattered;
  line.extra += weight * step.extra;
  line.bulk += weight * step.bulk;
  if (step.inside)
    enter_incidence(line, step, weight);
}

} // namespace

void Ledger::enter(const RayRecord& ray, double weight) {
  if (stations.size() < ray.steps.size())
    stations.resize(ray.steps.size());
  for (std::size_t i = 0; i < ray.steps.size(); ++i)
    enter_step(stations[i], ray.steps[i], weight);
  launched += weight;
  delivered += weight * ray.delivered;
}

double Ledger::closure_error() const {
  double rest = launched - delivered;
  for (const StationLedger& line : stations)
    rest -= line.aside + line.absorbed + line.clipped + line.missed + line.scattered + line.extra + line.bulk;
  return rest;
}

double lost(const RayRecord& ray) {
  double sum = 0.0;
  for (const Step& step : ray.steps)
    sum += step.aside + step.absorbed + step.clipped + step.missed + step.scattered + step.extra + step.bulk;
  return sum;
}

} // namespace lightledger::reference
