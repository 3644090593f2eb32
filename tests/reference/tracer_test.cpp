#include "reference/launch.hpp"
#include "reference/tracer.hpp"
#include "reference/train.hpp"

#include <gtest/gtest.h>

#include <Eigen/SVD>
#include <cmath>
#include <numbers>

namespace lightledger::reference {
namespace {

using C = std::complex<double>;

constexpr double degree = std::numbers::pi / 180.0;
const C aluminium_800nm(2.80, 8.45);

RayRecord follow(const Train& train, const Ray& ray) {
  return trace(lay_out(train.assembly), train.assembly, train.assembly.light.wavelengths.front().nm, ray);
}

/// Mirrors of aluminium with these tilts, one mm apart, seen along the axis.
PolarizationMatrix mirrors(const std::vector<std::array<double, 3>>& tilts) {
  Train train;
  const auto aluminium = train.medium(aluminium_800nm.real(), aluminium_800nm.imag());
  for (const auto& tilt : tilts)
    train.reflect(assembly::Plane{}, aluminium, 1.0).tilt(tilt[0], tilt[1], tilt[2]);
  return follow(train.detect(), {{0.0, 0.0, -1.0}, Vector::UnitZ()}).steps.back().P;
}

// W. J. Smith, Modern Optical Engineering, 3rd ed., ch. 10, example B: a skew ray through a bi-convex lens.
class SkewRay : public testing::Test {
protected:
  SkewRay() {
    const auto glass = train.medium(1.5);
    train.refract(assembly::Sphere{50.0}, glass, 15.0)
        .refract(assembly::Sphere{-50.0}, 0, 65.517241)
        .detect();
    record = follow(train, {{0.0, 20.0, -200.0}, Vector(0.1, -0.1, std::sqrt(0.98))});
  }
  Train train;
  RayRecord record;
};

TEST_F(SkewRay, MeetsTheSurfacesWhereComputed) {
  EXPECT_LT((record.steps[0].local_point - Vector(20.654614039, -0.654614039, 4.470247098)).norm(), 2e-9);
  EXPECT_LT((record.steps[1].local_point - Vector(20.116292819, -1.046031578, -4.237126607)).norm(), 2e-9);
  EXPECT_LT((record.steps[2].local_point - Vector(-8.456089036, -7.078613566, 0.0)).norm(), 2e-9);
}

TEST_F(SkewRay, HasThePrintedAnglesAndDirections) {
  EXPECT_NEAR(record.steps[0].cos_incidence, 0.8588247, 5e-6);
  EXPECT_NEAR(record.steps[1].cos_incidence, 0.8772472, 5e-6);
  EXPECT_LT((record.steps[1].direction - Vector(-0.377839604, -0.079774532, 0.922427915)).norm(), 2e-9);
}

TEST_F(SkewRay, HasTheComputedOpticalPath) {
  EXPECT_NEAR(record.steps[2].optical_path, 291.658132264, 1e-9);
}

// The matrix of full fields: flux-normalised amplitudes over the square root of the flux factor.
TEST_F(SkewRay, TurnsThePolarizationAsComputed) {
  Eigen::Matrix3d expected;
  expected << 0.935605866, 0.041894982, -0.471954069, -0.035927827, 0.991613519, 0.023212904, 0.488539881,
      -0.005490849, 0.881888265;
  const Vector k(0.1, -0.1, std::sqrt(0.98));
  const Vector k_out = record.steps[1].direction;
  const PolarizationMatrix transverse = record.steps[1].P - (k_out * k.transpose()).cast<C>();
  const Eigen::Matrix3cd found = transverse / std::sqrt(0.865664867532) + (k_out * k.transpose()).cast<C>();
  EXPECT_LT((found - expected.cast<C>()).norm(), 3e-9);
}

TEST_F(SkewRay, HasTheComputedDiattenuation) {
  const Eigen::Vector3d values =
      record.steps[1].P.jacobiSvd().singularValues(); // 1 along k, and the two of the field
  EXPECT_NEAR(values[1] * values[1], 0.966502538, 1e-9);
  EXPECT_NEAR(values[2] * values[2], 0.852613810, 1e-9);
}

TEST(ReferenceTracer, DisplacesTheRayThroughATiltedPlate) {
  Train train;
  const auto glass = train.medium(1.5);
  const double gap = 10.0 / std::cos(30.0 * degree);
  train.refract(assembly::Plane{}, glass, gap).tilt(30.0, 0.0, 0.0).refract(assembly::Plane{}, 0, 20.0);
  train.tilt(30.0, 0.0, 0.0).detect();
  const Step end = follow(train, {{0.0, 0.0, -5.0}, Vector::UnitZ()}).steps.back();
  EXPECT_NEAR(std::abs(end.local_point.y()), 1.9381378215, 1e-9);
  EXPECT_LT((end.direction - Vector::UnitZ()).norm(), 1e-15);
}

TEST(ReferenceTracer, DeviatesLeastInSymmetricPassageOfAPrism) {
  Train train;
  const auto glass = train.medium(1.5168);
  train.refract(assembly::Plane{}, glass, 10.0).tilt(0.0, -30.0, 0.0);
  train.refract(assembly::Plane{}, 0, 10.0).tilt(0.0, 30.0, 0.0).detect();
  const double arriving = std::asin(1.5168 * 0.5) - 30.0 * degree;
  const Vector in(std::sin(arriving), 0.0, std::cos(arriving));
  const Step end = follow(train, {-5.0 * in, in}).steps.back();
  EXPECT_NEAR(std::acos(end.direction.dot(in)) / degree, 38.646695472, 1e-9);
}

// Lam & Chipman, Appl. Opt. 54, 3236 (2015): the second mirror's p lies on the first one's s.
TEST(ReferenceTracer, CrossedFoldsCompensate) {
  const PolarizationMatrix P = mirrors({{0.0, -45.0, 0.0}, {-45.0, 0.0, 0.0}});
  const C both(0.776301224, 0.375930003);
  PolarizationMatrix expected = PolarizationMatrix::Zero();
  expected(0, 1) = expected(2, 0) = both;
  expected(1, 2) = 1.0;
  EXPECT_LT((P - expected).norm(), 2e-9);
}

TEST(ReferenceTracer, PeriscopeSquaresBothAmplitudes) {
  const PolarizationMatrix P = mirrors({{0.0, -45.0, 0.0}, {0.0, -45.0, 0.0}});
  const Eigen::Vector3cd expected(C(0.677037883, 0.464479528), C(0.865472970, 0.268338553), 1.0);
  EXPECT_LT((P - PolarizationMatrix(expected.asDiagonal())).norm(), 2e-9);
}

TEST(ReferenceTracer, KMirrorChainsItsAmplitudes) {
  const PolarizationMatrix P = mirrors({{0.0, 60.0, 0.0}, {0.0, 30.0, 0.0}, {0.0, 60.0, 0.0}});
  EXPECT_LT(std::abs(P(0, 0) - C(0.322804802, 0.622641707)), 2e-9);
  EXPECT_LT(std::abs(P(1, 1) - C(-0.809849419, -0.339245541)), 2e-9);
}

// The hollow corner cube of Yun, Crabtree & Chipman, Appl. Opt. 50, 2855 (2011), along (1, 1, 1), in
// aluminium.
TEST(ReferenceTracer, CornerCubeHasTheComputedMatrix) {
  Train train;
  const auto aluminium = train.medium(aluminium_800nm.real(), aluminium_800nm.imag());
  for (int face = 0; face < 3; ++face)
    train.reflect(assembly::Plane{}, aluminium);
  Bench bench = lay_out(train.assembly);
  bench.stations[0].surface = {{1.0, 0.0, 0.0}, rotation({0.0, 90.0, 0.0})};
  bench.stations[1].surface = {{0.0, 2.0, 0.0}, rotation({-90.0, 0.0, 0.0})};
  bench.stations[2].surface = {{0.0, 0.0, 3.0}, Rotation::Identity()};
  const Vector k = Vector(1.0, 1.0, 1.0).normalized();
  const RayRecord record = trace(bench, train.assembly, 550.0, {Vector::Zero(), k});

  PolarizationMatrix expected;
  expected << C(0.055058653, 0.351707800), C(-0.529733471, -0.182233136), C(-0.525325182, -0.169474664),
      C(-0.526982288, -0.169644800), C(0.056715759, 0.351877936), C(-0.529733471, -0.182233136),
      C(-0.528076366, -0.182063000), C(-0.526982288, -0.169644800), C(0.055058653, 0.351707800);
  EXPECT_LT((record.steps[2].P - expected).norm(), 3e-9);
  EXPECT_LT((record.steps[2].direction + k).norm(), 1e-15);
}

TEST(ReferenceTracer, AbsorbsAlongTheOwnPathOfTheRay) {
  Train train(1000.0);
  const auto glass = train.medium(1.5, 1e-6);
  train.refract(assembly::Plane{}, glass, 100.0).refract(assembly::Plane{}, 0).detect();
  const RayRecord record = follow(train, {Vector::Zero(), Vector::UnitZ()});
  const double absorbance = 4.0 * std::numbers::pi * 1e-6 / 1e-3 * 100.0;
  EXPECT_NEAR(record.steps[0].bulk, 0.96 * -std::expm1(-absorbance), 1e-14);
  EXPECT_NEAR(record.steps[1].incident, 0.96 * std::exp(-absorbance), 1e-14);
}

// Bennett & Porteus, JOSA 51, 123 (1961): 3.942767e-4 for 1 nm at 632.8 nm and normal incidence.
TEST(ReferenceTracer, ScattersWhatRoughnessTakesFromTheReflectedBeam) {
  Train train(632.8);
  train.reflect(assembly::Plane{}, train.medium(1.0, 5.0));
  train.surface().roughness_nm = 1.0;
  const Step step = follow(train, {-Vector::UnitZ(), Vector::UnitZ()}).steps[0];
  EXPECT_NEAR(step.scattered / (step.scattered + step.onward), 3.942767e-4, 5e-11);
}

TEST(ReferenceTracer, SendsTotallyReflectedLightAside) {
  Train train;
  const auto glass = train.medium(1.5);
  train.refract(assembly::Plane{}, glass, 1.0)
      .refract(assembly::Plane{}, 0, 1.0)
      .tilt(45.0, 0.0, 0.0)
      .detect();
  const RayRecord record = follow(train, {-Vector::UnitZ(), Vector::UnitZ()});
  ASSERT_EQ(record.steps.size(), 2U);
  EXPECT_NEAR(record.steps[1].aside, 0.96, 1e-15);
  EXPECT_EQ(record.steps[1].onward, 0.0);
}

TEST(ReferenceTracer, EntersWhatAnOpaqueBackingTakesAsAbsorbed) {
  Train train;
  train.reflect(assembly::Plane{}, train.medium(1.44, 5.23), 1.0).detect();
  const Step step = follow(train, {-Vector::UnitZ(), Vector::UnitZ()}).steps[0];
  EXPECT_NEAR(step.onward, 0.827060783931, 1e-12);
  EXPECT_NEAR(step.absorbed, 1.0 - 0.827060783931, 1e-12);
  EXPECT_EQ(step.aside, 0.0);
}

TEST(ReferenceLaunch, AimsConvergingLightAtItsPoint) {
  assembly::Light light;
  light.object_distance = -100.0;
  const Ray ray = launch(light, {{1.0, 2.0}, 1.0, {}}, {3.0, 4.0});
  EXPECT_LT((ray.direction - Vector(-2.0, -2.0, 100.0).normalized()).norm(), 1e-15);
}

TEST(ReferenceLaunch, CarriesTheTransverseAxesByTheSmallestRotation) {
  const Vector k = Vector(0.3, -0.2, 1.0).normalized();
  const auto basis = double_pole_basis(k);
  Eigen::Matrix3d turn;
  turn << basis, k;
  EXPECT_LT((turn * turn.transpose() - Eigen::Matrix3d::Identity()).norm(), 1e-15);
  EXPECT_NEAR((turn.trace() - 1.0) / 2.0, k.z(), 1e-15); // turns by no more than the angle between z and k
}

} // namespace
} // namespace lightledger::reference
