#include <lightledger/trace/launch.hpp>

#include <gtest/gtest.h>

#include <cmath>
#include <vector>

namespace lightledger::trace {
namespace {

using assembly::Field;
using assembly::Grid;
using assembly::Light;
using assembly::Rings;
using assembly::Scattered;

Light disc(assembly::Sampling sampling) {
  Light light;
  light.wavelengths = {{550.0}};
  light.beam.radius = 5.0;
  light.sampling = sampling;
  return light;
}

std::vector<PupilPoint> points(const Light& light) {
  const Pupil pupil(light);
  std::vector<PupilPoint> all;
  for (int replicate = 0; replicate < replicates; ++replicate)
    for (std::uint64_t number = 0; number < pupil.size(); ++number)
      if (const PupilPoint point = pupil.point(number, replicate); point.weight > 0.0)
        all.push_back(point);
  return all;
}

double mean_r_power(const std::vector<PupilPoint>& all, int power) {
  double sum = 0.0;
  double weight = 0.0;
  for (const PupilPoint& point : all) {
    sum += point.weight * std::pow(std::hypot(point.x, point.y), power);
    weight += point.weight;
  }
  return sum / weight;
}

RayBlock one_ray(const Light& light, const Field& field) {
  const Pupil pupil(light);
  RayBlock block;
  const Footprint disc{light.beam.at, {light.beam.radius, 0.0}, {0.0, light.beam.radius}};
  Launcher(Source(light, field), pupil, disc).fill(block, 0, 0, 1);
  EXPECT_EQ(block.count, 1);
  return block;
}

TEST(Pupil, AGridTakesTheCellsWhoseCentresLieOnTheDisc) {
  // Of 4 × 4 cells the four corners have their centres at (±0.75, ±0.75), outside.
  EXPECT_EQ(points(disc(Grid{4})).size(), 12U);
}

TEST(Pupil, AGridLeavesOutTheHole) {
  Light light = disc(Grid{4});
  light.beam.inner = 2.5;
  // The four central cells have their centres at r = 0.354.
  EXPECT_EQ(points(light).size(), 8U);
}

TEST(Pupil, RingsIntegrateEvenPowersOfTheRadiusExactly) {
  const auto all = points(disc(Rings{3, 5}));
  EXPECT_EQ(all.size(), 15U);
  for (const int power : {2, 4, 6, 8, 10})
    EXPECT_NEAR(mean_r_power(all, power), 2.0 / (power + 2.0), 1e-14) << power;
}

TEST(Pupil, SpokesStartHalfAStepFromX) {
  const auto all = points(disc(Rings{1, 4}));
  EXPECT_NEAR(std::atan2(all[0].y, all[0].x), std::atan(1.0), 1e-14);
}

TEST(Pupil, AHoleMapsTheRingsIntoWhatItLeaves) {
  Light light = disc(Rings{6, 3});
  light.beam.inner = 3.0;
  const double inner = 0.36;
  const auto all = points(light);
  for (const PupilPoint& point : all)
    EXPECT_GT(std::hypot(point.x, point.y), 0.6);
  EXPECT_NEAR(mean_r_power(all, 2), 0.5 * (1.0 + inner), 1e-14);
}

TEST(Pupil, AGaussianWeighsByIrradianceOfItsOneOverESquaredRadius) {
  Light light = disc(Rings{1, 1});
  light.beam.gaussian = 5.0;
  const auto all = points(light);
  EXPECT_NEAR(all[0].weight, std::exp(-2.0 * 0.5), 1e-14); // the one node lies at r² = 1/2
}

TEST(Pupil, AScatteredCountIsRoundedUpToAMultipleOfSixteen) {
  EXPECT_EQ(points(disc(Scattered{17})).size(), 32U);
}

TEST(Pupil, AScatteredSetIsEvenPerArea) {
  const auto all = points(disc(Scattered{4096}));
  // Sixteen shifted lattices of 256: each is even to 1/256 of the area, their mean to a quarter of that.
  EXPECT_NEAR(mean_r_power(all, 2), 0.5, 1e-3);
  EXPECT_NEAR(mean_r_power(all, 4), 1.0 / 3.0, 1e-3);
}

TEST(Pupil, ReplicatesOfAScatteredSetDiffer) {
  const Pupil pupil(disc(Scattered{64}));
  EXPECT_NE(pupil.point(0, 0).x, pupil.point(0, 1).x);
}

TEST(Launcher, AFieldAtInfinityTravelsAlongItsTangents) {
  const RayBlock block = one_ray(disc(Scattered{16}), Field{{10.0, -20.0}, 1.0, {}});
  const double tan_x = std::tan(10.0 * std::atan(1.0) / 45.0);
  const double tan_y = -std::tan(20.0 * std::atan(1.0) / 45.0);
  EXPECT_NEAR(block.d[0][0] / block.d[2][0], tan_x, 1e-15);
  EXPECT_NEAR(block.d[1][0] / block.d[2][0], tan_y, 1e-15);
}

TEST(Launcher, AFiniteObjectSendsRaysFromItsPoint) {
  Light light = disc(Scattered{16});
  light.object_distance = 100.0;
  const RayBlock block = one_ray(light, Field{{3.0, 4.0}, 1.0, {}});
  const double back = -100.0 / block.d[2][0];
  EXPECT_NEAR(block.p[0][0] + back * block.d[0][0], 3.0, 1e-13);
  EXPECT_NEAR(block.p[1][0] + back * block.d[1][0], 4.0, 1e-13);
}

TEST(Launcher, ANegativeDistanceConvergesOnAPointDownstream) {
  Light light = disc(Scattered{16});
  light.object_distance = -100.0;
  const RayBlock block = one_ray(light, Field{{3.0, 4.0}, 1.0, {}});
  EXPECT_GT(block.d[2][0], 0.0);
  const double ahead = 100.0 / block.d[2][0];
  EXPECT_NEAR(block.p[0][0] + ahead * block.d[0][0], 3.0, 1e-13);
  EXPECT_NEAR(block.p[1][0] + ahead * block.d[1][0], 4.0, 1e-13);
}

TEST(Launcher, AnObjectHoweverFarSendsRaysAsOneAtInfinity) {
  Light light = disc(Scattered{16});
  light.object_distance = 1e308;
  EXPECT_EQ(one_ray(light, Field{}).d[2][0], 1.0);
}

TEST(Launcher, TheBasisIsTheDoublePoleOne) {
  // The smallest rotation of z onto (sin a, 0, cos a) takes x to (cos a, 0, −sin a) and leaves y.
  const RayBlock block = one_ray(disc(Scattered{16}), Field{{30.0, 0.0}, 1.0, {}});
  EXPECT_NEAR(block.u[0][0], std::cos(std::atan(1.0) * 30.0 / 45.0), 1e-15);
  EXPECT_NEAR(block.u[1][0], 0.0, 1e-15);
  EXPECT_NEAR(block.u[2][0], -0.5, 1e-15);
}

TEST(Launcher, TheDiscIsShiftedByAt) {
  Light light = disc(Rings{1, 1});
  light.beam.at = {7.0, 8.0};
  const RayBlock block = one_ray(light, Field{});
  EXPECT_NEAR(std::hypot(block.p[0][0] - 7.0, block.p[1][0] - 8.0), 5.0 * std::sqrt(0.5), 1e-14);
}

} // namespace
} // namespace lightledger::trace
