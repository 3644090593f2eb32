#include "tree_survey.hpp"

#include <lightledger/trace/sampling.hpp>
#include <lightledger/trace/tree.hpp>

#include <array>
#include <utility>

namespace lightledger::trace {
namespace {

constexpr std::array powers = {&TreeLedger::returned, &TreeLedger::leaked, &TreeLedger::absorbed,
                               &TreeLedger::clipped,  &TreeLedger::missed, &TreeLedger::scattered,
                               &TreeLedger::extra,    &TreeLedger::bulk,   &TreeLedger::not_followed};

/// Chunks of fewer rays would leave most of a block's lanes empty.
constexpr std::uint64_t rays_per_chunk = RayBlock::lanes;

using TreeSamples = Samples<TreeFound>;

/// All that the rays of a group found, relative to what it launched.
TreeFound relative(const Sample<TreeFound>& sample) {
  TreeFound found = sample.replicate.front().found;
  for (std::size_t r = 1; r < sample.replicate.size(); ++r)
    found += sample.replicate[r].found;
  if (const double launched = sample.launched(); launched > 0.0)
    found *= 1.0 / launched;
  return found;
}

/// Adds up the groups by their shares, in all and per field.
void collect(const TreeSamples& samples, std::size_t fields, TracedTree& traced) {
  traced.fields.resize(fields);
  traced.shares.resize(fields, 0.0);
  for (const Sample<TreeFound>& sample : samples) {
    TreeFound weighted = relative(sample);
    weighted *= sample.group.share;
    traced.total += weighted;
    traced.fields[sample.group.field] += weighted;
    traced.shares[sample.group.field] += sample.group.share;
    traced.lit = traced.lit || sample.launched() > 0.0;
  }
  for (std::size_t f = 0; f < fields; ++f)
    if (traced.shares[f] > 0.0)
      traced.fields[f] *= 1.0 / traced.shares[f];
}

/// The residuals of every path at once, a row at a time (see `residuals`).
std::vector<double> path_errors(const TreeSamples& samples, const PathTable& paths) {
  std::vector<Residuals> residual(paths.rows().size(), Residuals{});
  for (const Sample<TreeFound>& sample : samples) {
    const double scale = sample.group.share * replicates / sample.launched();
    std::vector<double> sum(residual.size(), 0.0);
    for (std::size_t r = 0; r < replicates; ++r)
      for (const PathTable::Row& row : sample.replicate[r].found.paths.rows()) {
        const std::size_t path = paths.place(row.number);
        residual[path][r] += scale * row.sums.power;
        sum[path] += row.sums.power;
      }
    for (std::size_t path = 0; path < residual.size(); ++path)
      for (std::size_t r = 0; r < replicates; ++r)
        residual[path][r] -= scale * sum[path] / sample.launched() * sample.replicate[r].launched;
  }
  std::vector<double> errors;
  errors.reserve(residual.size());
  for (const Residuals& one : residual)
    errors.push_back(standard_error(one));
  return errors;
}

} // namespace

TreeLedger& TreeLedger::operator+=(const TreeLedger& other) {
  for (const auto power : powers)
    this->*power += other.*power;
  return *this;
}

TreeLedger& TreeLedger::operator*=(double factor) {
  for (const auto power : powers)
    this->*power *= factor;
  return *this;
}

double TreeLedger::sum() const {
  double all = 0.0;
  for (const auto power : powers)
    all += this->*power;
  return all;
}

TreeFound& TreeFound::operator+=(const TreeFound& other) {
  ledger += other.ledger;
  reflectance = other.reflectance;
  ghosts += other.ghosts;
  image += other.image;
  paths += other.paths;
  returned += other.returned;
  cut += other.cut;
  return *this;
}

TreeFound& TreeFound::operator*=(double factor) {
  ledger *= factor;
  ghosts *= factor;
  image *= factor;
  paths *= factor;
  returned *= factor;
  return *this;
}

TracedTree trace_tree(const Train& train, const PathTree& tree, const TreeOptions& options) {
  const TreeSurvey survey(train, tree, options.floor);
  Sampling<TreeSurvey> sampling(
      train, survey,
      {.shifts = options.shifts, .rays_per_chunk = rays_per_chunk, .progress = options.progress});
  TracedTree traced;
  with_threads(options.threads, [&] { traced.accurate = sampling.run(); });
  traced.rays = sampling.rays();
  collect(sampling.samples(), train.assembly->light.fields.size(), traced);
  if (sampling.scattered()) {
    traced.delivered_error = standard_error(
        residuals(sampling.samples(), [](const TreeFound& found) { return found.image.power; }));
    traced.returned_error = standard_error(
        residuals(sampling.samples(), [](const TreeFound& found) { return found.ledger.returned; }));
    traced.ghosts_error = TreeSurvey::error(sampling.samples());
    traced.path_errors = path_errors(sampling.samples(), traced.total.paths);
  }
  return traced;
}

} // namespace lightledger::trace
