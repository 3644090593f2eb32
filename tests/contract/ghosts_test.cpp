#include "program.hpp"
#include "systems.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <cmath>

namespace lightledger::contract {
namespace {

using testing::ElementsAre;
using testing::HasSubstr;

using Keys = std::vector<std::string>;

/// The keys of the contract come first, in its order.
void expect_first(const Keys& keys, const Keys& first) {
  ASSERT_GE(keys.size(), first.size());
  EXPECT_EQ(Keys(keys.begin(), keys.begin() + static_cast<std::ptrdiff_t>(first.size())), first);
}

TEST(GhostsCommand, KeepsTheContractsKeysAndTheirOrder) {
  const Json json = json_of({"ghosts", lidar, "--rays", "256"});
  EXPECT_EQ(keys_of(json), (Keys{"lightledger", "contract", "command", "title", "warnings", "ghosts"}));
  const Json& ghosts = json["ghosts"];
  expect_first(keys_of(ghosts), {"bounces", "paths_considered", "paths_traced", "total", "uncertainty",
                                 "returned", "not_followed", "ledger", "closure_error", "paths"});
  EXPECT_EQ(keys_of(ghosts["ledger"]), (Keys{"detector", "returned", "leaked", "absorbed", "clipped",
                                             "missed", "scattered", "extra", "bulk", "not_followed"}));
  for (const Json& path : ghosts["paths"]) {
    expect_first(keys_of(path),
                 {"bounces", "power", "uncertainty", "relative_power", "centroid_mm", "rms_radius_mm",
                  "path_excess_mm", "peak_ratio", "stokes", "dop", "fringe_modulation", "by_field"});
    EXPECT_EQ(keys_of(path["by_field"][0]),
              (Keys{"name", "at", "power", "relative_power", "centroid_mm", "rms_radius_mm"}));
  }
}

class GhostSystems : public testing::TestWithParam<const char*> {};

TEST_P(GhostSystems, AccountForAllTheirLightWithFourBounces) {
  const Json ghosts =
      json_of({"ghosts", GetParam(), "--bounces", "4", "--floor", "1e-7", "--rays", "16"})["ghosts"];
  double sum = 0.0;
  for (const auto& [name, power] : ghosts["ledger"].items()) {
    EXPECT_GE(power.get<double>(), 0.0) << name;
    sum += power.get<double>();
  }
  EXPECT_NEAR(sum, 1.0, 1e-12);
  EXPECT_LT(std::abs(ghosts["closure_error"].get<double>()), 1e-12);
  double listed = ghosts["unlisted"]["power"];
  for (const Json& path : ghosts["paths"])
    listed += path["power"].get<double>();
  EXPECT_NEAR(listed, ghosts["total"].get<double>(), 1e-12);
}

INSTANTIATE_TEST_SUITE_P(All, GhostSystems,
                         testing::Values(minimal, lidar, "systems/relay-terminal.yaml",
                                         "systems/harbour-monitor.yaml",
                                         "systems/fog-bank-transceiver.yaml"));

// A bare window of n = 1.46071 (Malitson 1965): one pair, R² of what is delivered.
TEST(GhostsCommand, GivesTheTextbookGhostOfABareWindow) {
  const double n = json_of({"media", "fused-silica", "--wavelengths", "532"})["media"][0]["rows"][0]["n"];
  const double r = std::pow((n - 1.0) / (n + 1.0), 2.0);
  const Json ghosts = json_of({"ghosts", minimal, "--rays", "64"})["ghosts"];
  EXPECT_EQ(ghosts["paths_considered"], 1);
  EXPECT_EQ(ghosts["paths_traced"], 1);
  EXPECT_NEAR(ghosts["paths"][0]["relative_power"].get<double>(), r * r, 1e-14);
  EXPECT_NEAR(ghosts["paths"][0]["path_excess_mm"].get<double>(), 2.0 * n * 3.0, 1e-11);
}

TEST(GhostsCommand, ListsAsManyAsAskedFor) {
  EXPECT_EQ(json_of({"ghosts", lidar, "--rays", "64", "--top", "3"})["ghosts"]["paths"].size(), 3U);
  EXPECT_TRUE(json_of({"ghosts", lidar, "--rays", "64", "--returned"})["ghosts"].contains("returned_paths"));
}

TEST(GhostsCommand, RefusesOptionsWithoutSense) {
  for (const Arguments& wrong :
       {Arguments{"--bounces", "3"}, {"--floor", "2"}, {"--top", "0"}, {"--field", "nowhere"}}) {
    Arguments arguments{"ghosts", minimal};
    arguments.insert(arguments.end(), wrong.begin(), wrong.end());
    const Outcome outcome = run(arguments);
    EXPECT_EQ(outcome.code, 2) << wrong[0];
    EXPECT_THAT(outcome.err, HasSubstr(wrong[0]));
    EXPECT_EQ(outcome.out, "");
  }
}

TEST(GhostsCommand, WritesPicturesOfTheBrightest) {
  const Scratch scratch;
  const Outcome outcome =
      run({"ghosts", minimal, "--rays", "64", "--images", scratch.path("maps"), "--quiet"});
  EXPECT_EQ(outcome.code, 0) << outcome.err;
  for (const char* name : {"image.png", "ghost-01.png", "ghosts.png"})
    EXPECT_EQ(content(scratch.path("maps") + "/" + name).substr(1, 3), "PNG") << name;
}

TEST(GhostsCommand, SaysWhatIsCertain) {
  const Outcome outcome = run({"ghosts", minimal, "--rays", "64"});
  EXPECT_THAT(outcome.out, HasSubstr("all ghosts not listed together bring less"));
  EXPECT_THAT(outcome.out, HasSubstr("edges, mounts and scattered light are not"));
}

TEST(CameraGhosts, MissTheirLimitByOnePairAndKeepItWithABetterCoating) {
  const std::string few = "--rays";
  const Json plain = json_of({"ghosts", "systems/tide-pool-camera.yaml", few, "256"})["ghosts"]["paths"];
  EXPECT_EQ(plain[0]["bounces"], (Json::array({"image", "cover rear"})));
  EXPECT_GT(plain[0]["power"].get<double>(), 3e-4);
  EXPECT_LT(plain[1]["power"].get<double>(), 3e-4);
  const Json better =
      json_of({"ghosts", "systems/tide-pool-camera-recoated.yaml", few, "256"})["ghosts"]["paths"];
  EXPECT_LT(better[0]["power"].get<double>(), 3e-4);
}

} // namespace
} // namespace lightledger::contract
