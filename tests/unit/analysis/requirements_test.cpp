#include "support/walk.hpp"

#include <lightledger/analysis/requirements.hpp>
#include <lightledger/assembly/load.hpp>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lightledger::analysis {
namespace {

using assembly::Sense;
using testing::ElementsAre;
using testing::HasSubstr;
using testing::IsEmpty;

Budget budget_by_hand() {
  StationBudget fold;
  fold.name = "fold no. 2";
  fold.absorbed = 0.08;
  fold.incidence = {40.0, 45.0, 50.0};
  Budget budget;
  budget.delivered = 0.9;
  budget.uncertainty = 0.001;
  budget.rays = 4096;
  budget.stations = {fold};
  budget.by_wavelength = {{532.0, 0.95}, {1064.0, 0.85}};
  budget.by_field = {{std::nullopt, {0.0, 0.0}, 0.92}, {"edge", {0.0, 1.0}, 0.88}};
  return budget;
}

Judgement judgement_of(const std::vector<std::string>& quantities) {
  assembly::Assembly assembly;
  for (const std::string& quantity : quantities)
    assembly.requirements.push_back({quantity, Sense::at_least, 0.0});
  return judge_all(assembly, budget_by_hand());
}

std::optional<double> value_of(const std::string& quantity) {
  const Judgement judgement = judgement_of({quantity});
  EXPECT_TRUE(judgement.faults.none()) << quantity;
  return judgement.verdicts.empty() ? std::nullopt : judgement.verdicts.front().value;
}

std::string fault_of(const std::string& quantity) {
  return assembly::describe(judgement_of({quantity}).faults, "file", "");
}

TEST(Judge, GivesThePositiveMarginOfARequirementThatIsMet) {
  const Verdict least = judge({"delivered", Sense::at_least, 0.75}, 1.0, std::nullopt);
  EXPECT_EQ(least.margin, 0.25);
  EXPECT_EQ(least.met, true);
  const Verdict most = judge({"delivered", Sense::at_most, 0.75}, 1.0, std::nullopt);
  EXPECT_EQ(most.margin, -0.25);
  EXPECT_EQ(most.met, false);
}

TEST(Judge, CannotTellWithinTwoStandardErrors) {
  EXPECT_EQ(judge({"delivered", Sense::at_least, 0.5}, 0.515, 0.01).met, std::nullopt);
  EXPECT_EQ(judge({"delivered", Sense::at_least, 0.5}, 0.485, 0.01).met, std::nullopt);
  EXPECT_EQ(judge({"delivered", Sense::at_least, 0.5}, 0.525, 0.01).met, true);
  EXPECT_EQ(judge({"delivered", Sense::at_least, 0.5}, 0.475, 0.01).met, false);
}

TEST(Judge, ForgivesRounding) {
  EXPECT_EQ(judge({"angle", Sense::at_most, 45.0}, 45.00000000000001, std::nullopt).met, true);
  EXPECT_EQ(judge({"delivered", Sense::at_least, 1.0}, 0.9999999999999998, 1e-17).met, true);
  EXPECT_EQ(judge({"delivered", Sense::at_least, 1.0}, 0.999999999, 0.0).met, false);
}

TEST(Judge, CannotTellWithoutAValue) {
  const Verdict verdict = judge({"delivered", Sense::at_least, 0.5}, std::nullopt, std::nullopt);
  EXPECT_EQ(verdict.margin, std::nullopt);
  EXPECT_EQ(verdict.met, std::nullopt);
}

TEST(Requirements, ReadEveryPathOfTheBudget) {
  EXPECT_EQ(value_of("delivered"), 0.9);
  EXPECT_EQ(value_of("budget.delivered"), 0.9);
  EXPECT_EQ(value_of("budget.uncertainty"), 0.001);
  EXPECT_EQ(value_of("budget.rays"), 4096.0);
  EXPECT_EQ(value_of("budget.stations.fold no. 2.absorbed"), 0.08);
  EXPECT_EQ(value_of("budget.stations[0].absorbed"), 0.08);
  EXPECT_EQ(value_of("budget.stations.fold no. 2.incidence_deg.max"), 50.0);
  EXPECT_EQ(value_of("budget.by_wavelength[1].delivered"), 0.85);
  EXPECT_EQ(value_of("budget.by_field[0].delivered"), 0.92);
  EXPECT_EQ(value_of("budget.by_field.edge.delivered"), 0.88);
}

TEST(Requirements, HaveNoValueWhereTheFigureIsNull) {
  EXPECT_EQ(value_of("budget.stations.fold no. 2.pass_s"), std::nullopt);
}

TEST(Requirements, CarryTheUncertaintyOfDelivered) {
  const Judgement judgement = judgement_of({"delivered", "budget.stations[0].absorbed"});
  EXPECT_EQ(judgement.verdicts[0].uncertainty, 0.001);
  EXPECT_EQ(judgement.verdicts[1].uncertainty, std::nullopt);
}

TEST(Requirements, OfALaterCommandCannotBeTold) {
  const Judgement judgement = judgement_of({"ghosts.total"});
  EXPECT_TRUE(judgement.faults.none());
  ASSERT_EQ(judgement.verdicts.size(), 1U);
  EXPECT_EQ(judgement.verdicts[0].value, std::nullopt);
  EXPECT_EQ(judgement.verdicts[0].met, std::nullopt);
  EXPECT_THAT(
      judgement.warnings,
      ElementsAre("ghosts.total cannot be told: its analysis was not made"));
  EXPECT_FALSE(judgement.all_met());
}

TEST(Requirements, OfAnUnknownQuantityAreAFaultWithTheNearest) {
  EXPECT_THAT(fault_of("delivred"), HasSubstr("there is no quantity 'delivred'"));
  EXPECT_THAT(fault_of("delivred"), HasSubstr("did you mean 'delivered'?"));
  EXPECT_THAT(fault_of("budget.stations.fold no. 2.absorbd"),
              HasSubstr("did you mean 'budget.stations.fold no. 2.absorbed'?"));
  EXPECT_THAT(fault_of("budget.by_wavelength[2].delivered"), HasSubstr("there is no quantity"));
}

TEST(Requirements, AreAllMetWhereThereAreNone) {
  EXPECT_TRUE(judgement_of({}).all_met());
}

/// A bare window in front of a sensor; `rest` is added to the file.
CheckResult check_window(const std::string& rest) {
  return check(support::loaded(R"(
light: {wavelengths: [532], beam: {radius: 1}}
media: {glass: {index: 1.5}}
train:
  - {name: front, into: glass, gap: 1}
  - {name: rear, into: air, gap: 1}
  - {name: sensor, does: detect}
)" + rest));
}

TEST(Check, JudgesWhatTheTrainDelivers) {
  const CheckResult result = check_window("requirements:\n"
                                          "  - {quantity: delivered, at_least: 0.92}\n"
                                          "  - {quantity: budget.stations.front.aside, at_most: 0.03}\n");
  ASSERT_TRUE(result.judgement);
  EXPECT_NEAR(result.judgement->verdicts[0].value.value_or(0.0), 0.96 * 0.96, 1e-14);
  EXPECT_EQ(result.judgement->verdicts[0].met, true);
  EXPECT_EQ(result.judgement->verdicts[1].met, false);
  EXPECT_FALSE(result.judgement->all_met());
}

TEST(Check, TellsThePlaceOfAnUnknownQuantity) {
  const CheckResult result = check_window("requirements:\n  - {quantity: nothing.much, at_least: 0.92}\n");
  EXPECT_FALSE(result.judgement);
  ASSERT_EQ(result.faults.count(), 1U);
  EXPECT_EQ(result.faults.kept()[0].mark.line, 9);
  EXPECT_EQ(result.faults.kept()[0].mark.column, 16);
}

TEST(Check, LaysOutAnAssemblyThatRequiresNothing) {
  const CheckResult result = check_window("");
  ASSERT_TRUE(result.judgement);
  EXPECT_THAT(result.judgement->verdicts, IsEmpty());
}

TEST(Check, FindsAFocusThatIsNone) {
  const CheckResult result = check(support::loaded(R"(
light: {wavelengths: [532], beam: {radius: 1}}
media: {glass: {index: 1.5}}
train:
  - {name: front, into: glass, gap: 1}
  - {name: rear, into: air, gap: focus}
  - {name: sensor, does: detect}
)"));
  EXPECT_FALSE(result.judgement);
  EXPECT_FALSE(result.faults.none());
}

} // namespace
} // namespace lightledger::analysis
