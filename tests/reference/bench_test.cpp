#include "reference/bench.hpp"
#include "reference/train.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <stdexcept>

namespace lightledger::reference {
namespace {

TEST(ReferenceBench, FoldsTheAxisToPlusYWhenAMirrorIsTiltedBy45AboutX) {
  Train train;
  train.stop(20.0).reflect(assembly::Plane{}, train.medium(1.0, 5.0), 30.0).tilt(45.0, 0.0, 0.0).detect();
  const Bench bench = lay_out(train.assembly);
  EXPECT_LT((bench.stations[1].leaving.axes.col(2) - Vector::UnitY()).norm(), 1e-15);
  EXPECT_LT((bench.stations[1].leaving.axes.col(0) - Vector::UnitX()).norm(), 1e-15);
  EXPECT_LT((bench.stations[2].arriving.origin - Vector(0.0, 30.0, 20.0)).norm(), 1e-14);
}

TEST(ReferenceBench, KeepsEveryFrameRightHanded) {
  Train train;
  const auto metal = train.medium(1.0, 5.0);
  train.reflect(assembly::Plane{}, metal, 5.0).tilt(30.0, 10.0, 5.0);
  train.station().turn_deg = {3.0, 4.0, 5.0};
  train.reflect(assembly::Plane{}, metal, 5.0).tilt(-20.0, 15.0, 0.0).detect();
  for (const Place& place : lay_out(train.assembly).stations)
    EXPECT_NEAR(place.leaving.axes.determinant(), 1.0, 1e-15);
}

TEST(ReferenceBench, PassesTiltedAndShiftedLensFacesStraight) {
  Train train;
  train.refract(assembly::Plane{}, train.medium(1.5), 7.0).tilt(20.0, 0.0, 0.0);
  train.surface().shift = {1.0, 2.0};
  train.detect();
  const Bench bench = lay_out(train.assembly);
  EXPECT_LT((bench.stations[1].arriving.origin - Vector(0.0, 0.0, 7.0)).norm(), 1e-15);
  EXPECT_LT((bench.stations[0].surface.origin - Vector(1.0, 2.0, 0.0)).norm(), 1e-15);
}

TEST(ReferenceBench, TurnsTheAxisBehindTheStationBeforeTheGap) {
  Train train;
  train.stop(10.0);
  train.station().turn_deg = {0.0, 90.0, 0.0};
  train.detect();
  EXPECT_LT((lay_out(train.assembly).stations[1].arriving.origin - Vector(10.0, 0.0, 0.0)).norm(), 1e-14);
}

TEST(ReferenceBench, FindsTheBackFocusOfAThickLens) {
  Train train;
  const auto glass = train.medium(1.5);
  train.refract(assembly::Sphere{50.0}, glass, 15.0)
      .refract(assembly::Sphere{-50.0}, 0, assembly::Focus{})
      .detect();
  EXPECT_NEAR(lay_out(train.assembly).stations[1].gap, 47.368421053, 1e-9);
}

// The Gregorian of W. J. Smith, Modern Optical Engineering, ch. 4, exercise 1: back focus 150.
TEST(ReferenceBench, FindsTheFocusBehindTwoMirrors) {
  Train train;
  const auto metal = train.medium(1.0, 5.0);
  train.reflect(assembly::Sphere{-200.0}, metal, 130.0)
      .reflect(assembly::Sphere{-50.0}, metal, assembly::Focus{});
  train.detect();
  EXPECT_NEAR(lay_out(train.assembly).stations[1].gap, 150.0, 1e-12);
}

TEST(ReferenceBench, StartsTheMarchToTheFocusAtTheObject) {
  Train train;
  train.assembly.light.object_distance = 300.0;
  const auto first = train.medium(1.5);
  const auto second = train.medium(1.6);
  train.refract(assembly::Sphere{50.0}, first, 10.0).refract(assembly::Sphere{-50.0}, second, 2.0);
  train.refract(assembly::Plane{}, 0, assembly::Focus{}).detect();
  EXPECT_NEAR(lay_out(train.assembly).stations[2].gap, 199.684579, 1e-6); // Smith, ch. 3, fig. 3.5
}

TEST(ReferenceBench, RefusesAVirtualFocus) {
  Train train;
  train.refract(assembly::Sphere{-50.0}, train.medium(1.5), assembly::Focus{}).detect();
  EXPECT_THROW((void)lay_out(train.assembly), std::domain_error);
}

} // namespace
} // namespace lightledger::reference
