#include "reference/random_test.hpp"
#include "reference/tracer.hpp"
#include "reference/train.hpp"
#include "reference/unfolded.hpp"

#include <gtest/gtest.h>
#include <rapidcheck/gtest.h>

#include <cmath>
#include <numbers>
#include <stdexcept>

namespace lightledger::reference {
namespace {

constexpr double degree = std::numbers::pi / 180.0;

RayRecord follow(const Train& train, const Vector& start) {
  return trace(lay_out(train.assembly), train.assembly, 550.0, {start, Vector::UnitZ()});
}

TEST(SurfaceMetAgain, IsMetFromBeyondByLightThatAMirrorSendsBack) {
  Train train;
  train.refract(assembly::Plane{}, train.medium(1.5), 4.0).tilt(10.0, 0.0, 0.0);
  train.reflect(assembly::Plane{}, train.medium(1.0, 6.0)).again(0, assembly::Act::pass, 7.0).detect();
  const Bench bench = lay_out(train.assembly);
  EXPECT_EQ(bench.stations[2].from, assembly::Side::beyond);
  EXPECT_NEAR(bench.stations[1].gap, 4.0, 1e-15);
  EXPECT_LT((bench.stations[3].arriving.origin - Vector(0.0, 0.0, -7.0)).norm(), 1e-14);
}

TEST(SurfaceMetAgain, IsMetFromBeforeByLightThatTwoMirrorsSendBack) {
  Train train;
  const auto metal = train.medium(1.0, 6.0);
  train.reflect(assembly::Plane{}, metal, 20.0).tilt(15.0, 0.0, 0.0).reflect(assembly::Plane{}, metal);
  train.again(0, assembly::Act::bounce, 3.0).detect();
  const Bench bench = lay_out(train.assembly);
  EXPECT_EQ(bench.stations[2].from, assembly::Side::before);
  EXPECT_LT((bench.stations[3].arriving.origin - Vector(0.0, 0.0, -3.0)).norm(), 1e-13);
}

TEST(SurfaceMetAgain, StandsWhereTheAxisMeetsItsTangentPlane) {
  Train train;
  train.refract(assembly::Plane{}, train.medium(1.5), 4.0).tilt(30.0, 0.0, 0.0);
  train.reflect(assembly::Plane{}, train.medium(1.0, 6.0)).tilt(10.0, 0.0, 0.0);
  train.again(0, assembly::Act::pass).detect();
  const Bench bench = lay_out(train.assembly);
  const Vector point = bench.stations[2].arriving.origin;
  EXPECT_NEAR((point - bench.stations[0].surface.origin).dot(bench.stations[0].surface.axes.col(2)), 0.0,
              1e-14);
  EXPECT_NEAR(point.y(), bench.stations[1].gap * std::sin(20.0 * degree), 1e-14);
}

TEST(SurfaceMetAgain, IsRefusedWhereTheAxisRunsAwayFromIt) {
  Train train;
  train.refract(assembly::Plane{}, train.medium(1.5), 4.0).refract(assembly::Plane{}, 0);
  EXPECT_THROW(train.again(0, assembly::Act::pass), std::domain_error);
}

TEST(SurfaceMetAgain, ASecondSurfaceMirrorTakesTheFrontTwice) {
  Train train;
  train.refract(assembly::Plane{}, train.medium(1.5), 4.0)
      .reflect(assembly::Plane{}, train.medium(1.44, 5.23));
  train.again(0, assembly::Act::pass, 7.0).detect();
  const std::complex<double> metal(1.44, 5.23);
  const double mirror = std::norm((1.5 - metal) / (1.5 + metal));
  EXPECT_NEAR(follow(train, {0.1, 0.0, -1.0}).delivered, 0.96 * mirror * 0.96, 1e-15);
}

TEST(SurfaceMetAgain, AFocusSeesItsCurvatureFromTheOtherSide) {
  Train train; // a Mangin mirror: a plane silvered behind a convex face of focal length 100 mm
  train.refract(assembly::Sphere{50.0}, train.medium(1.5), 1e-9)
      .reflect(assembly::Plane{}, train.medium(1.0, 6.0))
      .again(0, assembly::Act::pass, assembly::Focus{})
      .detect();
  EXPECT_NEAR(lay_out(train.assembly).stations[2].gap, 50.0, 1e-7);
}

/// A ray has the same powers and places on the train written out.
RC_GTEST_PROP(SurfaceMetAgain, IsASurfaceOfItsOwnWrittenOut, ()) {
  const std::uint64_t seed = any_seed();
  const assembly::Assembly assembly = random_assembly(seed, {.returning = true});
  const Bench bench = lay_out(assembly);
  const auto written_out = unfolded(assembly, bench);
  RC_PRE(written_out.has_value());
  const Bench own_bench = lay_out(*written_out);
  const double wavelength = assembly.light.wavelengths.back().nm;
  Dice dice(seed + 1);
  for (const Ray& ray : random_rays(assembly.light, dice, 8)) {
    const RayRecord shared = trace(bench, assembly, wavelength, ray);
    const RayRecord own = trace(own_bench, *written_out, wavelength, ray);
    if (!shared.comparable() || !own.comparable())
      continue;
    RC_ASSERT(own.steps.size() == shared.steps.size());
    RC_ASSERT(std::abs(own.delivered - shared.delivered) < 1e-11);
    RC_ASSERT((own.steps.back().P - shared.steps.back().P).norm() < 1e-10);
    for (std::size_t i = 0; i < own.steps.size(); ++i)
      RC_ASSERT(std::abs(own.steps[i].incident - shared.steps[i].incident) < 1e-11);
  }
}

} // namespace
} // namespace lightledger::reference
