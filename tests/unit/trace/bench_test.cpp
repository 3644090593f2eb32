#include "support/walk.hpp"

#include <lightledger/trace/bench.hpp>

#include <gtest/gtest.h>

#include <Eigen/LU>
#include <cmath>
#include <numbers>
#include <string>

namespace lightledger::trace {
namespace {

using Eigen::Vector3d;

const std::string light = "light: {wavelengths: [550], beam: {radius: 5}}\n";

Bench laid_out(const std::string& train) {
  return support::ready(light + "train:\n" + train).train.bench;
}

assembly::Faults layout_faults(const std::string& train) {
  const assembly::Assembly assembly = support::loaded(light + "train:\n" + train);
  assembly::Faults faults;
  EXPECT_FALSE(lay_out(assembly, faults));
  return faults;
}

void expect_near(const Vector3d& got, const Vector3d& expected) {
  EXPECT_LT((got - expected).norm(), 1e-14) << got.transpose() << " instead of " << expected.transpose();
}

TEST(Bench, ATiltOf45DegreesAboutXSendsTheAxisToPlusY) {
  const Bench bench = laid_out("- {name: fold, does: reflect, tilt: [45, 0, 0], backing: Al, gap: 20}\n"
                               "- {name: end, does: detect}\n");
  expect_near(bench.leaving[0].axes.col(2), {0, 1, 0});
  expect_near(bench.arriving[1].origin, {0, 20, 0});
}

TEST(Bench, FramesStayRightHandedBehindAMirror) {
  const Bench bench = laid_out("- {name: fold, does: reflect, tilt: [30, 20, 10], backing: Al, gap: 20}\n"
                               "- {name: end, does: detect}\n");
  EXPECT_NEAR(bench.leaving[0].axes.determinant(), 1.0, 1e-14);
}

TEST(Bench, XBehindAMirrorIsTheReflectedX) {
  const Bench bench = laid_out("- {name: fold, does: reflect, tilt: [0, 45, 0], backing: Al, gap: 20}\n"
                               "- {name: end, does: detect}\n");
  // Ry(45) turns the normal to (1, 0, 1)/√2: the axis goes to −x, and x to −z.
  expect_near(bench.leaving[0].axes.col(2), {-1, 0, 0});
  expect_near(bench.leaving[0].axes.col(0), {0, 0, -1});
}

TEST(Bench, RotationsActInTheOrderRxRyRzOnColumnVectors) {
  // Rx(90) Ry(90) x = Rx(90)(−z) = y; in the other order x would go to −z.
  expect_near(rotation({90, 90, 0}) * Vector3d::UnitX(), {0, 1, 0});
  expect_near(rotation({0, 0, 90}) * Vector3d::UnitX(), {0, 1, 0});
}

TEST(Bench, RotationsByQuarterTurnsAreExact) {
  for (const double angle : {-270.0, -180.0, -90.0, 90.0, 180.0, 450.0}) {
    const Eigen::Matrix3d turn = rotation({angle, 0, 0});
    EXPECT_EQ(turn, Eigen::Matrix3d(turn.array().round()));
  }
}

TEST(Bench, TheAxisPassesStraightThroughATiltedRefractingStation) {
  const Bench bench = laid_out("- {name: front, into: fused-silica, tilt: [30, 0, 0], gap: 5}\n"
                               "- {name: rear, into: air, tilt: [30, 0, 0], gap: 7}\n"
                               "- {name: end, does: detect}\n");
  expect_near(bench.arriving[2].origin, {0, 0, 12});
}

TEST(Bench, AShiftMovesTheVertexAlongTheArrivingAxesAndNotTheAxis) {
  const Bench bench =
      laid_out("- {name: fold, does: reflect, shift: [1, 2], tilt: [45, 0, 0], backing: Al, gap: 20}\n"
               "- {name: end, does: detect, shift: [3, 0]}\n");
  expect_near(bench.surface[0].origin, {1, 2, 0});
  expect_near(bench.arriving[1].origin, {0, 20, 0});
  expect_near(bench.surface[1].origin, {3, 20, 0});
}

TEST(Bench, ATurnRotatesTheAxisAfterTheReflectionAndTheGapRunsAlongIt) {
  const Bench bench =
      laid_out("- {name: fold, does: reflect, tilt: [45, 0, 0], turn: [0, 90, 0], backing: Al, gap: 10}\n"
               "- {name: end, does: detect}\n");
  // Behind the fold z' = y and x' = x; a turn by 90° about y' sends z' to x'.
  expect_near(bench.arriving[1].origin, {10, 0, 0});
}

TEST(Bench, FocusBehindAnIdealisedMirrorIsHalfItsRadius) {
  const Bench bench = laid_out("- {name: bowl, does: reflect, radius: -200, backing: Al, gap: focus}\n"
                               "- {name: end, does: detect}\n");
  EXPECT_NEAR(bench.gap[0], 100.0, 1e-12);
}

TEST(Bench, AVirtualFocusIsAFaultAtItsGap) {
  const auto faults = layout_faults("- {name: front, radius: -50, into: fused-silica, gap: 2}\n"
                                    "- {name: rear, into: air, gap: focus}\n"
                                    "- {name: end, does: detect}\n");
  ASSERT_EQ(faults.count(), 1U);
  EXPECT_NE(faults.kept()[0].message.find("virtual"), std::string::npos);
  EXPECT_EQ(faults.kept()[0].mark.line, 4);
}

TEST(Bench, AnInfinitelyFarFocusIsAFault) {
  const auto faults = layout_faults("- {name: front, into: fused-silica, gap: 2}\n"
                                    "- {name: rear, into: air, gap: focus}\n"
                                    "- {name: end, does: detect}\n");
  ASSERT_EQ(faults.count(), 1U);
  EXPECT_NE(faults.kept()[0].message.find("infinitely far"), std::string::npos);
}

TEST(Bench, AnAxisInAMirrorsPlaneIsAFaultAtItsTilt) {
  const auto faults = layout_faults("- {name: fold, does: reflect, tilt: [90, 0, 0], backing: Al, gap: 2}\n"
                                    "- {name: end, does: detect}\n");
  ASSERT_EQ(faults.count(), 1U);
  EXPECT_NE(faults.kept()[0].message.find("plane of mirror 'fold'"), std::string::npos);
  EXPECT_EQ(faults.kept()[0].mark.line, 3);
}

TEST(Bench, ARearFaceStandsBehindItsFrontAlongTheNormal) {
  const Bench bench = laid_out("- {name: splitter, does: reflect, tilt: [45, 0, 0], shift: [1, 0], "
                               "backing: fused-silica, rear: {thickness: 3}, gap: 20}\n"
                               "- {name: end, does: detect}\n");
  expect_near(bench.surface[1].origin, Vector3d(1, 0, 0) + 3 / std::numbers::sqrt2 * Vector3d(0, -1, 1));
  EXPECT_EQ(bench.surface[1].axes, bench.surface[0].axes);
}

TEST(Bench, ARearFaceIsBehindAlsoWhereTheFrontFacesTheOtherWay) {
  const Bench bench = laid_out("- {name: splitter, does: reflect, tilt: [180, 0, 0], backing: fused-silica, "
                               "rear: {thickness: 3}, gap: 20}\n"
                               "- {name: end, does: detect}\n");
  expect_near(bench.surface[1].origin, {0, 0, 3});
}

TEST(Bench, AWedgeTurnsTheRearFaceAboutTheFrontsOwnAxes) {
  const Bench bench = laid_out("- {name: splitter, does: reflect, tilt: [0, 0, 90], backing: fused-silica, "
                               "rear: {thickness: 3, wedge: [30, 0]}, gap: 20}\n"
                               "- {name: end, does: detect}\n");
  // Rz(90) carries the front's own x to y; about it Rx(30) sends the normal z to (sin 30, 0, cos 30).
  expect_near(bench.surface[1].axes.col(2), {0.5, 0, std::sqrt(0.75)});
}

TEST(Bench, APlateCannotBeMetFromBehind) {
  const assembly::Faults faults = layout_faults(
      "- {name: splitter, does: reflect, tilt: [45, 0, 0], backing: air, rear: {thickness: 1}, gap: 5}\n"
      "- {name: one, does: reflect, tilt: [-45, 0, 0], backing: Al, gap: 5}\n"
      "- {name: two, does: reflect, tilt: [-45, 0, 0], backing: Al, gap: 10}\n"
      "- {name: three, does: reflect, tilt: [-45, 0, 0], backing: Al}\n"
      "- {again: splitter, does: reflect, gap: 5}\n"
      "- {name: end, does: detect}\n");
  ASSERT_EQ(faults.count(), 1U);
  EXPECT_EQ(faults.kept()[0].message, "'splitter again' is met from behind, where its 'rear' stands");
}

} // namespace
} // namespace lightledger::trace
