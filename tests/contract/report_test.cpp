#include "program.hpp"
#include "systems.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lightledger::contract {
namespace {

using testing::ElementsAre;
using testing::HasSubstr;
using testing::StartsWith;

TEST(Report, WritesNameHtmlIntoTheCurrentFolder) {
  const Scratch scratch;
  const Outcome outcome = run_shell("file=$PWD/systems/minimal.yaml; cd '" + scratch.path("") +
                                    "' && lightledger report \"$file\" --rays 256");
  EXPECT_EQ(outcome.code, 0) << outcome.err;
  EXPECT_THAT(scratch.names(), ElementsAre("minimal.html"));
  EXPECT_THAT(content(scratch.path("minimal.html")), StartsWith("<!DOCTYPE html>"));
  EXPECT_THAT(outcome.out, HasSubstr("Every requirement is met."));
}

TEST(Report, SucceedsWhereARequirementIsMissed) {
  const Outcome outcome = run(
      {"report", minimal, "--rays", "256", "--out", "/dev/null", "--set", "requirements[0].at_least=0.99"});
  EXPECT_EQ(outcome.code, 0) << outcome.err;
  EXPECT_THAT(outcome.out, HasSubstr("1 not met"));
}

TEST(Report, OnStdoutStandsAlone) {
  EXPECT_THAT(run({"report", minimal, "--rays", "256", "--out", "-"}).out, StartsWith("<!DOCTYPE html>"));
}

TEST(Report, GivesItsDataAsJson) {
  const Json json = json_of({"report", minimal, "--rays", "256", "--out", "/dev/null"});
  EXPECT_EQ(json["command"], "report");
  EXPECT_EQ(json["report"]["budget"]["budget"]["stations"].size(), 3U);
}

TEST(Report, RefusesTwoDocumentsInOnePlace) {
  const Outcome outcome = run({"report", minimal, "--out", "-", "--json", "-"});
  EXPECT_EQ(outcome.code, 2);
  EXPECT_THAT(outcome.err, HasSubstr("--json and --out go to the same place"));
}

} // namespace
} // namespace lightledger::contract
