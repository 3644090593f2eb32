#include "sample.hpp"

#include <lightledger/report/check.hpp>

#include <gmock/gmock.h>
#include <gtest/gtest.h>
#include <nlohmann/json.hpp>

namespace lightledger::report {
namespace {

using analysis::Judgement;
using analysis::Verdict;
using assembly::Sense;
using testing::HasSubstr;

const Verdict met{"delivered", Sense::at_least, 0.8, 0.8899, 1e-4, 0.0899, true};
const Verdict missed{"budget.stations.fold.absorbed", Sense::at_most, 0.05, 0.0887, {}, -0.0387, false};
const Verdict close{"delivered", Sense::at_least, 0.89, 0.8899, 1e-4, -0.0001, {}};
const Verdict later{"ghosts.total", Sense::at_most, 1e-6, {}, {}, {}, {}};

std::string text_of(const std::vector<Verdict>& verdicts, const TextStyle& style = {}) {
  return check_text(sample::assembly(), Judgement{verdicts, {}, {}}, {}, style);
}

TEST(CheckJson, HasEveryFigureOfARequirement) {
  const auto json = nlohmann::ordered_json::parse(
      check_json({"0.1.0", "check", "Title", {}}, Judgement{{met, later}, {}, {}}))["check"];
  EXPECT_EQ(json.dump(), R"({"sound":true,"requirements":[)"
                         R"({"quantity":"delivered","sense":"at_least","limit":0.8,"value":0.8899,)"
                         R"("uncertainty":0.0001,"margin":0.0899,"met":true},)"
                         R"({"quantity":"ghosts.total","sense":"at_most","limit":1e-06,"value":null,)"
                         R"("uncertainty":null,"margin":null,"met":null}],"all_met":false})");
}

TEST(CheckJson, OfNoRequirementsIsAllMet) {
  const auto json = nlohmann::json::parse(check_json({"0.1.0", "check", "Title", {}}, Judgement{}))["check"];
  EXPECT_EQ(json["requirements"], nlohmann::json::array());
  EXPECT_EQ(json["all_met"], true);
}

TEST(CheckCsv, HasOneRowARequirement) {
  EXPECT_EQ(check_csv(Judgement{{missed, later}, {}, {}}),
            "quantity,sense,limit,value,uncertainty,margin,met\r\n"
            "budget.stations.fold.absorbed,at_most,0.05,0.0887,,-0.0387,false\r\n"
            "ghosts.total,at_most,1e-06,,,,\r\n");
}

TEST(CheckText, ListsLimitValueAndMargin) {
  EXPECT_EQ(text_of({met, missed}),
            R"(Fog-bank lidar receiver    532 nm, linear 0 deg

     quantity                             limit    value    margin
  1  delivered                      >=   0.8000   0.8899   0.08990  met
  2  budget.stations.fold.absorbed  <=  0.05000  0.08870  -0.03870  not met

The file is sound. Requirements not met: 2.
)");
}

TEST(CheckText, SaysThatEverythingIsMet) {
  EXPECT_THAT(text_of({met}), HasSubstr("The file is sound; every requirement is met.\n"));
  EXPECT_THAT(text_of({}), HasSubstr("The file is sound; it states no requirements.\n"));
}

TEST(CheckText, AdvisesMoreRaysWhereTheAccuracyIsTooPoor) {
  EXPECT_THAT(text_of({close}), HasSubstr("Requirements cannot be told: 1.\n"
                                          "delivered lies within two standard errors (0.0002)"));
}

TEST(CheckText, GivesFractionsButNoAnglesInDecibels) {
  const Verdict angle{"budget.stations.fold.incidence_deg.max", Sense::at_most, 45.0, 44.0, {}, 1.0, true};
  const std::string text = text_of({met, angle}, {.width = 120, .decibels = true});
  EXPECT_THAT(text, HasSubstr("-0.969  -0.507   0.463  met"));
  EXPECT_THAT(text, HasSubstr("45.00   44.00   1.000  met"));
}

TEST(CheckText, EmphasisesTheVerdictThatFails) {
  EXPECT_THAT(text_of({met, missed}, {.emphasis = true}), HasSubstr("\x1b[1;31mnot met: 2\x1b[0m."));
}

} // namespace
} // namespace lightledger::report
