#include "sample.hpp"

#include <lightledger/report/budget.hpp>

#include <gtest/gtest.h>
#include <nlohmann/json.hpp>

#include <cmath>
#include <limits>

namespace lightledger::report {
namespace {

using Json = nlohmann::ordered_json;

const Envelope envelope{"0.1.0", "budget", "Fog-bank lidar receiver", {"mind the gap"}};

Json json_of(const analysis::Budget& budget) {
  return Json::parse(budget_json(envelope, budget));
}

std::vector<std::string> keys_of(const Json& object) {
  std::vector<std::string> keys;
  for (const auto& [key, value] : object.items())
    keys.push_back(key);
  return keys;
}

using Keys = std::vector<std::string>;

TEST(BudgetJson, HasTheEnvelopeInItsOrder) {
  const Json json = json_of(sample::budget());
  EXPECT_EQ(keys_of(json), (Keys{"lightledger", "contract", "command", "title", "warnings", "budget"}));
  EXPECT_EQ(json["lightledger"], "0.1.0");
  EXPECT_EQ(json["contract"], 1);
  EXPECT_EQ(json["command"], "budget");
  EXPECT_EQ(json["title"], "Fog-bank lidar receiver");
  EXPECT_EQ(json["warnings"], Json::array({"mind the gap"}));
}

TEST(BudgetJson, HasTheKeysOfTheBudgetInTheirOrder) {
  EXPECT_EQ(keys_of(json_of(sample::budget())["budget"]),
            (Keys{"launched", "delivered", "uncertainty", "rays", "closure_error", "stations",
                  "by_wavelength", "by_field"}));
}

TEST(BudgetJson, HasTheKeysOfAStationInTheirOrder) {
  EXPECT_EQ(keys_of(json_of(sample::budget())["budget"]["stations"][0]),
            (Keys{"name", "does", "incident", "onward", "aside", "absorbed", "clipped", "missed", "scattered",
                  "extra", "bulk", "transmittance", "pass_s", "pass_p", "incidence_deg"}));
}

TEST(BudgetJson, KeepsFullDoublePrecision) {
  analysis::Budget budget = sample::budget();
  budget.delivered = 0.1 + 0.2;
  EXPECT_EQ(json_of(budget)["budget"]["delivered"].get<double>(), 0.1 + 0.2);
}

TEST(BudgetJson, HasNullForWhatDoesNotExist) {
  analysis::Budget budget = sample::budget();
  budget.uncertainty = std::nullopt;
  const Json json = json_of(budget)["budget"];
  EXPECT_TRUE(json["uncertainty"].is_null());
  EXPECT_TRUE(json["stations"][3]["pass_s"].is_null());
  EXPECT_TRUE(json["stations"][3]["incidence_deg"].is_null());
  EXPECT_TRUE(json["by_field"][0]["name"].is_null());
}

TEST(BudgetJson, HasNullForNumbersThatAreNotFinite) {
  analysis::Budget budget = sample::budget();
  budget.uncertainty = std::nan("");
  budget.closure_error = std::numeric_limits<double>::infinity();
  const Json json = json_of(budget)["budget"];
  EXPECT_TRUE(json["uncertainty"].is_null());
  EXPECT_TRUE(json["closure_error"].is_null());
}

TEST(BudgetJson, HasLedgersOnlyWithASplit) {
  analysis::Budget budget = sample::budget();
  EXPECT_FALSE(json_of(budget)["budget"].contains("ledgers"));
  budget.ledgers = {{532.0, std::nullopt, budget.stations}};
  EXPECT_EQ(keys_of(json_of(budget)["budget"]["ledgers"][0]), (Keys{"wavelength_nm", "stations"}));
  budget.ledgers = {{std::nullopt, std::nullopt, budget.stations}};
  EXPECT_EQ(keys_of(json_of(budget)["budget"]["ledgers"][0]), (Keys{"name", "stations"}));
}

TEST(BudgetJson, ReplacesBytesThatAreNoUtf8) {
  analysis::Budget budget = sample::budget();
  budget.stations[0].name = "a\xFFz";
  EXPECT_EQ(json_of(budget)["budget"]["stations"][0]["name"], "a\uFFFDz");
}

} // namespace
} // namespace lightledger::report
