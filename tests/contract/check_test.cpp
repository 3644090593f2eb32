#include "program.hpp"
#include "systems.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lightledger::contract {
namespace {

using testing::HasSubstr;
using Keys = std::vector<std::string>;

Outcome check(const std::string& requirements) {
  return run({"check", minimal, "--json", "-", "--set", "requirements=" + requirements});
}

TEST(CheckCommand, KeepsTheContractsKeysAndTheirOrder) {
  const Json json = json_of({"check", minimal});
  EXPECT_EQ(keys_of(json), (Keys{"lightledger", "contract", "command", "title", "warnings", "check"}));
  EXPECT_EQ(keys_of(json["check"]), (Keys{"sound", "requirements", "all_met"}));
  EXPECT_EQ(keys_of(json["check"]["requirements"][0]),
            (Keys{"quantity", "sense", "limit", "value", "uncertainty", "margin", "met"}));
}

TEST(CheckCommand, FindsTheProjectsSystemsSoundAndWithinTheirRequirements) {
  for (const char* file : {minimal, lidar}) {
    const Json verdict = json_of({"check", file})["check"];
    EXPECT_EQ(verdict["sound"], true);
    EXPECT_EQ(verdict["all_met"], true);
  }
}

TEST(CheckCommand, OfNoRequirementsIsAllMet) {
  const Outcome outcome = check("[]");
  EXPECT_EQ(outcome.code, 0) << outcome.err;
  EXPECT_EQ(Json::parse(outcome.out)["check"]["all_met"], true);
}

TEST(CheckCommand, EndsWithOneWhereARequirementIsNotMet) {
  const Outcome outcome = check("[{quantity: delivered, at_least: 0.99}]");
  EXPECT_EQ(outcome.code, 1);
  EXPECT_EQ(outcome.err, "");
  const Json verdict = Json::parse(outcome.out)["check"];
  EXPECT_EQ(verdict["all_met"], false);
  EXPECT_EQ(verdict["requirements"][0]["met"], false);
  EXPECT_LT(verdict["requirements"][0]["margin"].get<double>(), 0.0);
}

TEST(CheckCommand, EndsWithOneWhereARequirementCannotBeTold) {
  const Outcome outcome = check("[{quantity: budget.stations.diode.pass_s, at_least: 0.5}]");
  EXPECT_EQ(outcome.code, 1);
  const Json json = Json::parse(outcome.out);
  EXPECT_TRUE(json["check"]["requirements"][0]["value"].is_null());
  EXPECT_TRUE(json["check"]["requirements"][0]["met"].is_null());
}

TEST(CheckCommand, CannotTellAtTooPoorAnAccuracy) {
  const Json budget =
      json_of({"budget", minimal, "--rays", "16", "--set", "diode.clear={diameter: 5}"})["budget"];
  const Outcome outcome = run(
      {"check", minimal, "--rays", "16", "--set", "diode.clear={diameter: 5}", "--set",
       "requirements=[{quantity: delivered, at_least: " + budget["delivered"].dump() + "}]", "--json", "-"});
  ASSERT_GT(budget["uncertainty"].get<double>(), 0.0);
  EXPECT_EQ(outcome.code, 1) << outcome.err;
  EXPECT_TRUE(Json::parse(outcome.out)["check"]["requirements"][0]["met"].is_null());
}

TEST(CheckCommand, ReadsFiguresOfStationsByName) {
  const Outcome outcome = check("[{quantity: budget.stations.window rear.incidence_deg.max, at_most: 1}]");
  EXPECT_EQ(outcome.code, 0) << outcome.err;
}

TEST(CheckCommand, RefusesAnUnknownQuantityWithTheNearest) {
  const Outcome outcome = check("[{quantity: delivred, at_least: 0.5}]");
  EXPECT_EQ(outcome.code, 2);
  EXPECT_EQ(outcome.out, "");
  EXPECT_THAT(outcome.err, HasSubstr("did you mean 'delivered'?"));
}

TEST(CheckCommand, StillSucceedsInTextWhenQuiet) {
  EXPECT_EQ(run({"check", minimal, "--quiet"}).code, 0);
  EXPECT_EQ(run({"check", minimal, "--quiet", "--set", "requirements[0].at_least=0.99"}).code, 1);
}

} // namespace
} // namespace lightledger::contract
