#include "reference/boundary.hpp"
#include "reference/train.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <numbers>

namespace lightledger::reference {
namespace {

using assembly::Measured;

constexpr double pi = std::numbers::pi;
constexpr double degree = pi / 180.0;

Measured::Point point(double reflect, double transmit, const Measured::Phases& phases = {pi, 0.0, 0.0, 0.0}) {
  return {{reflect, reflect}, {transmit, transmit}, {0.5 * reflect, 0.5 * reflect}, phases};
}

/// At 500 and 600 nm, at 0° and 40°.
Measured four_points() {
  Measured curves;
  curves.wavelengths_nm = {500.0, 600.0};
  curves.angles_deg = {0.0, 40.0};
  curves.points = {point(0.1, 0.8), point(0.2, 0.6), point(0.3, 0.4), point(0.8, 0.1)};
  return curves;
}

MeasuredAt at(double wavelength_nm, double angle_deg) {
  return {wavelength_nm, std::sin(angle_deg * degree), 1.0, false, false};
}

TEST(ReferenceMeasured, IsBilinearInWavelengthAndAngle) {
  const Channel s = measured(four_points(), at(525.0, 10.0)).s;
  EXPECT_NEAR(s.reflected, 0.75 * (0.75 * 0.1 + 0.25 * 0.2) + 0.25 * (0.75 * 0.3 + 0.25 * 0.8), 1e-15);
  EXPECT_NEAR(s.absorbed, 1.0 - s.reflected - s.transmitted, 1e-15);
  EXPECT_NEAR(std::norm(s.r), s.reflected, 1e-15);
}

TEST(ReferenceMeasured, HoldsBeyondItsLastAngle) {
  EXPECT_NEAR(measured(four_points(), at(600.0, 70.0)).p.reflected, 0.8, 1e-15);
}

TEST(ReferenceMeasured, ReadsItsAnglesInTheMediumOfTheMeasurement) {
  MeasuredAt in_glass = at(500.0, 0.0);
  in_glass.sine_in_air = 1.5 * std::sin(20.0 * degree);
  in_glass.index = 1.5;
  EXPECT_NEAR(measured(four_points(), in_glass).s.transmitted, 0.7, 1e-15);
}

TEST(ReferenceMeasured, TransmitsAlikeFromBehindAndReflectsByItsBackColumns) {
  MeasuredAt behind = at(500.0, 20.0);
  behind.from_behind = true;
  const Channel s = measured(four_points(), behind).s;
  EXPECT_NEAR(s.transmitted, 0.7, 1e-15);
  EXPECT_NEAR(s.reflected, 0.075, 1e-15);
}

TEST(ReferenceMeasured, ReflectsAllThatItDoesNotAbsorbBeyondTheCriticalAngle) {
  MeasuredAt beyond = at(500.0, 0.0);
  beyond.total_reflection = true;
  const Channel p = measured(four_points(), beyond).p;
  EXPECT_NEAR(p.reflected, 0.9, 1e-15);
  EXPECT_EQ(p.transmitted, 0.0);
}

TEST(ReferenceMeasured, ShiftsToLongerCurveWavelengthsWithTheAngle) {
  Measured filter = four_points();
  filter.angles_deg = {0.0};
  filter.points = {point(0.0, 1.0), point(1.0, 0.0)};
  filter.shift_index = 2.0;
  const double read_at = 500.0 / std::sqrt(1.0 - 0.25 * 0.25);
  EXPECT_NEAR(measured(filter, at(500.0, 30.0)).s.reflected, (read_at - 500.0) / 100.0, 1e-14);
}

TEST(ReferenceMeasured, TakesPhasesTheShortWayRound) {
  Measured curves = four_points();
  curves.has_phases = true;
  curves.points[0].phases.rs = 170.0 * degree;
  curves.points[2].phases.rs = -160.0 * degree;
  const Complex r = measured(curves, at(550.0, 0.0)).s.r;
  EXPECT_NEAR(std::remainder(std::arg(r) - 185.0 * degree, 2.0 * pi), 0.0, 1e-14);
}

TEST(ReferenceMeasured, ReversesItsPhasesFromBehind) {
  Measured curves = four_points();
  curves.has_phases = true;
  curves.points[0].phases = {1.0, 1.0 + pi, 0.3, 0.3};
  MeasuredAt behind = at(500.0, 0.0);
  behind.from_behind = true;
  EXPECT_NEAR(std::remainder(std::arg(measured(curves, behind).s.r) - (pi + 0.6 - 1.0), 2.0 * pi), 0.0,
              1e-15);
}

TEST(ReferenceMeasured, KeepsTheSignsOfAnIdealCoatingFromBehindWithoutPhases) {
  MeasuredAt behind = at(500.0, 0.0);
  behind.from_behind = true;
  const Boundary boundary = measured(four_points(), behind);
  EXPECT_NEAR(boundary.s.r.real(), -std::sqrt(0.05), 1e-15);
  EXPECT_NEAR(boundary.p.r.real(), std::sqrt(0.05), 1e-15);
}

/// The curve is read at the angle outside, from wherever the light comes.
TEST(ReferenceMeasured, HasItsAnglesOnTheSideOppositeTheSubstrate) {
  Train train(500.0);
  train.refract(assembly::Plane{}, train.medium(1.5)).detect();
  assembly::Surface& surface = train.assembly.surfaces.front();
  surface.coating = assembly::CoatingUse{0, assembly::Side::beyond};
  train.assembly.coatings.push_back({"curves", four_points()});
  const double outside = 20.0 * degree;
  const double inside = std::asin(std::sin(outside) / 1.5);
  const Interface from_glass = interface_at(train.assembly, seen_from(assembly::Side::beyond, surface),
                                            {std::cos(inside), std::sin(inside)}, 500.0);
  EXPECT_NEAR(from_glass.boundary.s.transmitted, 0.7, 1e-15);
  EXPECT_NEAR(from_glass.boundary.s.reflected, 0.075, 1e-15);
}

} // namespace
} // namespace lightledger::reference
