#include "support/walk.hpp"

#include <lightledger/trace/interact.hpp>

#include <gtest/gtest.h>

#include <cmath>
#include <numbers>

namespace lightledger::trace {
namespace {

using support::ray;
using support::ready;
using support::Walk;
using support::walk;

constexpr double degree = std::numbers::pi / 180.0;

const std::string head =
    "light: {wavelengths: [550], beam: {radius: 5}}\n"
    "media: {glass: {index: 1.5}, grey: {index: 1.5, kappa: 1.0e-6}}\n"
    "coatings: {half: {ideal: {reflect: 0.5}}, weak: {ideal: {reflect: 0.3, transmit: 0.6}}}\n"
    "train:\n";
const std::string end = "- {name: end, does: detect}\n";

Walk walked(const std::string& train, const RayBlock& launched, optics::State state = {}) {
  return walk(ready(head + train).train, launched, state);
}

double sum_of_fates(const Entry& entry) {
  return entry.onward + entry.missed + entry.clipped + entry.aside + entry.absorbed + entry.scattered +
         entry.extra;
}

TEST(Intersection, OfASphereIsTheNearerToTheTangentPlane) {
  // The line y = 6 meets the sphere about z = 10 at z = 2 and z = 18; the second lies beyond the equator.
  const Walk w = walked("- {name: face, radius: 10, into: glass, gap: 5}\n" + end, ray({0, 6, 0}, {0, 0, 1}));
  EXPECT_NEAR(w.hit(0)[2], 2.0, 1e-15);
}

TEST(Intersection, BeyondTheEquatorThereIsNoSurface) {
  // This slanting ray meets the sphere about z = 10 at z = 10.4 and 17.7, on its far half alone.
  const Walk w =
      walked("- {name: face, radius: 10, into: glass, gap: 5}\n" + end, ray({0, 15.2, 0}, {0, -0.5, 1}));
  EXPECT_EQ(w.ledger.rows[0].missed, 1.0);
}

TEST(Intersection, ARayThatPassesBesideTheSphereIsMissed) {
  const Walk w =
      walked("- {name: face, radius: 10, into: glass, gap: 5}\n" + end, ray({0, 10.5, 0}, {0, 0, 1}));
  EXPECT_EQ(w.ledger.rows[0].missed, 1.0);
  EXPECT_EQ(w.ledger.rows[0].incident, 1.0);
}

TEST(Intersection, OfAHyperboloidIsOnTheSheetThatHoldsTheVertex) {
  // z = r²/(R(1 + √(1 − (1+K) r²/R²))) with R = −50, K = −2.25 at r = 10.
  const Walk w = walked("- {name: face, radius: -50, conic: -2.25, into: glass, gap: 50}\n" + end,
                        ray({0, 10, 0}, {0, 0, 1}));
  EXPECT_NEAR(w.hit(0)[2], -100.0 / (50.0 * (1.0 + std::sqrt(1.0 + 1.25 * 0.04))), 1e-14);
}

TEST(Intersection, OfAnAsphereOnAPlaneBaseFollowsItsTerms) {
  const Walk w = walked("- {name: face, asphere: {A3: 1.0e-4, A4: -2.0e-5}, into: glass, gap: 5}\n" + end,
                        ray({3, 4, -1}, {0, 0, 1}));
  EXPECT_NEAR(w.hit(0)[2], 1e-4 * 125.0 - 2e-5 * 625.0, 1e-15);
}

TEST(Intersection, ANewtonThatDoesNotArriveIsMissedAndNeverNaN) {
  const Walk w = walked("- {name: face, radius: 5, asphere: {A4: 1.0}, into: glass, gap: 5}\n" + end,
                        ray({0, 30, 0}, {0, 0.9, 1}));
  EXPECT_EQ(w.ledger.rows[0].missed, 1.0);
}

TEST(Intersection, OfASteepAsphereIsTheNearestToTheTangentPlane) {
  // z = r⁴/100 met by a ray that falls toward the axis: it crosses one wall, then the other.
  const Walk w = walked("- {name: face, asphere: {A4: 1.0e-2}, into: glass, gap: 5}\n" + end,
                        ray({0, 6, 3}, {0, -3, -1}));
  const auto hit = w.hit(0);
  EXPECT_NEAR(hit[2], 1e-2 * std::pow(hit[1], 4), 1e-13);
  // Along the ray z = 1 + y/3; of its crossings, at y = 3.893 and y = −2.243, the second is nearer to z = 0.
  EXPECT_NEAR(hit[2], 1.0 + hit[1] / 3.0, 1e-13);
  EXPECT_NEAR(hit[1], -2.243, 1e-3);
}

TEST(Intersection, ARayMayRunBackwardsAndIsToldOf) {
  const Walk w =
      walked("- {name: deep, radius: 10, into: glass, gap: 1}\n- {name: back, into: air, gap: 1}\n" + end,
             ray({0, 8, 0}, {0, 0, 1}));
  EXPECT_GT(w.ledger.rows[0].backward, 0.9);
}

TEST(Clear, KeepsItsEdgeInside) {
  const std::string stop = "- {name: iris, does: stop, clear: {diameter: 10}, gap: 5}\n" + end;
  EXPECT_EQ(walked(stop, ray({3, 4, 0}, {0, 0, 1})).ledger.rows[0].onward, 1.0);
  EXPECT_EQ(walked(stop, ray({3, 4.0000001, 0}, {0, 0, 1})).ledger.rows[0].clipped, 1.0);
}

TEST(Clear, OfARectangleIsGivenInFullLengths) {
  const std::string stop =
      "- {name: iris, does: stop, clear: {width: 8, height: 2, at: [1, 0]}, gap: 5}\n" + end;
  EXPECT_EQ(walked(stop, ray({4.9, 0.9, 0}, {0, 0, 1})).ledger.rows[0].onward, 1.0);
  EXPECT_EQ(walked(stop, ray({-3.1, 0, 0}, {0, 0, 1})).ledger.rows[0].clipped, 1.0);
  EXPECT_EQ(walked(stop, ray({1, 1.1, 0}, {0, 0, 1})).ledger.rows[0].clipped, 1.0);
}

TEST(Clear, OfAnEllipseIsGivenInFullLengths) {
  const std::string stop = "- {name: iris, does: stop, clear: {ellipse: [8, 4]}, gap: 5}\n" + end;
  EXPECT_EQ(walked(stop, ray({3.9, 0, 0}, {0, 0, 1})).ledger.rows[0].onward, 1.0);
  EXPECT_EQ(walked(stop, ray({3.9, 0.6, 0}, {0, 0, 1})).ledger.rows[0].clipped, 1.0);
}

TEST(Clear, AHoleAloneIsAnObscuration) {
  const std::string stop = "- {name: spider, does: stop, clear: {hole: {diameter: 6}}, gap: 5}\n" + end;
  EXPECT_EQ(walked(stop, ray({2.9, 0, 0}, {0, 0, 1})).ledger.rows[0].clipped, 1.0);
  EXPECT_EQ(walked(stop, ray({3.1, 0, 0}, {0, 0, 1})).ledger.rows[0].onward, 1.0);
}

TEST(Refraction, ObeysSnellsLaw) {
  const Walk w = walked("- {name: face, into: glass, gap: 5}\n" + end,
                        ray({0, 0, 0}, {std::sin(40 * degree), 0, std::cos(40 * degree)}));
  EXPECT_NEAR(w.direction(0)[0], std::sin(40 * degree) / 1.5, 1e-15);
}

TEST(Refraction, IsExactAtNormalIncidence) {
  const Walk w = walked("- {name: face, radius: 30, into: glass, gap: 5}\n" + end, ray({0, 0, 0}, {0, 0, 1}));
  EXPECT_EQ(w.direction(0)[2], 1.0);
  EXPECT_NEAR(w.ledger.rows[0].onward, 0.96, 1e-15);
}

TEST(Refraction, NearNormalIncidenceKeepsTheBasisTransverse) {
  for (const double tilt : {1e-17, 1e-15, 1e-13, 1e-10, 1e-7}) {
    const Walk w = walked("- {name: face, into: glass, gap: 5}\n" + end, ray({0, 0, 0}, {tilt, tilt, 1}));
    const RayBlock& behind = w.behind[0];
    double along = 0.0;
    double length = 0.0;
    for (int axis = 0; axis < 3; ++axis) {
      along += behind.u[axis][0] * behind.d[axis][0];
      length += behind.u[axis][0] * behind.u[axis][0];
    }
    EXPECT_NEAR(along, 0.0, 1e-15) << tilt;
    EXPECT_NEAR(length, 1.0, 4e-16) << tilt;
    EXPECT_NEAR(w.ledger.rows[0].onward, 0.96, 1e-14) << tilt;
  }
}

TEST(Refraction, BeyondTheCriticalAngleSendsEverythingAside) {
  const Walk w =
      walked("- {name: in, into: glass, gap: 0}\n- {name: out, tilt: [45, 0, 0], into: air, gap: 5}\n" + end,
             ray({0, 0, 0}, {0, 0, 1}));
  EXPECT_NEAR(w.ledger.rows[1].aside, 0.96, 1e-15);
  EXPECT_EQ(w.ledger.rows[1].onward, 0.0);
  EXPECT_EQ(w.ledger.rows[1].absorbed, 0.0);
  EXPECT_EQ(w.behind[1].alive, 0U);
}

TEST(Reflection, OfAnOpaqueBackingAbsorbsWhatItDoesNotReflect) {
  const Walk w = walked("- {name: fold, does: reflect, tilt: [45, 0, 0], backing: Al, gap: 5}\n" + end,
                        ray({0, 0, 0}, {0, 0, 1}));
  const Entry& row = w.ledger.rows[0];
  EXPECT_EQ(row.aside, 0.0);
  EXPECT_GT(row.absorbed, 0.05);
  EXPECT_NEAR(row.onward + row.absorbed, 1.0, 1e-15);
}

TEST(Reflection, OfATransparentBackingLeaksWhatItDoesNotReflect) {
  const Walk w = walked("- {name: plate, does: reflect, tilt: [45, 0, 0], backing: glass, gap: 5}\n" + end,
                        ray({0, 0, 0}, {0, 0, 1}));
  EXPECT_EQ(w.ledger.rows[0].absorbed, 0.0);
  EXPECT_NEAR(w.ledger.rows[0].onward, 0.5 * (0.0920133630455 + 0.00846645897895), 1e-12);
}

TEST(IdealCoating, SplitsThePowerAsStatedAndAbsorbsTheRest) {
  const Walk w =
      walked("- {name: face, into: glass, coating: weak, gap: 5}\n" + end, ray({0, 0, 0}, {0.3, 0, 1}));
  EXPECT_NEAR(w.ledger.rows[0].onward, 0.6, 1e-15);
  EXPECT_NEAR(w.ledger.rows[0].aside, 0.3, 1e-15);
  EXPECT_NEAR(w.ledger.rows[0].absorbed, 0.1, 1e-15);
}

TEST(IdealCoating, ReflectsBeyondTheCriticalAngleWhatItDoesNotAbsorb) {
  const Walk w = walked("- {name: in, into: glass, coating: half, gap: 0}\n"
                        "- {name: out, tilt: [60, 0, 0], into: air, coating: weak, gap: 5}\n" +
                            end,
                        ray({0, 0, 0}, {0, 0, 1}));
  EXPECT_NEAR(w.ledger.rows[1].aside, 0.5 * 0.9, 1e-15);
  EXPECT_NEAR(w.ledger.rows[1].absorbed, 0.5 * 0.1, 1e-15);
}

TEST(Bulk, FollowsTheRaysOwnPath) {
  const double tangent = 0.4;
  const Walk w = walked("- {name: in, into: grey, gap: 50}\n- {name: out, into: air, gap: 5}\n" + end,
                        ray({0, 0, 0}, {tangent, 0, 1}));
  const double sin2 = tangent / std::hypot(tangent, 1.0) / 1.5;
  const double path_nm = 50e6 / std::sqrt(1.0 - sin2 * sin2);
  const double expected = -std::expm1(-4.0 * std::numbers::pi * 1e-6 / 550.0 * path_nm);
  EXPECT_NEAR(w.ledger.rows[0].bulk / w.ledger.rows[0].onward, expected, 1e-12);
  EXPECT_NEAR(w.ledger.rows[1].incident, w.ledger.rows[0].onward - w.ledger.rows[0].bulk, 1e-15);
}

TEST(Bulk, IsEnteredAlsoForRaysThatAreThenClipped) {
  const Walk w = walked("- {name: in, into: grey, gap: 50}\n"
                        "- {name: out, into: air, clear: {hole: {diameter: 2}}, gap: 5}\n" +
                            end,
                        ray({0, 0, 0}, {0, 0, 1}));
  EXPECT_GT(w.ledger.rows[0].bulk, 0.1);
  EXPECT_NEAR(w.ledger.rows[1].clipped, w.ledger.rows[0].onward - w.ledger.rows[0].bulk, 1e-15);
}

TEST(Bulk, MissedRaysLoseNone) {
  const Walk w =
      walked("- {name: in, into: grey, gap: 50}\n- {name: out, radius: 3, into: air, gap: 5}\n" + end,
             ray({0, 4, 0}, {0, 0, 1}));
  EXPECT_EQ(w.ledger.rows[0].bulk, 0.0);
  EXPECT_DOUBLE_EQ(w.ledger.rows[1].missed, w.ledger.rows[0].onward);
}

TEST(Losses, AreTakenInTheOrderScatterThenExtra) {
  const Walk w = walked(
      "- {name: fold, does: reflect, coating: half, backing: glass, roughness: 20, loss: 0.1, gap: 5}\n" +
          end,
      ray({0, 0, 0}, {0, 0, 1}));
  const double x = 4.0 * std::numbers::pi * 20.0 / 550.0;
  const double scattered = 0.5 * -std::expm1(-x * x);
  EXPECT_NEAR(w.ledger.rows[0].scattered, scattered, 1e-15);
  EXPECT_NEAR(w.ledger.rows[0].extra, 0.1 * (0.5 - scattered), 1e-15);
  EXPECT_NEAR(w.ledger.rows[0].onward, 0.9 * (0.5 - scattered), 1e-15);
}

TEST(Losses, TransmittedScatterGoesWithTheStepOfTheNormalComponents) {
  const Walk w =
      walked("- {name: face, into: glass, roughness: 30, gap: 5}\n" + end, ray({0, 0, 0}, {0, 0, 1}));
  const double x = 2.0 * std::numbers::pi * 30.0 * 0.5 / 550.0;
  EXPECT_NEAR(w.ledger.rows[0].scattered, 0.96 * -std::expm1(-x * x), 1e-15);
}

TEST(BothBeams, ComeFromOneStepAndShareThePower) {
  const support::Ready r = ready(head + "- {name: face, radius: 40, into: glass, gap: 5}\n" + end);
  const Plan& plan = r.train.plans[0];
  RayBlock pass;
  RayBlock bounce;
  Entry entry;
  interact(plan.legs[0], plan.ops[0], optics::coherency({}), ray({3, 1, 0}, {0.1, 0, 1}),
           {&pass, &bounce, nullptr, &entry, false});
  double reflected = 0.0;
  for (const auto& row : bounce.J)
    reflected += 0.5 * row[0] * row[0];
  EXPECT_EQ(bounce.alive, 1U);
  EXPECT_LT(bounce.d[2][0], 0.0);
  EXPECT_NEAR(reflected, entry.aside, 1e-16);
  EXPECT_NEAR(sum_of_fates(entry), entry.incident, 1e-15);
}

TEST(Polarization, ReversesHandednessInAMirrorAtNormalIncidence) {
  // Behind a mirror the frame is right-handed about the returning axis: an ideal one changes S2 and S3.
  const Walk w =
      walked("- {name: mirror, does: reflect, coating: half, gap: 5}\n" + end, ray({0, 0, 0}, {0, 0, 1}));
  const RayBlock& out = w.behind[0];
  // E in bench coordinates: Jx → −x, Jy → −y (r_s = −r_p in bases s, p = k × s).
  double ex[2] = {0, 0};
  for (int axis = 0; axis < 2; ++axis) {
    const double v = axis == 0 ? out.d[1][0] * out.u[2][0] - out.d[2][0] * out.u[1][0]
                               : out.d[2][0] * out.u[0][0] - out.d[0][0] * out.u[2][0];
    ex[axis] = out.J[0][0] * out.u[axis][0] + out.J[4][0] * v;
  }
  EXPECT_NEAR(ex[0], -std::sqrt(0.5), 1e-15);
  EXPECT_NEAR(ex[1], 0.0, 1e-15);
}

} // namespace
} // namespace lightledger::trace
