#include "report/display_width.hpp"
#include "sample.hpp"

#include <lightledger/report/budget.hpp>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <sstream>

namespace lightledger::report {
namespace {

using testing::HasSubstr;
using testing::Not;

std::string text_of(const analysis::Budget& budget, const TextStyle& style = {},
                    const std::vector<std::string>& warnings = {},
                    const std::vector<analysis::Remedy>& remedies = {}) {
  return budget_text(sample::assembly(), budget, remedies, warnings, std::chrono::milliseconds(21), style);
}

int widest_line(const std::string& text) {
  std::istringstream lines(text);
  int widest = 0;
  for (std::string line; std::getline(lines, line);)
    widest = std::max(widest, display_width(line));
  return widest;
}

/// A budget in which every station loses light in all seven ways.
analysis::Budget lossy_everywhere() {
  analysis::Budget budget = sample::budget();
  double power = 0.01;
  for (analysis::StationBudget& station : budget.stations)
    for (auto loss : {&analysis::StationBudget::aside, &analysis::StationBudget::absorbed,
                      &analysis::StationBudget::clipped, &analysis::StationBudget::missed,
                      &analysis::StationBudget::scattered, &analysis::StationBudget::extra,
                      &analysis::StationBudget::bulk})
      station.*loss = power *= 0.99;
  return budget;
}

TEST(BudgetText, ShowsTheLedgerTheResultAndTheLargestLosses) {
  EXPECT_EQ(text_of(sample::budget()),
            R"(Fog-bank lidar receiver    532 nm, linear 0 deg

     station  reaches   onward    aside  absorbed  clipped  scattered    other
  1  window    1.0000   0.9986   0.0014         -        -          -        -
  2  fold      0.9986   0.9099        -    0.0887        -          -        -
  3  lens      0.9099   0.8899        -         -   0.0200    <0.0001        -
  4  sensor    0.8899   0.8899        -         -        -          -        -
delivered  0.8899 +- 0.0001    closes to 2e-16    16 384 rays, 21 ms

Largest losses: fold absorbs 8.9 %, lens clips 2.0 %, window sends 0.14 % aside.
)");
}

TEST(BudgetText, TellsWhatBetterCoatingsWouldBring) {
  const std::string text =
      text_of(sample::budget(), {}, {}, {{1, true, 0.97001, 0.9, true}, {0, false, 0.00129, 0.8905, false}});
  EXPECT_THAT(text,
              HasSubstr("\nA coating of R >= 0.9701 on fold would bring delivered to 0.9000, as required,\n"
                        "  one of R <= 0.0012 on window to 0.8905.\n"));
}

TEST(BudgetText, FitsEightyColumnsWithAllLossesAndLongNames) {
  analysis::Budget budget = lossy_everywhere();
  budget.stations[1].name = "collimator front of the second arm, coated";
  budget.stations[2].name = "コリメータの前面、第二の腕、被膜あり";
  const std::vector<std::string> warnings{
      "a warning of many words, too many for a line of the terminal, at the end"};
  EXPECT_LE(widest_line(text_of(budget, {}, warnings)), 80);
}

TEST(BudgetText, FoldsTheSmallestLossesIntoOtherWhereTheyDoNotFit) {
  const std::string text = text_of(lossy_everywhere());
  EXPECT_THAT(text, HasSubstr("other"));
  EXPECT_THAT(text, Not(HasSubstr("bulk")));
}

TEST(BudgetText, ShowsEveryLossOnAWideTerminal) {
  const std::string text = text_of(lossy_everywhere(), {.width = 120});
  EXPECT_THAT(text, HasSubstr("aside  absorbed  clipped   missed  scattered    extra     bulk\n"));
}

TEST(BudgetText, KeepsTheColumnsStraightBelowAnyName) {
  analysis::Budget budget = sample::budget();
  budget.stations[0].name = "窓\n前";
  std::istringstream lines(text_of(budget));
  std::string line;
  std::getline(lines, line);
  std::getline(lines, line);
  std::getline(lines, line);
  const int width = display_width(line);
  for (int station = 0; station < 4; ++station) {
    std::getline(lines, line);
    EXPECT_EQ(display_width(line), width) << line;
  }
}

TEST(BudgetText, GivesTheDigitsThatTheErrorSupports) {
  analysis::Budget budget = sample::budget();
  budget.delivered = 0.8898912345;
  budget.uncertainty = 2.3e-6;
  EXPECT_THAT(text_of(budget), HasSubstr("delivered  0.889891 +- 0.000002    "));
}

TEST(BudgetText, GivesNoErrorForAPatternWithoutOne) {
  analysis::Budget budget = sample::budget();
  budget.uncertainty = std::nullopt;
  EXPECT_THAT(text_of(budget), HasSubstr("delivered  0.8899    closes to"));
}

TEST(BudgetText, GivesFractionsInDecibelsOnRequest) {
  const std::string text = text_of(sample::budget(), {.decibels = true});
  EXPECT_THAT(text,
              HasSubstr("  2  fold      -0.006   -0.410        -   -10.521        -          -        -\n"));
  EXPECT_THAT(text, HasSubstr("\nFractions in dB\n"));
  EXPECT_THAT(text, HasSubstr("delivered  -0.5066 dB +- 0.0005 dB    "));
}

TEST(BudgetText, SaysThatNothingArrives) {
  analysis::Budget budget = sample::budget();
  budget.delivered = 0.0;
  EXPECT_THAT(text_of(budget, {.decibels = true}), HasSubstr("delivered  -    closes"));
}

TEST(BudgetText, EmphasisesTheLargestLossAlone) {
  const std::string text = text_of(sample::budget(), {.emphasis = true});
  EXPECT_THAT(text, HasSubstr("\x1b[1;31m0.0887\x1b[0m"));
  EXPECT_THAT(text, HasSubstr("\x1b[1;31mfold absorbs 8.9 %\x1b[0m"));
  EXPECT_EQ(std::ranges::count(text, '\x1b'), 4);
}

TEST(BudgetText, HasNoEscapesWithoutEmphasis) {
  EXPECT_THAT(text_of(sample::budget()), Not(HasSubstr("\x1b")));
}

TEST(BudgetText, ListsWavelengthsAndFieldsWhereThereAreSeveral) {
  analysis::Budget budget = sample::budget();
  budget.by_wavelength = {{532.0, 0.9}, {1064.0, 0.5}};
  budget.by_field = {{std::nullopt, {0.0, 0.0}, 0.75}, {"edge", {0.0, 0.4}, 0.65}};
  const std::string text = text_of(budget);
  EXPECT_THAT(text, HasSubstr("wavelength nm  delivered\n"
                              "          532     0.9000\n"
                              "         1064     0.5000\n"));
  EXPECT_THAT(text, HasSubstr("field  x deg  y deg  delivered\n"
                              "1          0      0     0.7500\n"
                              "edge       0    0.4     0.6500\n"));
}

TEST(BudgetText, ShowsSplitLedgersUnderTheirHeadings) {
  analysis::Budget budget = sample::budget();
  budget.ledgers = {{532.0, std::nullopt, budget.stations}, {std::nullopt, "edge", budget.stations}};
  const std::string text = text_of(budget);
  EXPECT_THAT(text, HasSubstr("At 532 nm, of what is launched there\n     station"));
  EXPECT_THAT(text, HasSubstr("Field edge, of what is launched from it\n     station"));
}

TEST(BudgetText, EndsWithTheWarnings) {
  EXPECT_THAT(text_of(sample::budget(), {}, {"lens: 0.02 % of the power runs backwards."}),
              testing::EndsWith("aside.\nWarning: lens: 0.02 % of the power runs backwards.\n"));
}

} // namespace
} // namespace lightledger::report
