#include "reference/bench.hpp"
#include "reference/random_parts.hpp"
#include "reference/shape.hpp"
#include "reference/tracer.hpp"
#include "reference/train.hpp"

#include <gtest/gtest.h>

#include <cmath>

namespace lightledger::reference {
namespace {

Ray parallel_to_the_axis(double height) {
  return {{0.0, height, -10.0}, Vector::UnitZ()};
}

/// Where a ray comes closest to a point.
double distance_to(const Vector& point, const Step& ray) {
  return (point - ray.point).cross(ray.direction).norm();
}

Step through_one_surface(const Train& train, const Ray& ray) {
  const RayRecord record = trace(lay_out(train.assembly), train.assembly, 550.0, ray);
  return record.steps.at(0);
}

TEST(ReferenceSag, FollowsTheEquationOfIso10110) {
  assembly::Asphere shape{50.0, -0.5, {}};
  shape.terms[1] = 1e-6;
  shape.terms[3] = -2e-9;
  const Sag at_ten = sag_at(shape, 10.0);
  EXPECT_NEAR(at_ten.sag, 1.0130506338833465, 1e-15);
  EXPECT_NEAR(at_ten.slope, 0.20483050891044216, 1e-16);
}

TEST(ReferenceMeeting, AsphereWithoutTermsIsItsConic) {
  const Frame place{{0.1, -0.2, 3.0}, rotation({3.0, -5.0, 20.0})};
  const Ray ray{{2.0, 5.0, -4.0}, Vector(0.05, -0.2, 1.0).normalized()};
  for (const double conic : {-3.0, -1.0, -0.4, 0.0, 0.8})
    for (const double radius : {-25.0, 12.0}) {
      const auto closed_form = meet(assembly::Conic{radius, conic}, place, ray).hit;
      const auto iterated = meet(assembly::Asphere{radius, conic, {}}, place, ray).hit;
      ASSERT_TRUE(closed_form && iterated);
      EXPECT_NEAR(closed_form->distance, iterated->distance, 1e-13);
      EXPECT_LT(closed_form->normal.cross(iterated->normal).norm(), 1e-13);
    }
}

TEST(ReferenceMeeting, LiesOnTheSurface) {
  Dice dice(7);
  const assembly::Asphere flat{std::numeric_limits<double>::infinity(), 0.0, {}};
  for (int i = 0; i < 300; ++i) {
    assembly::Asphere shape{flat};
    const assembly::Shape drawn = random_shape(dice, 4.0);
    if (const auto* asphere = std::get_if<assembly::Asphere>(&drawn))
      shape = *asphere;
    const Frame place{{dice.around_zero(1.0), dice.around_zero(1.0), 5.0},
                      rotation({dice.around_zero(20.0), dice.around_zero(20.0), dice.around_zero(180.0)})};
    const Ray ray{{dice.around_zero(4.0), dice.around_zero(4.0), -30.0},
                  Vector(dice.around_zero(0.1), dice.around_zero(0.1), 1.0).normalized()};
    const auto hit = meet(shape, place, ray).hit;
    if (!hit)
      continue;
    const Vector local = place.local(hit->point);
    EXPECT_NEAR(local.z(), sag_at(shape, local.head<2>().norm()).sag, 1e-13);
    EXPECT_LT((ray.point + hit->distance * ray.direction - hit->point).norm(), 1e-13);
  }
}

TEST(ReferenceMeeting, TakesThePartOfTheSphereThatHoldsTheVertex) {
  const auto hit = meet(assembly::Sphere{10.0}, Frame{}, parallel_to_the_axis(6.0)).hit;
  ASSERT_TRUE(hit);
  EXPECT_NEAR(hit->point.z(), 2.0, 1e-15);
  EXPECT_NEAR(hit->distance, 12.0, 1e-14);
}

TEST(ReferenceMeeting, MissesBeyondTheEquator) {
  EXPECT_FALSE(meet(assembly::Sphere{10.0}, Frame{}, parallel_to_the_axis(10.1)).hit);
  EXPECT_FALSE(meet(assembly::Asphere{10.0, 0.0, {}}, Frame{}, parallel_to_the_axis(10.1)).hit);
}

TEST(ReferenceMeeting, OfTwoPointsTakesTheOneNearerToTheTangentPlane) {
  const Ray slanting{{-8.0, 0.0, 0.0},
                     Vector(1.0, 0.0, 0.5).normalized()}; // meets z = x²/20 at x ≈ −4.2 and 14.2
  const auto hit = meet(assembly::Conic{10.0, -1.0}, Frame{}, slanting).hit;
  ASSERT_TRUE(hit);
  EXPECT_NEAR(hit->point.x(), 5.0 - std::sqrt(105.0), 1e-13);
}

TEST(ReferenceMeeting, DoubtsARayAtTheEquator) {
  EXPECT_TRUE(meet(assembly::Sphere{10.0}, Frame{}, parallel_to_the_axis(10.0 - 1e-12)).doubtful);
  EXPECT_FALSE(meet(assembly::Sphere{10.0}, Frame{}, parallel_to_the_axis(9.9)).doubtful);
}

// Exactly stigmatic surfaces: Descartes, Dioptrique (1637); Born & Wolf, 7th ed., §4.2.
TEST(ReferenceMeeting, ParaboloidMirrorCollectsAllZonesInItsFocus) {
  Train train;
  train.reflect(assembly::Conic{-100.0, -1.0}, train.medium(1.0, 5.0));
  for (const double height : {1.0, 10.0, 20.0})
    EXPECT_LT(distance_to({0.0, 0.0, -50.0}, through_one_surface(train, parallel_to_the_axis(height))),
              1e-13);
}

TEST(ReferenceMeeting, EllipsoidRefractsAllZonesToItsFarFocus) {
  Train train;
  train.refract(assembly::Conic{50.0, -1.0 / 2.25}, train.medium(1.5));
  for (const double height : {1.0, 10.0, 30.0})
    EXPECT_LT(distance_to({0.0, 0.0, 150.0}, through_one_surface(train, parallel_to_the_axis(height))),
              1e-13);
}

TEST(ReferenceMeeting, HyperboloidRefractsAllZonesOutOfGlass) {
  Train train;
  train.assembly.light.medium = train.medium(1.5);
  train.refract(assembly::Conic{-50.0, -2.25}, 0);
  train.surface().before = train.assembly.light.medium;
  for (const double height : {1.0, 10.0, 20.0})
    EXPECT_LT(distance_to({0.0, 0.0, 100.0}, through_one_surface(train, parallel_to_the_axis(height))),
              1e-13);
}

TEST(ReferenceMeeting, SphereIsAplanaticForItsConjugatePoints) {
  Train train;
  train.refract(assembly::Sphere{10.0}, train.medium(1.5));
  const Vector aimed_at(0.0, 0.0, 10.0 + 15.0);
  for (const double height : {1.0, 5.0, 9.0}) {
    const Vector start(0.0, height, -3.0);
    const Step refracted = through_one_surface(train, {start, (aimed_at - start).normalized()});
    EXPECT_LT(distance_to({0.0, 0.0, 10.0 + 10.0 / 1.5}, refracted), 1e-13);
  }
}

TEST(ReferenceMeeting, SphericalMirrorCrossesTheAxisNearerForHigherZones) {
  Train train;
  train.reflect(assembly::Sphere{-100.0}, train.medium(1.0, 5.0));
  EXPECT_LT(distance_to({0.0, 0.0, -49.748109237}, through_one_surface(train, parallel_to_the_axis(10.0))),
            1e-9);
  EXPECT_LT(distance_to({0.0, 0.0, -42.264973081}, through_one_surface(train, parallel_to_the_axis(50.0))),
            1e-9);
}

} // namespace
} // namespace lightledger::reference
