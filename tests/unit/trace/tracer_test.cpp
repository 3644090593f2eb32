#include "support/walk.hpp"

#include <lightledger/trace/interact.hpp>
#include <lightledger/trace/tracer.hpp>

#include <gtest/gtest.h>

#include <cmath>

namespace lightledger::trace {
namespace {

using support::Ready;
using support::ready;

std::string train(const std::string& light) {
  return "light: {" + light + "}\n" +
         "media: {glass: {index: 1.5}}\n"
         "train:\n"
         "- {name: front, radius: 40, into: glass, clear: {diameter: 9}, gap: 4}\n"
         "- {name: rear, radius: -60, into: air, gap: 10}\n"
         "- {name: end, does: detect, clear: {diameter: 8}}\n";
}

const std::string two_by_two =
    "wavelengths: [{at: 500, weight: 1}, {at: 600, weight: 3}], fields: [[0, 0], {at: [0, 5], weight: 2}], ";

bool same(const Ledger& a, const Ledger& b) {
  for (std::size_t i = 0; i < a.rows.size(); ++i)
    if (a.rows[i].onward != b.rows[i].onward || a.rows[i].clipped != b.rows[i].clipped ||
        a.rows[i].incidence != b.rows[i].incidence)
      return false;
  return true;
}

TEST(Tracer, GivesTheSameBitsOnAnyNumberOfThreads) {
  const Ready r = ready(train(two_by_two + "beam: {radius: 5}, rays: {pattern: scattered, count: 4096}"));
  const Traced one = trace(r.train, {.threads = 1});
  for (const int threads : {2, 3, 7})
    EXPECT_TRUE(same(one.total, trace(r.train, {.threads = threads}).total)) << threads;
}

TEST(Tracer, CountsTheRaysOfAllWavelengthsAndFields) {
  const Ready r = ready(train(two_by_two + "beam: {radius: 5}, rays: {pattern: scattered, count: 100}"));
  EXPECT_EQ(trace(r.train).rays, 4U * 112U);
}

TEST(Tracer, SharesFollowTheWeights) {
  const Ready r = ready(train(two_by_two + "beam: {radius: 5}, rays: {pattern: grid, across: 8}"));
  const Traced traced = trace(r.train);
  ASSERT_EQ(traced.groups.size(), 4U);
  EXPECT_DOUBLE_EQ(traced.groups[0].share, 0.25 / 3.0);
  EXPECT_DOUBLE_EQ(traced.groups[3].share, 0.75 * 2.0 / 3.0);
}

TEST(Tracer, AStandardErrorComesFromScatteredSetsAlone) {
  EXPECT_TRUE(trace(ready(train("wavelengths: [550], beam: {radius: 5}, "
                                "rays: {pattern: scattered, count: 256}"))
                        .train)
                  .standard_error);
  EXPECT_FALSE(trace(ready(train("wavelengths: [550], beam: {radius: 5}, "
                                 "rays: {pattern: rings, rings: 4, spokes: 8}"))
                         .train)
                   .standard_error);
}

TEST(Tracer, DoublesItsRaysUntilTheStandardErrorIsBelowTheAccuracy) {
  const Ready coarse = ready(train("wavelengths: [550], beam: {radius: 5}, rays: {accuracy: 1.0e-2}"));
  const Ready fine = ready(train("wavelengths: [550], beam: {radius: 5}, rays: {accuracy: 1.0e-4}"));
  EXPECT_EQ(trace(coarse.train).rays, 4096U);
  const Traced traced = trace(fine.train);
  EXPECT_GT(traced.rays, 4096U);
  EXPECT_LT(*traced.standard_error, 1e-4);
  EXPECT_TRUE(traced.accurate);
}

TEST(Tracer, StopsAtTwoToTheTwentyRaysAndSaysSo) {
  const Traced traced =
      trace(ready(train("wavelengths: [550], beam: {radius: 5}, rays: {accuracy: 1.0e-12}")).train);
  EXPECT_EQ(traced.rays, std::uint64_t{1} << 20);
  EXPECT_FALSE(traced.accurate);
}

TEST(Tracer, TheStandardErrorCoversTheError) {
  // An aperture of 9 mm in a beam of 10 mm: the clipped share is 1 − 0.81.
  const Traced traced =
      trace(ready("light: {wavelengths: [550], beam: {radius: 5}, rays: {pattern: scattered, count: 8192}}\n"
                  "train:\n"
                  "- {name: iris, does: stop, clear: {diameter: 9, at: [0.5, 0]}, gap: 1}\n"
                  "- {name: end, does: detect}\n")
                .train);
  EXPECT_GT(*traced.standard_error, 0.0);
  EXPECT_NEAR(traced.total.delivered(), 0.81, 3.0 * *traced.standard_error);
}

/// Adds up what arrives.
class Counter : public Sink {
public:
  double power = 0.0;

  [[nodiscard]] std::unique_ptr<Sink> fresh() const override { return std::make_unique<Counter>(); }
  void take(const Arrivals& arrivals) override {
    for (int lane = 0; lane < arrivals.rays.count; ++lane)
      if (((arrivals.rays.alive >> lane) & 1U) != 0)
        for (const auto& row : arrivals.rays.J)
          power += 0.5 * arrivals.rays.w[lane] * row[lane] * row[lane];
  }
  void merge(const Sink& other) override { power += dynamic_cast<const Counter&>(other).power; }
};

TEST(Tracer, HandsEveryArrivalToTheSink) {
  const Ready r =
      ready(train("wavelengths: [550], beam: {radius: 5}, rays: {pattern: scattered, count: 1024}"));
  Counter counter;
  const Traced traced = trace(r.train, {.sink = &counter});
  EXPECT_NEAR(counter.power / 1024.0, traced.total.delivered(), 1e-14);
}

TEST(Closure, SeesAnAmplitudeThatIsWrongByOnePartInTenToTheNine) {
  const Ready r = ready(train("wavelengths: [550], beam: {radius: 4}"));
  const Plan& plan = r.train.plans[0];
  const optics::Coherency unpolarized;
  const auto error = [&](double scale) {
    Ledger ledger(3);
    ledger.launched = 1.0;
    RayBlock block = support::ray({1, 2, 0}, {0, 0, 1});
    for (StationId visit = 0; visit < 3; ++visit) {
      Entry entry;
      interact(plan.legs[visit], plan.ops[2 * visit], unpolarized, block,
               {&block, nullptr, nullptr, &entry, false});
      ledger.enter(visit, entry);
      if (visit == 1)
        for (auto& row : block.J)
          row[0] *= scale;
    }
    return std::abs(ledger.closure_error());
  };
  EXPECT_LT(error(1.0), 1e-15);
  EXPECT_GT(error(1.0 + 1e-9), 1e-9);
}

} // namespace
} // namespace lightledger::trace
