#include "program.hpp"
#include "systems.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <cmath>

namespace lightledger::contract {
namespace {

using testing::HasSubstr;

using Keys = std::vector<std::string>;

const Keys station_keys{"name",     "does",          "incident", "onward",    "aside",
                        "absorbed", "clipped",       "missed",   "scattered", "extra",
                        "bulk",     "transmittance", "pass_s",   "pass_p",    "incidence_deg"};

/// launched − delivered − all losses, from the JSON alone.
double closure(const Json& budget) {
  double rest = budget["launched"].get<double>() - budget["delivered"].get<double>();
  for (const Json& station : budget["stations"])
    for (const char* loss : {"aside", "absorbed", "clipped", "missed", "scattered", "extra", "bulk"})
      rest -= station[loss].get<double>();
  return rest;
}

TEST(BudgetCommand, KeepsTheContractsKeysAndTheirOrder) {
  const Json json = json_of({"budget", lidar});
  EXPECT_EQ(keys_of(json), (Keys{"lightledger", "contract", "command", "title", "warnings", "budget"}));
  EXPECT_EQ(json["contract"], 1);
  EXPECT_EQ(keys_of(json["budget"]), (Keys{"launched", "delivered", "uncertainty", "rays", "closure_error",
                                           "stations", "by_wavelength", "by_field"}));
  for (const Json& station : json["budget"]["stations"])
    EXPECT_EQ(keys_of(station), station_keys);
  EXPECT_EQ(keys_of(json["budget"]["by_field"][0]), (Keys{"name", "at", "delivered"}));
}

class Systems : public testing::TestWithParam<const char*> {};

TEST_P(Systems, CloseTheirLedgers) {
  const Json budget = json_of({"budget", GetParam()})["budget"];
  EXPECT_LT(std::abs(budget["closure_error"].get<double>()), 1e-12);
  EXPECT_LT(std::abs(closure(budget)), 1e-12);
}

TEST_P(Systems, PassOnFromStationToStationWhatTheGapLeaves) {
  const Json stations = json_of({"budget", GetParam()})["budget"]["stations"];
  for (std::size_t i = 1; i < stations.size(); ++i)
    EXPECT_NEAR(stations[i]["incident"].get<double>(),
                stations[i - 1]["onward"].get<double>() - stations[i - 1]["bulk"].get<double>(), 1e-14);
}

INSTANTIATE_TEST_SUITE_P(All, Systems, testing::Values(minimal, lidar), [](const auto& each) {
  return std::string(each.param == minimal ? "minimal" : "lidar");
});

// Fused silica at 532 nm (Malitson 1965): two bare faces transmit (4n/(n+1)²)².
TEST(BudgetCommand, GivesTheTextbookTransmittanceOfABareWindow) {
  const double n = json_of({"media", "fused-silica", "--wavelengths", "532"})["media"][0]["rows"][0]["n"];
  EXPECT_NEAR(n, 1.46071, 5e-6);
  const double face = 4.0 * n / ((n + 1.0) * (n + 1.0));
  EXPECT_NEAR(json_of({"budget", minimal})["budget"]["delivered"].get<double>(), face * face, 1e-13);
}

TEST(BudgetCommand, SplitsByWavelengthOnRequest) {
  const Json budget = json_of(
      {"budget", minimal, "--split", "wavelength", "--set", "light.wavelengths=[532, 1064]"})["budget"];
  ASSERT_EQ(budget["ledgers"].size(), 2U);
  EXPECT_EQ(keys_of(budget["ledgers"][0]), (Keys{"wavelength_nm", "stations"}));
  EXPECT_EQ(budget["ledgers"][1]["wavelength_nm"], 1064.0);
  EXPECT_NEAR(budget["ledgers"][1]["stations"].back()["onward"].get<double>(),
              budget["by_wavelength"][1]["delivered"].get<double>(), 1e-14);
}

TEST(BudgetCommand, SplitsByFieldOnRequest) {
  const Json budget = json_of({"budget", lidar, "--split", "field"})["budget"];
  ASSERT_EQ(budget["ledgers"].size(), budget["by_field"].size());
  EXPECT_EQ(keys_of(budget["ledgers"][0]), (Keys{"name", "stations"}));
  EXPECT_EQ(budget["ledgers"][0]["name"], budget["by_field"][0]["name"]);
}

TEST(BudgetCommand, TracesTheRaysAskedForRoundedUpToSixteen) {
  EXPECT_EQ(json_of({"budget", minimal, "--rays", "1000"})["budget"]["rays"], 1008);
}

TEST(BudgetCommand, HasNoUncertaintyForAPatternWithoutOne) {
  const Json budget =
      json_of({"budget", minimal, "--set", "light.rays={pattern: rings, rings: 4, spokes: 8}"})["budget"];
  EXPECT_TRUE(budget["uncertainty"].is_null());
  EXPECT_EQ(budget["rays"], 32);
}

TEST(BudgetCommand, ReachesTheAccuracyAskedFor) {
  const Json budget = json_of({"budget", lidar, "--accuracy", "1e-5"})["budget"];
  EXPECT_LE(budget["uncertainty"].get<double>(), 1e-5);
}

TEST(BudgetCommand, GivesTheSameBytesForAnyNumberOfThreads) {
  EXPECT_EQ(run({"budget", lidar, "--threads", "1", "--json", "-"}).out,
            run({"budget", lidar, "--threads", "3", "--json", "-"}).out);
}

TEST(BudgetCommand, PutsTheStationsTableIntoTheCsv) {
  const std::string csv = run({"budget", lidar, "--csv", "-"}).out;
  const Json budget = json_of({"budget", lidar})["budget"];
  const Json& stations = budget["stations"];
  EXPECT_EQ(static_cast<std::size_t>(std::ranges::count(csv, '\n')),
            1 + stations.size() + budget["by_wavelength"].size() + budget["by_field"].size());
  EXPECT_THAT(csv, HasSubstr("\r\n5,fold,reflect," + stations[4]["incident"].dump() + ","));
}

TEST(BudgetCommand, SpeaksOfTheLargestLossesInPerCent) {
  const std::string text = run({"budget", minimal}).out;
  EXPECT_THAT(text, HasSubstr("Rain window    532 nm, unpolarized\n"));
  EXPECT_THAT(text, HasSubstr("\n  1  window front "));
  EXPECT_THAT(
      text, HasSubstr("\nLargest losses: window front sends 3.5 % aside, window rear sends 3.4 % aside.\n"));
}

} // namespace
} // namespace lightledger::contract
