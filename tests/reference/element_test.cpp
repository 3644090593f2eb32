#include "reference/tracer.hpp"
#include "reference/train.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <numbers>

namespace lightledger::reference {
namespace {

using C = std::complex<double>;
using assembly::Polarizer;
using assembly::Retarder;
using assembly::Rotator;

constexpr double degree = std::numbers::pi / 180.0;

RayRecord follow(const Train& train, const Vector& direction = Vector::UnitZ()) {
  return trace(lay_out(train.assembly), train.assembly, train.assembly.light.wavelengths.front().nm,
               {Vector::Zero(), direction});
}

/// What becomes of a field on the axis.
Eigen::Vector2cd behind(const Train& train, const Eigen::Vector2cd& field) {
  return follow(train).steps.back().P.topLeftCorner<2, 2>() * field;
}

Train with(const assembly::Effect& effect) {
  Train train;
  train.element(effect).detect();
  return train;
}

TEST(ReferenceElement, PolarizerFollowsMalus) {
  Train train = with(Polarizer{30.0, 1.0, 0.0});
  train.assembly.light.polarization = optics::linear(70.0);
  const Step step = follow(train).steps.front();
  EXPECT_NEAR(step.onward, std::pow(std::cos(40.0 * degree), 2), 1e-15);
  EXPECT_NEAR(step.absorbed, std::pow(std::sin(40.0 * degree), 2), 1e-15);
}

TEST(ReferenceElement, QuarterWaveAlongXTurnsLinear45IntoRightHanded) {
  const Eigen::Vector2cd field = behind(with(Retarder{0.0, 90.0, {}}), {std::sqrt(0.5), std::sqrt(0.5)});
  EXPECT_NEAR(2.0 * (std::conj(field[0]) * field[1]).imag(), 1.0, 1e-15); // S3
}

TEST(ReferenceElement, RetardanceScalesWithTheInverseWavelength) {
  const Eigen::Vector2cd field = behind(with(Retarder{0.0, 60.0, 1100.0}), {0.0, 1.0}); // at 550 nm
  EXPECT_LT(std::abs(field[1] - std::polar(1.0, 120.0 * degree)), 1e-15);
}

TEST(ReferenceElement, RotatorTurnsXTowardY) {
  const Eigen::Vector2cd field = behind(with(Rotator{20.0, Rotator::Kind::active}), {1.0, 0.0});
  EXPECT_LT((field - Eigen::Vector2cd(std::cos(20.0 * degree), std::sin(20.0 * degree))).norm(), 1e-15);
}

TEST(ReferenceElement, AxisIsProjectedAcrossAnObliqueRay) {
  const Vector k = Vector(0.5, 0.0, 1.0).normalized();
  const PolarizationMatrix P = follow(with(Polarizer{45.0, 1.0, 0.0}), k).steps.front().P;
  const Vector axis(std::sqrt(0.5), std::sqrt(0.5), 0.0);
  const Vector a = (axis - axis.dot(k) * k).normalized();
  EXPECT_LT((P - (a * a.transpose() + k * k.transpose()).cast<C>()).norm(), 1e-15);
}

/// Through a rotator to a mirror and back: the field in bench coordinates.
Eigen::Vector2cd there_and_back(const Rotator& rotator) {
  Train train;
  train.element(rotator, 5.0)
      .reflect(assembly::Plane{}, train.medium(1.0, 1e9))
      .again(0, assembly::Act::pass);
  return behind(train.detect(), {1.0, 0.0});
}

TEST(ReferenceElement, FaradayRotatorTurnsOnThatWayOnTheWayBack) {
  const Eigen::Vector2cd field = there_and_back({25.0, Rotator::Kind::faraday});
  EXPECT_NEAR((field[1] / field[0]).real(), std::tan(50.0 * degree), 1e-14);
}

TEST(ReferenceElement, ActiveRotatorTurnsBackOnTheWayBack) {
  EXPECT_LT(std::abs(there_and_back({25.0, Rotator::Kind::active})[1]), 1e-15);
}

} // namespace
} // namespace lightledger::reference
