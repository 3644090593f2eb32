#include "support/walk.hpp"

#include <lightledger/analysis/budget.hpp>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <cmath>
#include <string>

namespace lightledger::analysis {
namespace {

using testing::ElementsAre;
using testing::HasSubstr;

Budget budget_of(const std::string& yaml, const BudgetOptions& options = {}) {
  const BudgetResult result = budget(support::loaded(yaml), options);
  EXPECT_TRUE(result.budget.has_value());
  return result.budget.value_or(Budget{});
}

/// Two wavelengths of weights 1 and 3, two fields, of which the second is stopped in part.
const std::string split_train = "light: {wavelengths: [{at: 500, weight: 1}, {at: 600, weight: 3}], "
                                "fields: [[0, 0], {at: [0, 2], name: edge}], beam: {radius: 4}, "
                                "rays: {pattern: rings, rings: 12, spokes: 24}}\n"
                                "media: {tinted: {table: [[500, 1.5, 0], [600, 1.6, 0]]}}\ntrain:\n"
                                "- {name: face, into: tinted, gap: 30}\n"
                                "- {name: iris, does: stop, clear: {diameter: 8}, gap: 1}\n"
                                "- {name: end, does: detect}\n";

TEST(Budget, OfABareFaceIsFresnels) {
  const Budget budget =
      budget_of("light: {wavelengths: [550], beam: {radius: 4}}\nmedia: {glass: {index: 1.5}}\n"
                "train:\n- {name: face, into: glass, gap: 1}\n- {name: end, does: detect}\n");
  EXPECT_NEAR(budget.delivered, 0.96, 1e-14);
  EXPECT_NEAR(budget.stations[0].aside, 0.04, 1e-14);
  EXPECT_NEAR(budget.closure_error, 0.0, 1e-14);
}

TEST(Budget, PassesAreNullForStationsThatNeitherRefractNorReflect) {
  const Budget budget = budget_of(split_train);
  EXPECT_TRUE(budget.stations[0].pass_s);
  EXPECT_FALSE(budget.stations[1].pass_s);
  EXPECT_FALSE(budget.stations[2].pass_p);
}

TEST(Budget, TransmittanceLeavesClippedLightOut) {
  const StationBudget iris = budget_of(split_train).stations[1];
  EXPECT_GT(iris.clipped, 0.01);
  EXPECT_NEAR(iris.transmittance.value(), 1.0, 1e-14);
}

TEST(Budget, EachPartIsRelativeToWhatWasLaunchedThere) {
  const Budget budget = budget_of(split_train);
  ASSERT_EQ(budget.by_wavelength.size(), 2U);
  ASSERT_EQ(budget.by_field.size(), 2U);
  EXPECT_NEAR(budget.delivered,
              0.25 * budget.by_wavelength[0].delivered + 0.75 * budget.by_wavelength[1].delivered, 1e-14);
  EXPECT_NEAR(budget.delivered, 0.5 * (budget.by_field[0].delivered + budget.by_field[1].delivered), 1e-14);
  EXPECT_NEAR(budget.by_field[0].delivered, 0.25 * 0.96 + 0.75 * (1.0 - std::pow(0.6 / 2.6, 2)), 1e-14);
}

TEST(Budget, FieldsKeepTheirNamesAndPlaces) {
  const Budget budget = budget_of(split_train);
  EXPECT_FALSE(budget.by_field[0].name);
  EXPECT_EQ(budget.by_field[1].name, "edge");
  EXPECT_THAT(budget.by_field[1].at, ElementsAre(0.0, 2.0));
}

TEST(Budget, SplitLedgersBeginWithAllThatWasLaunchedThere) {
  const Budget budget = budget_of(split_train, {.split = Split::wavelength, .threads = 0});
  ASSERT_EQ(budget.ledgers.size(), 2U);
  EXPECT_EQ(budget.ledgers[1].wavelength_nm, 600.0);
  EXPECT_NEAR(budget.ledgers[1].stations[0].incident, 1.0, 1e-14);
  EXPECT_NEAR(budget.ledgers[1].stations[0].aside, std::pow(0.6 / 2.6, 2), 1e-3);
}

TEST(Budget, IncidenceIsInTheMediumOfIncidence) {
  const Budget budget =
      budget_of("light: {wavelengths: [550], beam: {radius: 4}}\nmedia: {glass: {index: 1.5}}\ntrain:\n"
                "- {name: front, tilt: [30, 0, 0], into: glass, gap: 3}\n"
                "- {name: rear, tilt: [30, 0, 0], into: air, gap: 3}\n- {name: end, does: detect}\n");
  EXPECT_NEAR(budget.stations[0].incidence.value().mean_deg, 30.0, 1e-12);
  EXPECT_NEAR(budget.stations[1].incidence.value().mean_deg, std::asin(0.5 / 1.5) * 45.0 / std::atan(1.0),
              1e-12);
}

TEST(Budget, NothingDeliveredIsNoTrouble) {
  const Budget budget = budget_of("light: {wavelengths: [550], beam: {radius: 1}}\ntrain:\n"
                                  "- {name: wall, does: stop, clear: {diameter: 1, at: [5, 0]}, gap: 1}\n"
                                  "- {name: end, does: detect}\n");
  EXPECT_EQ(budget.delivered, 0.0);
  EXPECT_EQ(budget.stations[0].clipped, 1.0);
  EXPECT_FALSE(budget.stations[0].transmittance);
  EXPECT_FALSE(budget.stations[1].incidence);
}

TEST(Budget, WarnsOfPowerThatRunsBackwards) {
  const BudgetResult result =
      budget(support::loaded("light: {wavelengths: [550], beam: {radius: 6}}\ntrain:\n"
                             "- {name: dome, radius: 10, into: fused-silica, gap: 1}\n"
                             "- {name: flat, into: air, gap: 1}\n- {name: end, does: detect}\n"));
  ASSERT_EQ(result.warnings.size(), 1U);
  EXPECT_THAT(result.warnings[0], HasSubstr("dome: "));
  EXPECT_THAT(result.warnings[0], HasSubstr("runs backwards"));
}

TEST(Budget, OfAPatternThatPutsNoLightOnTheBeamIsAFault) {
  const BudgetResult result =
      budget(support::loaded("light: {wavelengths: [550], beam: {radius: 5, gaussian: 0.05}, "
                             "rays: {pattern: rings, rings: 1, spokes: 1}}\ntrain:\n"
                             "- {name: end, does: detect}\n"));
  EXPECT_FALSE(result.budget);
  ASSERT_EQ(result.faults.count(), 1U);
  EXPECT_THAT(result.faults.kept()[0].message, HasSubstr("no light"));
}

} // namespace
} // namespace lightledger::analysis
