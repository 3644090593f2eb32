#include "support/walk.hpp"

#include <lightledger/analysis/ghosts.hpp>
#include <lightledger/analysis/requirements.hpp>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <cmath>
#include <string>

namespace lightledger::analysis {
namespace {

using testing::ElementsAre;
using testing::HasSubstr;

const std::string light = "light: {wavelengths: [550], beam: {radius: 1}, rays: {pattern: rings, rings: 6, "
                          "spokes: 16}}\nmedia: {glass: {index: 1.5}}\n";
const std::string plate = "train:\n- {name: front, into: glass, clear: {diameter: 9}, gap: 5}\n"
                          "- {name: rear, into: air, clear: {diameter: 9}, gap: 5}\n";
const std::string end = "- {name: end, does: detect, clear: {diameter: 9}}\n";

Ghosts ghosts_of(const std::string& yaml, const GhostOptions& options = {}) {
  const GhostsResult result = ghosts(support::loaded(yaml), options);
  EXPECT_TRUE(result.ghosts.has_value());
  return result.ghosts.value_or(Ghosts{});
}

TEST(Ghosts, OfAPlateHaveTheFiguresOfTheTextbook) {
  const Ghosts found = ghosts_of(light + plate + end);
  ASSERT_EQ(found.paths.size(), 1U);
  const Ghost& ghost = found.paths.front();
  EXPECT_THAT(ghost.bounces, ElementsAre("rear", "front"));
  EXPECT_THAT(ghost.stations, ElementsAre(2U, 1U));
  EXPECT_NEAR(ghost.power, 0.9216 * 0.0016, 1e-15);
  EXPECT_NEAR(*ghost.relative_power, 0.0016, 1e-15);
  EXPECT_NEAR(*ghost.path_excess_mm, 2.0 * 1.5 * 5.0, 1e-12);
  EXPECT_NEAR(ghost.spot.rms_radius_mm, std::sqrt(0.5), 1e-12);
  EXPECT_NEAR(ghost.stokes[0], ghost.power, 1e-18);
  EXPECT_NEAR(*ghost.fringe_modulation, 2.0 * 0.04 / (1.0 + 0.0016), 1e-12);
  EXPECT_FALSE(ghost.uncertainty.has_value());
  EXPECT_FALSE(ghost.peak_ratio.has_value());
  EXPECT_FALSE(ghost.defocus_mm.has_value());
  EXPECT_NEAR(ghost.cure.at(0).reflectance, 0.04, 1e-14);
}

/// The second field's image falls beside the detector, and its ghost on it.
TEST(Ghosts, OfASourceOutsideTheFieldAreJudgedAgainstOneInside) {
  const std::string fields =
      "light: {wavelengths: [550], fields: [[0, 33], {at: [0, 20], name: sun}], beam: {radius: "
      "0.8}, rays: {pattern: rings, rings: 6, spokes: 16}}\nmedia: {glass: {index: 1.5}}\n";
  const Ghosts found =
      ghosts_of(fields + plate + "- {name: end, does: detect, clear: {width: 9, height: 3, at: [0, 5.5]}}\n");
  const GhostField& sun = found.paths.front().by_field.at(1);
  EXPECT_EQ(sun.name, "sun");
  EXPECT_GT(sun.power, 1e-3);
  EXPECT_NEAR(*sun.relative_power, sun.power / (2.0 * found.delivered), 1e-12);
}

TEST(Ghosts, OfOneFieldAloneAreRelativeToItsLight) {
  const std::string fields =
      "light: {wavelengths: [550], fields: [[0, 0], {at: [0, 1], name: edge}], beam: {radius: 1}, "
      "rays: {pattern: rings, rings: 6, spokes: 16}}\nmedia: {glass: {index: 1.5}}\n";
  const Ghosts both = ghosts_of(fields + plate + end);
  const Ghosts edge = ghosts_of(fields + plate + end, {.field = "edge"});
  const Ghosts second = ghosts_of(fields + plate + end, {.field = "2"});
  EXPECT_EQ(edge.paths.front().by_field.size(), 1U);
  EXPECT_NEAR(edge.total, both.paths.front().by_field[1].power, 1e-18);
  EXPECT_EQ(edge.total, second.total);
  const GhostsResult none = ghosts(support::loaded(fields + plate + end), {.field = "edg"});
  EXPECT_FALSE(none.ghosts.has_value());
  EXPECT_EQ(none.faults.kept().front().suggestion, "edge");
}

TEST(Ghosts, ListedAreTheBrightestAndTheRestIsTold) {
  const std::string train =
      light + plate + "- {name: end, does: detect, clear: {diameter: 9}, reflectance: 0.5}\n";
  const Ghosts all = ghosts_of(train);
  const Ghosts two = ghosts_of(train, {.top = 2});
  ASSERT_EQ(all.paths.size(), 3U);
  ASSERT_EQ(two.paths.size(), 2U);
  EXPECT_EQ(two.unlisted_paths, 1U);
  EXPECT_EQ(two.unlisted, all.paths.back().power);
  EXPECT_GE(all.paths[0].power, all.paths[1].power);
}

TEST(Ghosts, TiesStandInTheOrderOfTheTrain) {
  const Ghosts found = ghosts_of(light +
                                 "coatings: {even: {ideal: {reflect: 0.04}}}\ntrain:\n"
                                 "- {name: a, into: glass, coating: even, gap: 1}\n"
                                 "- {name: b, into: air, coating: even, gap: 1}\n"
                                 "- {name: c, into: glass, coating: even, gap: 1}\n" +
                                 end);
  ASSERT_EQ(found.paths.size(), 3U);
  EXPECT_THAT(found.paths[0].bounces, ElementsAre("b", "a"));
  EXPECT_THAT(found.paths[1].bounces, ElementsAre("c", "b"));
  EXPECT_THAT(found.paths[2].bounces, ElementsAre("c", "a"));
}

TEST(Ghosts, PeakOfAGhostAsWideAsTheImageIsItsRelativePower) {
  const Ghosts found = ghosts_of(
      light + plate + "- {name: end, does: detect, clear: {width: 4, height: 4}, pixels: [8, 8]}\n");
  EXPECT_NEAR(*found.paths.front().peak_ratio, 0.0016, 1e-6);
}

/// Light of NA 0.01 that converges through a plate: the image lies on one pixel, the ghost comes to its focus
/// 2t/n before and spreads over a disc.
TEST(Ghosts, PeakOfAGhostOutOfFocusIsItsPowerOverItsDisc) {
  const Ghosts found =
      ghosts_of("light: {wavelengths: [550], object: {distance: -100}, beam: {radius: 1}, rays: {pattern: "
                "rings, rings: 6, "
                "spokes: 16}}\nmedia: {glass: {index: 1.5}}\ntrain:\n"
                "- {name: front, into: glass, clear: {diameter: 9}, gap: 10}\n"
                "- {name: rear, into: air, clear: {diameter: 9}, gap: focus}\n"
                "- {name: end, does: detect, clear: {width: 2.02, height: 2.02}, pixels: [101, 101]}\n");
  const double disc = std::acos(-1.0) * std::pow(0.01 * 2.0 * 10.0 / 1.5, 2.0);
  EXPECT_NEAR(*found.paths.front().defocus_mm, -2.0 * 10.0 / 1.5, 1e-9);
  EXPECT_NEAR(*found.paths.front().peak_ratio, 0.0016 * 0.02 * 0.02 / disc,
              0.2 * 0.0016 * 0.02 * 0.02 / disc);
}

TEST(Ghosts, AThinLensSendsItsGhostToASeventhOfItsFocus) {
  const Ghosts found = ghosts_of(light +
                                 "train:\n- {name: front, radius: 50, into: glass, gap: 0}\n"
                                 "- {name: rear, radius: -50, into: air, gap: focus}\n" +
                                 end);
  EXPECT_NEAR(*found.paths.front().defocus_mm, 50.0 / 7.0 - 50.0, 1e-9);
}

TEST(Ghosts, TellWhichReflectanceWouldKeepTheirLimit) {
  const double total = 0.9216 * 0.0016;
  const Ghosts found =
      ghosts_of(light + plate + end + "requirements:\n- {quantity: ghosts.total, at_most: 0.0007}\n");
  EXPECT_EQ(found.limit, 0.0007);
  EXPECT_NEAR(*found.paths.front().cure.at(0).needed_reflectance, 0.04 * 0.0007 / total, 1e-12);
  ASSERT_TRUE(found.culprit.has_value());
  EXPECT_NEAR(found.culprit->power, total, 1e-15);
}

TEST(Ghosts, WarnOfFacesWithoutAClearArea) {
  const GhostsResult result = ghosts(support::loaded(
      light +
      "train:\n- {name: open, into: glass, gap: 5}\n- {name: end, does: detect, clear: {diameter: 5}}\n"));
  ASSERT_EQ(result.warnings.size(), 1U);
  EXPECT_THAT(result.warnings.front(), HasSubstr("open"));
}

TEST(Ghosts, FocusInGlassIsFoundAndNotBelowDiffraction) {
  // A concave mirror of a face: light of one bounce there comes to a focus in the block before it.
  const Ghosts found = ghosts_of(light +
                                 "train:\n- {name: front, into: glass, clear: {diameter: 9}, gap: 30}\n"
                                 "- {name: rear, radius: -40, into: air, clear: {diameter: 9}, gap: 5}\n" +
                                 end);
  const auto hot = std::ranges::find_if(found.foci, [](const HotFocus& focus) {
    return focus.medium == "glass" && focus.bounces == std::vector<std::string>{"rear"};
  });
  ASSERT_NE(hot, found.foci.end());
  EXPECT_NEAR(hot->distance_mm, 20.0, 0.05);
  const double aperture = 1.5 * std::sin(1.0 / 20.0);
  EXPECT_GE(hot->radius_mm, 0.9 * 550e-6 / (std::acos(-1.0) * aperture));
  EXPECT_NEAR(hot->irradiance_ratio, hot->power / std::pow(hot->radius_mm, 2.0),
              0.02 * hot->irradiance_ratio);
}

TEST(GhostRequirements, AreJudgedByPathInTheJson) {
  const CheckResult result =
      check(support::loaded(light + plate + end +
                            "requirements:\n- {quantity: ghosts.total, at_most: 0.002}\n- {quantity: "
                            "ghosts.brightest, at_most: 0.001}\n"
                            "- {quantity: 'ghosts.paths[0].by_field[0].relative_power', at_most: 0.002}\n"
                            "- {quantity: ghosts.brightest.rms_radius_mm, at_least: 0.5}\n- {quantity: "
                            "ghosts.ledger.returned, at_most: 1}\n"));
  ASSERT_TRUE(result.judgement.has_value());
  std::vector<bool> met;
  for (const Verdict& verdict : result.judgement->verdicts)
    met.push_back(verdict.met.value_or(false));
  EXPECT_THAT(met, ElementsAre(true, false, true, true, true));
}

TEST(GhostRequirements, OfUnknownFiguresAreRefusedWithANearName) {
  const CheckResult result =
      check(support::loaded(light + plate + end + "requirements:\n- {quantity: ghosts.totl, at_most: 1}\n"));
  ASSERT_FALSE(result.faults.none());
  EXPECT_EQ(result.faults.kept().front().suggestion, "ghosts.total");
}

} // namespace
} // namespace lightledger::analysis
