#include "properties/fast.hpp"

#include <gtest/gtest.h>
#include <rapidcheck/gtest.h>

#include <cmath>

/// The program's tracer against the textbook one, on random assemblies.
namespace lightledger::properties {
namespace {

using reference::RayRecord;
using reference::Step;

constexpr double agreement = 1e-11; ///< of powers and amplitudes, which are at most 1
constexpr double agreement_of_lengths =
    1e-11; ///< relative to the way (stretched where it ends at grazing incidence), or to 10 mm

/// How far the two tracers are apart on one ray: the largest difference of any power, amplitude, or (scaled)
/// length.
class Difference {
public:
  void power(double one, double other) { take(one - other, agreement); }
  void length(double difference, double size) {
    take(difference, agreement_of_lengths * std::max(10.0, size));
  }
  void take(double difference, double allowed) {
    const double relative = std::abs(difference) / allowed;
    m_worst = relative <= m_worst ? m_worst : relative; // also takes what is not a number
  }
  [[nodiscard]] double worst() const { return m_worst; }

private:
  double m_worst = 0.0;
};

bool is_interface(const Both& both, std::size_t station) {
  const assembly::Surface& surface = both.assembly->surfaces[both.assembly->stations[station].surface];
  return std::holds_alternative<assembly::Interface>(surface.effect);
}

void compare_powers(const Step& expected, const trace::Entry& found, Difference& difference) {
  difference.power(found.incident, expected.incident);
  difference.power(found.missed, expected.missed);
  difference.power(found.clipped, expected.clipped);
  difference.power(found.aside, expected.aside);
  difference.power(found.absorbed, expected.absorbed);
  difference.power(found.scattered, expected.scattered);
  difference.power(found.extra, expected.extra);
  difference.power(found.onward, expected.onward);
  difference.power(found.bulk, expected.bulk);
  if (!expected.inside)
    return;
  difference.power(found.inside, expected.incident);
  difference.power(found.least_incidence, expected.incidence_deg * std::numbers::pi / 180.0);
}

void compare_pass(const Step& expected, const trace::Entry& found, Difference& difference) {
  difference.power(found.pass_s, expected.incident * expected.pass_s);
  difference.power(found.pass_p, expected.incident * expected.pass_p);
}

void compare_ray(const Both& both, const trace::RayBlock& launched, const trace::RayBlock& behind,
                 std::size_t station, const Step& expected, Difference& difference) {
  const trace::Frame& frame = both.train.bench.surface[both.assembly->stations[station].surface];
  const reference::Vector point(behind.p[0][0], behind.p[1][0], behind.p[2][0]);
  const reference::Vector direction(behind.d[0][0], behind.d[1][0], behind.d[2][0]);
  const double size =
      std::max(std::abs(expected.optical_path), expected.local_point.norm()) / expected.cos_incidence;
  difference.length((point - expected.local_point).norm(), size);
  difference.power((frame.axes * direction - expected.direction).norm(), 0.0);
  difference.length(behind.opl[0] - expected.optical_path, size);
  difference.power((polarization_matrix(both.train, launched, behind, station) - expected.P).norm(), 0.0);
}

/// The largest disagreement about one ray, in units of the agreement asked for; infinite where it ends
/// elsewhere.
double disagreement(const Both& both, const reference::Ray& ray, const RayRecord& record,
                    std::size_t wavelength) {
  const trace::RayBlock launched = block_of({ray});
  const Run fast = run(both.train, launched, wavelength);
  if (fast.reached != record.steps.size())
    return std::numeric_limits<double>::infinity();
  Difference difference;
  for (std::size_t i = 0; i < record.steps.size(); ++i) {
    compare_powers(record.steps[i], fast.ledger.rows[i], difference);
    if (record.steps[i].inside && is_interface(both, i))
      compare_pass(record.steps[i], fast.ledger.rows[i], difference);
    if (fast.behind[i].alive != 0)
      compare_ray(both, launched, fast.behind[i], i, record.steps[i], difference);
  }
  return difference.worst();
}

RC_GTEST_PROP(Kernel, AgreesWithTheTextbookRayByRay, ()) {
  const std::uint64_t seed = reference::any_seed();
  const Both both = prepare(reference::random_assembly(seed));
  reference::Dice dice(seed + 1);
  const auto& wavelengths = both.assembly->light.wavelengths;
  for (const reference::Ray& ray : reference::random_rays(both.assembly->light, dice, 24))
    for (std::size_t w = 0; w < wavelengths.size(); ++w) {
      const RayRecord record = reference::trace(both.bench, *both.assembly, wavelengths[w].nm, ray);
      if (record.comparable())
        RC_ASSERT(disagreement(both, ray, record, w) < 1.0);
    }
}

RC_GTEST_PROP(Kernel, TreatsARayAlikeAloneAndInABlock, ()) {
  const std::uint64_t seed = reference::any_seed();
  const Both both = prepare(reference::random_assembly(seed));
  reference::Dice dice(seed + 1);
  const auto rays = reference::random_rays(both.assembly->light, dice, trace::RayBlock::lanes);
  const Run together = run(both.train, block_of(rays));
  trace::Ledger sum(both.assembly->stations.size());
  for (const reference::Ray& ray : rays)
    sum += run(both.train, block_of({ray})).ledger;
  RC_ASSERT(alike(sum, together.ledger, 1e-12));
}

RC_GTEST_PROP(Layout, PutsEveryStationWhereTheTextbookDoes, ()) {
  const Both both = prepare(reference::random_assembly(reference::any_seed()));
  for (std::size_t i = 0; i < both.assembly->stations.size(); ++i) {
    const reference::Place& expected = both.bench.stations[i];
    const trace::Bench& found = both.train.bench;
    const trace::Frame& surface = found.surface[both.assembly->stations[i].surface];
    RC_ASSERT((surface.origin - expected.surface.origin).norm() < 1e-11);
    RC_ASSERT((surface.axes - expected.surface.axes).norm() < 1e-13);
    RC_ASSERT((found.leaving[i].axes - expected.leaving.axes).norm() < 1e-13);
    RC_ASSERT(std::abs(found.gap[i] - expected.gap) < 1e-11);
  }
}

void compare_ledgers(const Both& both, const trace::Ledger& found, const Textbook& expected) {
  for (std::size_t i = 0; i < found.rows.size(); ++i) {
    const trace::Entry& row = found.rows[i];
    const reference::StationLedger& line = expected.ledger.stations[i];
    RC_ASSERT(std::abs(row.incident - line.incident) < agreement);
    RC_ASSERT(std::abs(row.onward - line.onward) < agreement);
    RC_ASSERT(std::abs(row.aside - line.aside) < agreement);
    RC_ASSERT(std::abs(row.absorbed - line.absorbed) < agreement);
    RC_ASSERT(std::abs(row.clipped - line.clipped) < agreement);
    RC_ASSERT(std::abs(row.missed - line.missed) < agreement);
    RC_ASSERT(std::abs(row.scattered - line.scattered) < agreement);
    RC_ASSERT(std::abs(row.extra - line.extra) < agreement);
    RC_ASSERT(std::abs(row.bulk - line.bulk) < agreement);
    RC_ASSERT(std::abs(row.incidence - line.incidence_deg * std::numbers::pi / 180.0) < agreement);
    if (!is_interface(both, i))
      continue;
    RC_ASSERT(std::abs(row.pass_s - line.pass_s) < agreement);
    RC_ASSERT(std::abs(row.pass_p - line.pass_p) < agreement);
  }
}

RC_GTEST_PROP(Kernel, AgreesWithTheTextbookInTheLedger, ()) {
  assembly::Assembly assembly = reference::random_assembly(reference::any_seed());
  use_fixed_pattern(assembly);
  const Both both = prepare(assembly);
  const Textbook expected = textbook(both);
  RC_PRE(expected.left_out == 0);
  compare_ledgers(both, trace::trace(both.train, {.threads = 1}).total, expected);
}

TEST(Kernel, LeavesHardlyAnyRayOutOfTheComparison) {
  int doubtful = 0;
  int steep = 0;
  int rays = 0;
  for (std::uint64_t seed = 0; seed < 500; ++seed) {
    const assembly::Assembly assembly = reference::random_assembly(seed);
    const reference::Bench bench = reference::lay_out(assembly);
    reference::Dice dice(seed + 1);
    for (const reference::Ray& ray : reference::random_rays(assembly.light, dice, 8)) {
      const RayRecord record = reference::trace(bench, assembly, assembly.light.wavelengths.front().nm, ray);
      doubtful += record.doubtful ? 1 : 0;
      steep += record.steep ? 1 : 0;
      ++rays;
    }
  }
  RecordProperty("rays", rays);
  RecordProperty("doubtful", doubtful);
  RecordProperty("steep", steep);
  EXPECT_LE(doubtful, rays / 1000);
  EXPECT_LE(steep, rays / 200);
}

} // namespace
} // namespace lightledger::properties
