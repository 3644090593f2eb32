#include "support/walk.hpp"

#include <lightledger/trace/aim.hpp>
#include <lightledger/trace/tracer.hpp>

#include <gtest/gtest.h>

#include <cmath>
#include <string>

namespace lightledger::trace {
namespace {

using support::ray;
using support::ready;

std::string camera(const std::string& light, const std::string& stop = "clear: {diameter: 4}") {
  return "light: {wavelengths: [550], beam: fill_stop, " + light + "}\n" +
         "media: {glass: {index: 1.6}}\ntrain:\n"
         "- {name: front, radius: 30, into: glass, gap: 3}\n"
         "- {name: rear, radius: 200, into: air, gap: 6}\n"
         "- {name: iris, does: stop, " +
         stop +
         ", gap: 10}\n"
         "- {name: end, does: detect}\n";
}

TEST(FillStop, EdgeRaysMeetTheEdgePointsOfTheStop) {
  const auto r = ready(camera("fields: [[0, 25]]"));
  const Footprint& foot = r.train.footprints[0];
  RayBlock block = ray({foot.centre[0] + foot.first[0], foot.centre[1] + foot.first[1], 0},
                       {0, std::tan(25.0 * std::atan(1.0) / 45.0), 1});
  const auto hit = support::walk(r.train, block).hit(2);
  // The launch points of +x and −x are mirror images, so the ellipse's tip is one of them up to the mean of
  // all four.
  EXPECT_NEAR(hit[0], 2.0, 1e-3);
}

TEST(FillStop, OnTheAxisTheEllipseIsACircleThatFillsTheStopExactly) {
  const auto r = ready(camera("fields: [[0, 0]]"));
  const Footprint& foot = r.train.footprints[0];
  EXPECT_NEAR(foot.first[0], foot.second[1], 1e-10);
  const auto hit = support::walk(r.train, ray({foot.first[0], 0, 0}, {0, 0, 1})).hit(2);
  EXPECT_NEAR(hit[0], 2.0, 1e-9);
}

TEST(FillStop, TheCentreFollowsADecentredStop) {
  const auto centred = ready(camera("fields: [[0, 0]]"));
  const auto shifted = ready(camera("fields: [[0, 0]]", "clear: {diameter: 4, at: [1, 0]}"));
  EXPECT_GT(shifted.train.footprints[0].centre[0], centred.train.footprints[0].centre[0] + 1.0);
}

TEST(FillStop, ARectangularStopIsFilledByItsHalfLengths) {
  const auto r = ready(camera("fields: [[0, 0]]", "clear: {width: 4, height: 2}"));
  const Footprint& foot = r.train.footprints[0];
  EXPECT_NEAR(foot.second[1] / foot.first[0], 0.5, 0.01);
}

TEST(FillStop, WorksBehindAFold) {
  const auto r = ready("light: {wavelengths: [550], beam: fill_stop, fields: [[3, 2]]}\ntrain:\n"
                       "- {name: fold, does: reflect, tilt: [45, 0, 0], backing: Al, gap: 20}\n"
                       "- {name: iris, does: stop, clear: {diameter: 4}, gap: 10}\n"
                       "- {name: end, does: detect}\n");
  const auto w = support::walk(r.train, [&] {
    const Footprint& foot = r.train.footprints[0];
    const double radian = std::atan(1.0) / 45.0;
    return ray({foot.centre[0], foot.centre[1], 0}, {std::tan(3 * radian), std::tan(2 * radian), 1});
  }());
  EXPECT_NEAR(w.hit(1)[0], 0.0, 1e-9);
  EXPECT_NEAR(w.hit(1)[1], 0.0, 1e-9);
}

TEST(FillStop, WorksForANearObject) {
  const auto r = ready(camera("object: {distance: 40}, fields: [[0, 8]]"));
  const Footprint& foot = r.train.footprints[0];
  const auto hit = support::walk(r.train, ray({foot.centre[0], foot.centre[1], 0},
                                              {foot.centre[0], foot.centre[1] - 8.0, 40}))
                       .hit(2);
  EXPECT_NEAR(hit[1], 0.0, 0.01);
}

TEST(FillStop, AStopThatCannotBeReachedSaysWhy) {
  const assembly::Assembly assembly =
      support::loaded("light: {wavelengths: [550], beam: fill_stop}\n"
                      "media: {glass: {index: 1.6}}\ntrain:\n"
                      "- {name: ball front, radius: 2, into: glass, gap: 3}\n"
                      "- {name: ball rear, radius: -2, into: air, gap: 1}\n"
                      "- {name: iris, does: stop, clear: {diameter: 40}, gap: 10}\n"
                      "- {name: end, does: detect}\n");
  assembly::Faults faults;
  EXPECT_FALSE(prepare(assembly, faults));
  ASSERT_EQ(faults.count(), 1U);
  EXPECT_NE(faults.kept()[0].message.find("no rays of field 1 fill the stop 'iris': they "),
            std::string::npos)
      << faults.kept()[0].message;
}

} // namespace
} // namespace lightledger::trace
