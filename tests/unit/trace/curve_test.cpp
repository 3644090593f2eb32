#include <lightledger/trace/curve.hpp>

#include <gtest/gtest.h>

#include <numbers>

namespace lightledger::trace {
namespace {

using assembly::Measured;

Measured::Point point(double reflect, double transmit, double phase = 0.0) {
  return {{reflect, reflect}, {transmit, transmit}, {reflect, reflect}, {phase, phase, phase, phase}};
}

Measured two_by_two() {
  Measured measured;
  measured.wavelengths_nm = {500, 600};
  measured.angles_deg = {0, 30};
  measured.points = {point(0.1, 0.9), point(0.2, 0.8), point(0.3, 0.7), point(0.5, 0.5)};
  return measured;
}

TEST(Curve, IsLinearInWavelengthAtEachAngle) {
  const auto points = curve(two_by_two(), 525, false);
  ASSERT_EQ(points.size(), 2U);
  EXPECT_NEAR(points[0].reflect_s, 0.15, 1e-15);
  EXPECT_NEAR(points[1].transmit_p, 0.725, 1e-15);
}

TEST(Curve, TakesTheFilesOwnRowsAtItsWavelengths) {
  EXPECT_NEAR(curve(two_by_two(), 500, false)[1].reflect_s, 0.2, 1e-15);
  EXPECT_NEAR(curve(two_by_two(), 600, false)[1].reflect_s, 0.5, 1e-15);
}

TEST(Curve, OfOneWavelengthHoldsThere) {
  Measured measured = two_by_two();
  measured.wavelengths_nm = {500};
  measured.points.resize(2);
  EXPECT_NEAR(curve(measured, 500, false)[1].reflect_s, 0.2, 1e-15);
}

TEST(Curve, PhasesGoTheShortWayRound) {
  Measured measured = two_by_two();
  measured.has_phases = true;
  measured.points[0] = point(0.1, 0.9, 3.0);
  measured.points[2] = point(0.3, 0.7, -3.0);
  // Halfway between 3.0 and −3.0 by way of π lies π, not 0.
  EXPECT_NEAR(curve(measured, 550, false)[0].phase_ts, std::numbers::pi, 1e-15);
}

TEST(Curve, TheBackReflectsWithTheReversedPhase) {
  Measured measured = two_by_two();
  measured.has_phases = true;
  measured.points[0].phases = {1.0, 2.0, 0.3, 0.4};
  measured.points[0].reflect_back = {0.07, 0.08};
  const auto points = curve(measured, 500, true);
  EXPECT_EQ(points[0].reflect_s, 0.07);
  EXPECT_NEAR(points[0].phase_rs, std::numbers::pi + 0.6 - 1.0, 1e-15);
}

TEST(Curve, OneThatShiftsRunsOverTheWavelengths) {
  Measured measured = two_by_two();
  measured.angles_deg = {0};
  measured.points.resize(2);
  measured.shift_index = 2.0;
  const auto points = curve(measured, 550, false);
  ASSERT_EQ(points.size(), 2U);
  EXPECT_EQ(points[1].x, 600);
}

} // namespace
} // namespace lightledger::trace
