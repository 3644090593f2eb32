#include "support/walk.hpp"

#include <lightledger/analysis/remedy.hpp>

#include <gtest/gtest.h>

#include <string>

namespace lightledger::analysis {
namespace {

std::vector<Remedy> remedies_of(const std::string& stations, const std::string& more = {}) {
  const assembly::Assembly assembly = support::loaded(
      "light: {wavelengths: [500], beam: {radius: 2}, rays: {pattern: rings, rings: 2, spokes: 6}}\n"
      "media: {glass: {index: 1.5}}\n"
      "coatings: {dull: {ideal: {reflect: 0.8, transmit: 0}}, bright: {ideal: {reflect: 0.995, transmit: "
      "0}}, "
      "half: {ideal: {reflect: 0.5}}}\n" +
      more + "train:\n" + stations + "- {name: end, does: detect}\n");
  const BudgetResult result = budget(assembly);
  return remedies(assembly, result.budget.value());
}

const std::string dull_mirror_and_face = "- {name: mirror, does: reflect, coating: dull, gap: 5}\n"
                                         "- {name: face, into: glass, gap: 5}\n";

TEST(Remedies, NameTheMirrorThatAbsorbsAndTheFaceThatReflects) {
  const auto remedies = remedies_of(dull_mirror_and_face);
  ASSERT_EQ(remedies.size(), 2U);
  EXPECT_EQ(remedies[0].station, 0U);
  EXPECT_TRUE(remedies[0].reflects);
  EXPECT_EQ(remedies[0].reflectance, 0.99);
  EXPECT_NEAR(remedies[0].delivered, 0.99 * 0.96, 1e-12);
  EXPECT_FALSE(remedies[0].suffices);
  EXPECT_EQ(remedies[1].station, 1U);
  EXPECT_FALSE(remedies[1].reflects);
  EXPECT_NEAR(remedies[1].reflectance, 0.002, 1e-15);
  EXPECT_NEAR(remedies[1].delivered, 0.8 * 0.998, 1e-12);
}

TEST(Remedies, GiveTheReflectanceThatMeetsARequirement) {
  const auto remedies =
      remedies_of(dull_mirror_and_face, "requirements: [{quantity: delivered, at_least: 0.9}]\n");
  ASSERT_FALSE(remedies.empty());
  EXPECT_TRUE(remedies[0].suffices);
  EXPECT_NEAR(remedies[0].reflectance, 0.9 / 0.96, 1e-12);
  EXPECT_NEAR(remedies[0].delivered, 0.9, 1e-12);
}

TEST(Remedies, AreGoodCoatingsWhereNoneIsEnough) {
  const auto remedies =
      remedies_of(dull_mirror_and_face, "requirements: [{quantity: budget.delivered, at_least: 0.98}]\n");
  ASSERT_FALSE(remedies.empty());
  EXPECT_FALSE(remedies[0].suffices);
  EXPECT_EQ(remedies[0].reflectance, 0.99);
}

TEST(Remedies, AreNotForMirrorsThatAreGoodOrMeantToLetThrough) {
  EXPECT_TRUE(remedies_of("- {name: mirror, does: reflect, coating: bright, gap: 5}\n"
                          "- {name: splitter, does: reflect, coating: half, backing: glass, gap: 5}\n")
                  .empty());
}

TEST(Remedies, AreNotForFacesThatMayBeFilters) {
  EXPECT_TRUE(remedies_of("- {name: filter, into: glass, coating: half, gap: 5}\n").empty());
}

TEST(Remedies, AreNotForSurfacesMetTwice) {
  EXPECT_TRUE(remedies_of("- {name: face, into: glass, gap: 5}\n"
                          "- {name: mirror, does: reflect, coating: bright}\n"
                          "- {again: face, into: air, gap: 5}\n")
                  .empty());
}

} // namespace
} // namespace lightledger::analysis
