#include "reference/ledger.hpp"
#include "reference/random_test.hpp"
#include "reference/reversal.hpp"

#include <gtest/gtest.h>
#include <rapidcheck/gtest.h>

#include <algorithm>
#include <numeric>

namespace lightledger::reference {
namespace {

constexpr int rays_each = 8;

/// A random assembly, laid out, with some rays of its light.
struct Case {
  assembly::Assembly assembly;
  Bench bench;
  std::vector<Ray> rays;

  explicit Case(std::uint64_t seed, const Variety& variety = {})
      : assembly(random_assembly(seed, variety)), bench(lay_out(assembly)) {
    Dice dice(seed + 1);
    rays = random_rays(assembly.light, dice, rays_each);
  }
  [[nodiscard]] double wavelength() const { return assembly.light.wavelengths.front().nm; }
  [[nodiscard]] RayRecord follow(const Ray& ray) const { return trace(bench, assembly, wavelength(), ray); }
};

TEST(RandomAssembly, RepeatsWithItsSeed) {
  const Case once(5);
  const Case again(5);
  EXPECT_EQ(once.assembly.stations.size(), again.assembly.stations.size());
  EXPECT_EQ(once.follow(once.rays[0]).delivered, again.follow(again.rays[0]).delivered);
}

TEST(RandomAssembly, LetsMostRaysThroughAndLosesSomeInEveryWay) {
  Ledger all;
  int delivered = 0;
  constexpr int seeds = 400;
  for (std::uint64_t seed = 0; seed < seeds; ++seed) {
    const Case sample(seed);
    for (const Ray& ray : sample.rays) {
      const RayRecord record = sample.follow(ray);
      all.enter(record, 1.0);
      delivered +=
          record.steps.size() == sample.assembly.stations.size() && record.steps.back().inside ? 1 : 0;
    }
  }
  EXPECT_GT(delivered, seeds * rays_each / 2);
  const auto sum = [&](double StationLedger::*column) {
    return std::accumulate(all.stations.begin(), all.stations.end(), 0.0,
                           [&](double total, const StationLedger& line) { return total + line.*column; });
  };
  for (const auto column :
       {&StationLedger::missed, &StationLedger::clipped, &StationLedger::aside, &StationLedger::absorbed,
        &StationLedger::scattered, &StationLedger::extra, &StationLedger::bulk})
    EXPECT_GT(sum(column), 0.001 * all.launched);
}

/// How many of the assemblies of many seeds hold something.
template <typename Holds>
int count_of(Holds holds) {
  int count = 0;
  for (std::uint64_t seed = 0; seed < 400; ++seed)
    count += holds(random_assembly(seed)) ? 1 : 0;
  return count;
}

template <typename Effect>
bool holds_effect(const assembly::Assembly& assembly) {
  return std::any_of(
      assembly.surfaces.begin(), assembly.surfaces.end(),
      [](const assembly::Surface& surface) { return std::holds_alternative<Effect>(surface.effect); });
}

TEST(RandomAssembly, HoldsAllElementsOften) {
  EXPECT_GT(count_of(holds_effect<assembly::Polarizer>), 40);
  EXPECT_GT(count_of(holds_effect<assembly::Retarder>), 40);
  EXPECT_GT(count_of(holds_effect<assembly::Rotator>), 40);
}

TEST(RandomAssembly, HoldsMeasuredCoatingsOften) {
  EXPECT_GT(count_of([](const assembly::Assembly& assembly) {
              return std::any_of(assembly.coatings.begin(), assembly.coatings.end(),
                                 [](const assembly::Coating& coating) {
                                   return std::holds_alternative<assembly::Measured>(coating.kind);
                                 });
            }),
            80);
}

TEST(RandomAssembly, MeetsSurfacesAgainFromBothSides) {
  const auto from = [](assembly::Side side) {
    return count_of([side](const assembly::Assembly& assembly) {
      const Bench bench = lay_out(assembly);
      for (std::size_t i = 0; i < bench.stations.size(); ++i)
        if (first_visit(assembly, i) != i && bench.stations[i].from == side)
          return true;
      return false;
    });
  };
  EXPECT_GT(from(assembly::Side::before), 20);
  EXPECT_GT(from(assembly::Side::beyond), 40);
}

RC_GTEST_PROP(ReferenceProperty, EveryRayIsAccountedFor, ()) {
  const Case sample(any_seed());
  for (const Ray& ray : sample.rays) {
    const RayRecord record = sample.follow(ray);
    RC_ASSERT(std::abs(1.0 - record.delivered - lost(record)) < 1e-12);
  }
}

RC_GTEST_PROP(ReferenceProperty, LosslessTrainsKeepAllPower, ()) {
  const Case sample(any_seed(), {.lossless = true});
  for (const Ray& ray : sample.rays) {
    const RayRecord record = sample.follow(ray);
    double kept = record.delivered;
    for (const Step& step : record.steps)
      kept += step.aside + step.missed;
    RC_ASSERT(std::abs(kept - 1.0) < 1e-12);
    for (const Step& step : record.steps)
      RC_ASSERT(step.bulk == 0.0 && step.scattered == 0.0 && step.extra == 0.0);
  }
}

RC_GTEST_PROP(ReferenceProperty, AMovedBenchMovesTheResult, ()) {
  const std::uint64_t seed = any_seed();
  const Case sample(seed);
  Dice dice(seed + 2);
  const Frame motion{{dice.around_zero(5.0), dice.around_zero(5.0), dice.around_zero(5.0)},
                     rotation({dice.around_zero(180.0), dice.around_zero(90.0), dice.around_zero(180.0)})};
  const Bench elsewhere = moved(sample.bench, motion);
  for (const Ray& ray : sample.rays) {
    const RayRecord here = sample.follow(ray);
    const RayRecord there = trace(elsewhere, sample.assembly, sample.wavelength(),
                                  {motion.bench(ray.point), motion.axes * ray.direction});
    if (here.doubtful || there.doubtful)
      continue;
    RC_ASSERT(here.steps.size() == there.steps.size());
    const PolarizationMatrix carried = motion.axes.cast<std::complex<double>>() * here.steps.back().P *
                                       motion.axes.transpose().cast<std::complex<double>>();
    RC_ASSERT((carried - there.steps.back().P).norm() < 1e-11);
  }
}

/// Helmholtz reciprocity: the ray that runs back has the transposed matrix, magnets reversed.
RC_GTEST_PROP(ReferenceProperty, TheWayBackHasTheTransposedMatrix, ()) {
  const Case sample(any_seed(), {.reversible = true});
  const Reversed reverse = reversed(sample.assembly, sample.bench);
  const Bench reverse_bench = lay_out(reverse.assembly);
  const Frame& entrance = reverse.entrance;
  const PolarizationMatrix axes = entrance.axes.cast<std::complex<double>>();
  for (const Ray& ray : sample.rays) {
    const RayRecord there = sample.follow(ray);
    if (!there.comparable() || there.steps.size() < sample.assembly.stations.size())
      continue;
    const RayRecord back =
        trace(reverse_bench, reverse.assembly, sample.wavelength(), returning(there, entrance));
    if (!back.comparable() || !same_places(there, back, entrance))
      continue;
    const Step& end = back.steps[back.steps.size() - 2];
    RC_ASSERT((axes * end.P * axes.adjoint() - there.steps[there.steps.size() - 2].P.transpose()).norm() <
              1e-10);
    RC_ASSERT((entrance.axes * end.direction + ray.direction).norm() < 1e-10);
  }
}

} // namespace
} // namespace lightledger::reference
