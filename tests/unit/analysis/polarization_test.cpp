#include "support/walk.hpp"

#include <lightledger/analysis/polarization.hpp>

#include <fmt/format.h>
#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <cmath>
#include <numbers>
#include <string>

namespace lightledger::analysis {
namespace {

using testing::DoubleNear;
using testing::ElementsAre;
using testing::IsEmpty;
using testing::Optional;

constexpr double degree = std::numbers::pi / 180.0;

Polarization polarization_of(const std::string& yaml, const PolarizationOptions& options = {}) {
  const PolarizationResult result = polarization(support::loaded(yaml), options);
  EXPECT_TRUE(result.polarization.has_value());
  return result.polarization.value_or(Polarization{});
}

/// Light of 500 nm along the axis, its state and its train.
std::string on_axis(const std::string& state, const std::string& train) {
  return "light: {wavelengths: [500], polarization: " + state +
         ", beam: {radius: 1}, rays: {pattern: rings, rings: 2, spokes: 8}}\n"
         "media: {metal: {index: 0.5, kappa: 5}, glass: {index: 1.5}}\n"
         "coatings: {full: {ideal: {reflect: 1}}, third: {ideal: {reflect: {s: 0.9, p: 0.6}, transmit: {s: "
         "0, p: 0}}}}\n"
         "train:\n" +
         train + "- {name: end, does: detect}\n";
}

double share_of(std::optional<double> value) {
  EXPECT_TRUE(value.has_value());
  return value.value_or(std::nan(""));
}

// Malus: cos².
TEST(Polarization, OfTwoPolarizersFollowsMalus) {
  for (const double angle : {0.0, 17.0, 60.0, 90.0}) {
    const Polarization p =
        polarization_of(on_axis("{linear: 0}", fmt::format("- {{name: p, polarize: {{axis: 0}}, gap: 1}}\n"
                                                           "- {{name: a, polarize: {{axis: {}}}, gap: 1}}\n",
                                                           angle)));
    EXPECT_NEAR(p.detector.stokes[0], std::pow(std::cos(angle * degree), 2), 1e-15);
  }
}

// Crossed polarizers with a plate between: sin²(2θ) sin²(δ/2).
TEST(Polarization, OfAPlateBetweenCrossedPolarizersIsTheTextbooks) {
  const double theta = 21.0;
  const double delta = 77.0;
  const Polarization p = polarization_of(
      on_axis("unpolarized", fmt::format("- {{name: p, polarize: {{axis: 0}}, gap: 1}}\n"
                                         "- {{name: plate, retard: {{axis: {}, degrees: {}}}, gap: 1}}\n"
                                         "- {{name: a, polarize: {{axis: 90}}, gap: 1}}\n",
                                         theta, delta)));
  const double expected = 0.5 * std::pow(std::sin(2.0 * theta * degree) * std::sin(0.5 * delta * degree), 2);
  EXPECT_NEAR(p.detector.mueller[0][0], expected, 1e-15);
}

TEST(Polarization, OfAQuarterWavePlateIsRightHanded) {
  const Polarization p =
      polarization_of(on_axis("{linear: 45}", "- {name: plate, retard: {axis: 0, waves: 0.25}, gap: 1}\n"));
  EXPECT_NEAR(p.detector.stokes[3], 1.0, 1e-14);
  EXPECT_THAT(p.detector.retardance_deg, Optional(DoubleNear(90.0, 1e-11)));
  EXPECT_THAT(p.chief->retardance_deg, Optional(DoubleNear(90.0, 1e-11)));
}

// The retardance of a plate of m waves at λ0 is 2π m λ0/λ. Spread evenly over the wavelengths of a list it
// shrinks S2 and S3 by the mean of exp(iδ); evenly in 1/λ that is a sinc (a sum of n terms: sin(n d)/(n sin
// d)).
TEST(Polarization, OfAThickPlateOverABandDepolarizesBySinc) {
  constexpr int count = 64;
  const double waves = 40.25;
  const double half_width = 0.35; // of the band in waves of retardance
  std::string list;
  for (int n = 0; n < count; ++n)
    list += fmt::format("{}{:.17g}", n == 0 ? "" : ", ",
                        500.0 * waves / (waves + half_width * (2.0 * (n + 0.5) / count - 1.0)));
  const Polarization p = polarization_of(
      "light: {wavelengths: [" + list +
      "], polarization: {linear: 45}, beam: {radius: 1}, rays: {pattern: grid, across: 4}}\ntrain:\n"
      "- {name: plate, retard: {axis: 0, waves: 40.25, at: 500}, gap: 1}\n- {name: end, does: detect}\n");
  const double step = 2.0 * std::numbers::pi * half_width / count;
  const double shrunk = std::sin(count * step) / (count * std::sin(step));
  EXPECT_THAT(p.detector.dop, Optional(DoubleNear(shrunk, 1e-12)));
  EXPECT_NEAR(shrunk, std::sin(2.0 * std::numbers::pi * half_width) / (2.0 * std::numbers::pi * half_width),
              1e-3);
  EXPECT_THAT(p.detector.retardance_deg, Optional(DoubleNear(90.0, 1e-9)));
  EXPECT_THAT(p.detector.depolarization, Optional(DoubleNear(1.0 - (1.0 + 2.0 * shrunk) / 3.0, 1e-12)));
}

TEST(Polarization, OfAnIdealMirrorIsNoneAfterTheGeometryIsTakenOut) {
  const Polarization p = polarization_of(
      on_axis("{linear: 20}", "- {name: fold, does: reflect, coating: full, tilt: [45, 0, 0], gap: 5}\n"));
  EXPECT_THAT(p.chief->retardance_deg, Optional(DoubleNear(0.0, 1e-12)));
  EXPECT_THAT(p.detector.cross_leakage, Optional(DoubleNear(0.0, 1e-30)));
  EXPECT_NEAR(p.detector.mueller[2][2], -1.0, 1e-14);
  EXPECT_NEAR(p.detector.mueller[3][3], -1.0, 1e-14);
}

// Two folds whose planes of incidence stand at 45 degrees turn the image, and retard nothing.
TEST(Polarization, CallsATurnOfTheImageARotation) {
  const Polarization p = polarization_of(
      on_axis("{linear: 0}",
              "- {name: one, does: reflect, coating: full, tilt: [45, 0, 0], turn: [0, 0, 30], gap: 5}\n"
              "- {name: two, does: reflect, coating: full, tilt: [45, 0, 0], gap: 5}\n"));
  EXPECT_THAT(p.chief->retardance_deg, Optional(DoubleNear(0.0, 1e-12)));
  EXPECT_NEAR(std::abs(p.chief->rotation_deg), 30.0, 1e-12);
  EXPECT_THAT(p.detector.rotation_deg, Optional(DoubleNear(p.chief->rotation_deg, 1e-12)));
  EXPECT_THAT(p.detector.azimuth_deg, Optional(DoubleNear(p.chief->rotation_deg, 1e-12)));
}

TEST(Polarization, OfARotatorIsNotGeometric) {
  for (const char* kind : {"active", "faraday"}) {
    const Polarization p = polarization_of(on_axis(
        "{linear: 10}", fmt::format("- {{name: turns, rotate: {{angle: 25, kind: {}}}, gap: 1}}\n", kind)));
    EXPECT_THAT(p.detector.azimuth_deg, Optional(DoubleNear(35.0, 1e-12)));
    EXPECT_NEAR(p.chief->rotation_deg, 0.0, 1e-12);
    EXPECT_THAT(p.chief->retardance_deg, Optional(DoubleNear(50.0, 1e-12)));
    EXPECT_THAT(p.detector.cross_leakage, Optional(DoubleNear(std::pow(std::sin(25.0 * degree), 2), 1e-14)));
  }
}

TEST(Polarization, BehindAMirrorStillKnowsWhichWayARotatorTurned) {
  const Polarization p = polarization_of(
      on_axis("{linear: 0}", "- {name: fold, does: reflect, coating: full, tilt: [45, 0, 0], gap: 5}\n"
                             "- {name: turns, rotate: {angle: 25, kind: active}, gap: 1}\n"));
  EXPECT_THAT(p.detector.azimuth_deg, Optional(DoubleNear(25.0, 1e-12)));
  EXPECT_THAT(p.detector.cross_leakage, Optional(DoubleNear(std::pow(std::sin(25.0 * degree), 2), 1e-14)));
}

// Light that goes back through a Faraday rotator is turned twice; an active one undoes itself.
TEST(Polarization, OfAFaradayRotatorPassedTwiceDoubles) {
  const auto leakage = [](const char* kind) {
    return share_of(
        polarization_of(
            on_axis("{linear: 0}", fmt::format("- {{name: turns, rotate: {{angle: 45, kind: {}}}, gap: 5}}\n"
                                               "- {{name: back, does: reflect, coating: full}}\n"
                                               "- {{again: turns, gap: 5}}\n",
                                               kind)))
            .detector.cross_leakage);
  };
  EXPECT_NEAR(leakage("faraday"), 1.0, 1e-14);
  EXPECT_NEAR(leakage("active"), 0.0, 1e-14);
}

TEST(Attribution, BlamesAStationForAllThatItAloneDoes) {
  const Polarization p = polarization_of(
      on_axis("{linear: 45}", "- {name: plain, into: glass, gap: 1}\n- {name: out, into: air, gap: 1}\n"
                              "- {name: fold, does: reflect, coating: third, tilt: [45, 0, 0], gap: 5}\n"));
  EXPECT_THAT(p.attribution[0].value.diattenuation, Optional(DoubleNear(0.0, 1e-14)));
  EXPECT_THAT(p.attribution[2].value.diattenuation, Optional(DoubleNear(0.3 / 1.5, 1e-14)));
  EXPECT_THAT(p.attribution[2].value.cross_leakage,
              Optional(DoubleNear(share_of(p.detector.cross_leakage), 1e-14)));
}

/// A converging beam over three folds of ideal coatings, the powers of the second one given.
Polarization three_folds(double second_s, double second_p) {
  return polarization_of(fmt::format(
      "light: {{wavelengths: [500], polarization: {{ellipse: {{azimuth: 20, ellipticity: 10}}}}, object: "
      "{{distance: -60}}, "
      "beam: {{radius: 8}}, rays: {{pattern: rings, rings: 3, spokes: 8}}}}\n"
      "coatings:\n  a: {{ideal: {{reflect: {{s: 0.9, p: 0.6}}, transmit: {{s: 0, p: 0}}}}}}\n"
      "  b: {{ideal: {{reflect: {{s: {:.17g}, p: {:.17g}}}, transmit: {{s: 0, p: 0}}}}}}\ntrain:\n"
      "- {{name: one, does: reflect, coating: a, tilt: [40, 0, 0], gap: 5}}\n"
      "- {{name: two, does: reflect, coating: b, tilt: [15, 50, 0], gap: 5}}\n"
      "- {{name: three, does: reflect, coating: a, tilt: [0, 35, 0], gap: 5}}\n"
      "- {{name: end, does: detect}}\n",
      second_s, second_p));
}

// An ideal coating with the mean of both powers is neutral.
TEST(Attribution, IsWhatANeutralCoatingThereChanges) {
  const Polarization train = three_folds(0.95, 0.4);
  const Polarization neutral = three_folds(0.675, 0.675);
  const AttributionFigures& found = train.attribution[1].value;
  const auto change = [](std::optional<double> one, std::optional<double> other) {
    return Optional(DoubleNear(share_of(one) - share_of(other), 1e-13));
  };
  EXPECT_THAT(found.diattenuation, change(train.detector.diattenuation, neutral.detector.diattenuation));
  EXPECT_THAT(found.retardance_deg, change(train.detector.retardance_deg, neutral.detector.retardance_deg));
  EXPECT_THAT(found.cross_leakage, change(train.detector.cross_leakage, neutral.detector.cross_leakage));
  EXPECT_THAT(found.dop_loss, change(neutral.detector.dop, train.detector.dop));
  EXPECT_EQ(train.by_coating[1].value.diattenuation, found.diattenuation);
}

TEST(Attribution, KnowsElementsAndCoatings) {
  const Polarization p = polarization_of(
      on_axis("{linear: 45}", "- {name: front, into: glass, gap: 1}\n- {name: rear, into: air, gap: 1}\n"
                              "- {name: one, does: reflect, coating: third, tilt: [45, 0, 0], gap: 5}\n"
                              "- {name: two, does: reflect, coating: third, tilt: [45, 0, 0], gap: 5}\n"));
  ASSERT_EQ(p.by_element.size(), 1U);
  EXPECT_EQ(p.by_element[0].name, "front to rear");
  ASSERT_EQ(p.by_coating.size(), 2U);
  EXPECT_EQ(p.by_coating[0].name, "bare");
  EXPECT_THAT(p.by_coating[1].stations, ElementsAre(2U, 3U));
  EXPECT_THAT(p.by_coating[1].value.diattenuation,
              Optional(DoubleNear((0.81 - 0.36) / (0.81 + 0.36), 1e-14)));
}

const std::string crossed = "- {name: one, does: reflect, backing: metal, tilt: [45, 0, 0], gap: 5}\n"
                            "- {name: two, does: reflect, backing: metal, tilt: [0, 45, 0], gap: 5}\n";
const std::string parallel = "- {name: one, does: reflect, backing: metal, tilt: [45, 0, 0], gap: 5}\n"
                             "- {name: two, does: reflect, backing: metal, tilt: [45, 0, 0], gap: 5}\n";

TEST(Attribution, OfCrossedFoldsIsNegativeForEitherAlone) {
  const Polarization p = polarization_of(on_axis("{linear: 45}", crossed));
  EXPECT_LT(share_of(p.attribution[0].value.retardance_deg), -1.0);
  EXPECT_LT(share_of(p.attribution[1].value.retardance_deg), -1.0);
  EXPECT_THAT(p.by_coating[0].value.retardance_deg, Optional(DoubleNear(0.0, 1e-10)));
}

TEST(CancellingPairs, AreCrossedFoldsAndNoParallelOnes) {
  const Polarization p = polarization_of(on_axis("{linear: 45}", crossed));
  ASSERT_EQ(p.cancelling.size(), 1U);
  EXPECT_NEAR(p.cancelling[0].first_deg, p.cancelling[0].second_deg, 1e-10);
  EXPECT_NEAR(p.cancelling[0].together_deg, 0.0, 1e-10);
  EXPECT_THAT(polarization_of(on_axis("{linear: 45}", parallel)).cancelling, IsEmpty());
}

TEST(FoldTurn, CrossesParallelFolds) {
  const Polarization p = polarization_of(on_axis("{linear: 45}", parallel));
  ASSERT_TRUE(p.fold_turn);
  EXPECT_EQ(p.fold_turn->station, 1U);
  EXPECT_NEAR(p.fold_turn->turn_deg, 90.0, 1e-6);
  EXPECT_NEAR(p.fold_turn->retardance_deg, 0.0, 1e-6);
  EXPECT_FALSE(polarization_of(on_axis("{linear: 45}", crossed)).fold_turn);
}

TEST(FoldTurn, HoldsWhatItPromises) {
  const auto train = [](const std::array<double, 3>& tilt, const std::array<double, 3>& turn) {
    return polarization_of(on_axis(
        "{linear: 45}",
        fmt::format(
            "- {{name: one, does: reflect, backing: metal, tilt: [40, 0, 0], gap: 5}}\n"
            "- {{name: two, does: reflect, backing: metal, tilt: [{:.17g}], turn: [{:.17g}], gap: 5}}\n"
            "- {{name: three, does: reflect, backing: metal, tilt: [10, 5, 0], gap: 5}}\n",
            fmt::join(tilt, ", "), fmt::join(turn, ", "))));
  };
  const Polarization now = train({35.0, 20.0, 0.0}, {0.0, 0.0, 7.0});
  ASSERT_TRUE(now.fold_turn);
  ASSERT_EQ(now.fold_turn->station, 1U);
  const Polarization then = train(now.fold_turn->tilt_deg, now.fold_turn->turn_after_deg);
  EXPECT_LT(now.fold_turn->retardance_deg, 0.5 * now.fold_turn->retardance_now_deg);
  EXPECT_NEAR(share_of(now.chief->retardance_deg), now.fold_turn->retardance_now_deg, 1e-9);
  EXPECT_NEAR(share_of(then.chief->retardance_deg), now.fold_turn->retardance_deg, 1e-6);
}

TEST(PlateSettings, RestoreTheLaunchedState) {
  const std::string plates = "- {{name: quarter, retard: {{axis: {:.17g}, waves: 0.25}}, gap: 1}}\n"
                             "- {{name: half, retard: {{axis: {:.17g}, waves: 0.5}}, gap: 1}}\n";
  const Polarization now =
      polarization_of(on_axis("{linear: 45}", fmt::format(fmt::runtime(plates), 10.0, 0.0) + parallel));
  ASSERT_TRUE(now.plates);
  EXPECT_LT(now.plates->cross_leakage, 1e-12);
  const Polarization then = polarization_of(
      on_axis("{linear: 45}", fmt::format(fmt::runtime(plates), now.plates->plates[0].axis_deg,
                                          now.plates->plates[1].axis_deg) +
                                  parallel));
  EXPECT_NEAR(share_of(then.detector.cross_leakage), 0.0, 1e-12);
  EXPECT_FALSE(then.plates);
}

TEST(CoherentShare, OfNothingButLossIsOne) {
  const Polarization p = polarization_of(on_axis(
      "unpolarized", "- {name: face, into: glass, loss: 0.1, gap: 1}\n- {name: out, into: air, gap: 1}\n"));
  EXPECT_THAT(p.detector.coherent_share, Optional(DoubleNear(1.0, 1e-14)));
}

TEST(CoherentShare, OfARetarderIsTheCosineSquaredOfHalfOfIt) {
  const Polarization p =
      polarization_of(on_axis("unpolarized", "- {name: plate, retard: {axis: 30, degrees: 70}, gap: 1}\n"));
  EXPECT_THAT(p.detector.coherent_share, Optional(DoubleNear(std::pow(std::cos(35.0 * degree), 2), 1e-14)));
}

TEST(Extinction, KnowsNoBoundsOfPerfectLight) {
  const Polarization p =
      polarization_of(on_axis("{linear: 0}", "- {name: a, polarize: {axis: 0}, gap: 1}\n"));
  EXPECT_FALSE(p.detector.extinction);
  EXPECT_FALSE(p.detector.linear_extinction);
}

TEST(Polarization, OfNoLightAtAllIsNull) {
  const Polarization p = polarization_of(
      on_axis("{linear: 0}", "- {name: a, polarize: {axis: 90}, gap: 1}\n"
                             "- {name: b, polarize: {axis: 0}, gap: 1}\n"
                             "- {name: c, does: stop, clear: {radius: 1, at: [9, 0]}, gap: 1}\n"));
  EXPECT_EQ(p.detector.mueller[0][0], 0.0);
  for (const auto& figure : {p.detector.dop, p.detector.diattenuation, p.detector.retardance_deg,
                             p.detector.cross_leakage, p.detector.coherent_share, p.detector.rotation_deg,
                             p.detector.depolarization_index, p.detector.extinction})
    EXPECT_FALSE(figure);
  EXPECT_TRUE(p.chief);
}

TEST(ChiefRay, IsNoneWhereItIsTotallyReflected) {
  const Polarization p = polarization_of(
      "light: {wavelengths: [500], medium: glass, beam: {radius: 1}}\nmedia: {glass: {index: 1.5}}\n"
      "train:\n- {name: face, into: air, tilt: [60, 0, 0], gap: 1}\n- {name: end, does: detect}\n");
  EXPECT_FALSE(p.chief);
}

TEST(ChiefRay, GoesThroughTheVertexOfTheFirstStop) {
  const support::Ready train = support::ready(
      "light: {wavelengths: [500], fields: [[3, 5]], beam: {radius: 4}}\nmedia: {glass: {index: "
      "1.5}}\ntrain:\n"
      "- {name: front, radius: 40, into: glass, gap: 4}\n- {name: rear, radius: -60, into: air, gap: 9}\n"
      "- {name: iris, does: stop, clear: {radius: 1, at: [3, 3]}, gap: 5}\n- {name: end, does: detect}\n");
  const auto launch = trace::chief_launch(*train.assembly, train.train.path, train.train.plans.front(),
                                          train.assembly->light.fields.front());
  trace::RayBlock block =
      support::ray({launch[0], launch[1], 0}, {std::tan(3 * degree), std::tan(5 * degree), 1});
  const auto hit = support::walk(train.train, block).hit(2);
  EXPECT_LT(std::hypot(hit[0], hit[1]), 1e-10);
}

TEST(Uncertainty, CoversTheSpreadOfOtherSamples) {
  const std::string train =
      "light: {{wavelengths: [500], polarization: {{linear: 30}}, beam: {{radius: 8, gaussian: 6}}, "
      "rays: {{pattern: scattered, count: {}}}}}\nmedia: {{glass: {{index: 1.8}}}}\ntrain:\n"
      "- {{name: front, radius: 12, into: glass, gap: 4}}\n- {{name: end, does: detect}}\n";
  const Polarization few = polarization_of(fmt::format(fmt::runtime(train), 512));
  const Polarization many = polarization_of(fmt::format(fmt::runtime(train), 65536));
  ASSERT_TRUE(few.uncertainty);
  EXPECT_LT(many.uncertainty, few.uncertainty);
  EXPECT_NEAR(share_of(few.detector.dop), share_of(many.detector.dop), 4.0 * share_of(few.error.dop));
  EXPECT_NEAR(few.detector.mueller[0][0], many.detector.mueller[0][0], 4.0 * few.error.mueller[0][0]);
}

TEST(Polarization, TakesTheLightsFieldsEachInItsOwnBasis) {
  const Polarization p = polarization_of("light: {wavelengths: [500], polarization: {linear: 0}, "
                                         "fields: [[0, 0], [30, 20]], beam: {radius: 1}}\ntrain:\n"
                                         "- {name: iris, does: stop, gap: 1}\n- {name: end, does: detect}\n");
  EXPECT_THAT(p.detector.dop, Optional(DoubleNear(1.0, 1e-14)));
  EXPECT_THAT(p.detector.azimuth_deg, Optional(DoubleNear(0.0, 1e-12)));
}

TEST(PupilMap, ShowsTheDiattenuationOfALensGrowOutward) {
  const Polarization p = polarization_of(
      on_axis("{linear: 0}", "- {name: front, radius: 3, into: glass, gap: 1}\n"), {.maps = true});
  ASSERT_EQ(p.maps.size(), 1U);
  const PupilMap& map = p.maps[0];
  const auto at = [&](std::size_t column, std::size_t row) { return map.points[row * map.columns + column]; };
  const std::size_t middle = map.columns / 2;
  ASSERT_TRUE(at(middle, middle) && at(map.columns - 2, middle) && at(middle, map.rows - 2));
  EXPECT_FALSE(at(0, 0));
  EXPECT_NEAR(at(middle, middle)->diattenuation, 0.0, 1e-9);
  EXPECT_GT(at(map.columns - 2, middle)->diattenuation, 1e-4);
  EXPECT_NEAR(at(map.columns - 2, middle)->diattenuation_axis_deg, 0.0, 1e-9);
  EXPECT_NEAR(at(middle, map.rows - 2)->diattenuation_axis_deg, 90.0, 1e-9);
}

TEST(PolarizationTable, FollowsAPlateThroughTheWavelengths) {
  const Polarization p = polarization_of(
      on_axis("{linear: 45}", "- {name: plate, retard: {axis: 0, waves: 0.25, at: 500}, gap: 1}\n"),
      {.against = Against::wavelength});
  ASSERT_EQ(p.table.rows.size(), 41U);
  for (const PolarizationRow& row : p.table.rows)
    EXPECT_THAT(row.retardance_deg, Optional(DoubleNear(90.0 * 500.0 / row.at, 1e-9)));
}

} // namespace
} // namespace lightledger::analysis
