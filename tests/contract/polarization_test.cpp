#include "program.hpp"
#include "systems.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <cmath>
#include <sstream>

namespace lightledger::contract {
namespace {

using testing::Contains;
using testing::HasSubstr;
using testing::IsSupersetOf;

constexpr const char* relay = "systems/relay-terminal.yaml";
constexpr const char* crossed = "systems/relay-terminal-crossed.yaml";

Json polarization_of(Arguments arguments) {
  arguments.insert(arguments.begin(), "polarization");
  return json_of(std::move(arguments))["polarization"];
}

TEST(PolarizationCommand, KeepsTheContractsKeys) {
  const Json json = polarization_of({relay});
  EXPECT_THAT(keys_of(json), IsSupersetOf({"chief", "detector", "attribution"}));
  EXPECT_THAT(keys_of(json["chief"]),
              IsSupersetOf({"wavelength_nm", "field", "jones", "mueller", "diattenuation", "retardance_deg",
                            "rotation_deg", "stations"}));
  EXPECT_EQ(keys_of(json["chief"]["stations"][0]),
            (std::vector<std::string>{"name", "stokes", "dop", "azimuth_deg", "ellipticity_deg",
                                      "diattenuation", "retardance_deg"}));
  EXPECT_THAT(keys_of(json["detector"]),
              IsSupersetOf({"stokes", "dop", "mueller", "depolarization_index", "diattenuation",
                            "polarizance", "retardance_deg", "linear_extinction", "extinction",
                            "cross_leakage", "rotation_deg", "coherent_share"}));
  EXPECT_EQ(
      keys_of(json["attribution"][0]),
      (std::vector<std::string>{"name", "diattenuation", "retardance_deg", "dop_loss", "cross_leakage"}));
}

TEST(PolarizationCommand, LeavesTheDetectorOutOfStationsAndAttribution) {
  const Json json = polarization_of({minimal});
  ASSERT_EQ(json["chief"]["stations"].size(), 2U);
  ASSERT_EQ(json["attribution"].size(), 2U);
  EXPECT_EQ(json["attribution"][1]["name"], "window rear");
  EXPECT_TRUE(json["chief"]["field"].is_null());
}

TEST(PolarizationCommand, GivesMatricesRowByRow) {
  const Json json = polarization_of({minimal});
  ASSERT_EQ(json["detector"]["mueller"].size(), 4U);
  EXPECT_EQ(json["detector"]["mueller"][3].size(), 4U);
  EXPECT_EQ(json["chief"]["jones"][1][0].size(), 2U);
}

TEST(PolarizationCommand, DeliversWhatTheBudgetDelivers) {
  for (const char* system : {minimal, lidar, relay}) {
    const double delivered = json_of({"budget", system, "--rays", "4096"})["budget"]["delivered"];
    const Json json = polarization_of({system, "--rays", "4096"});
    EXPECT_NEAR(json["detector"]["stokes"][0].get<double>(), delivered, 1e-13);
  }
}

TEST(PolarizationCommand, HasNoCrossLeakageOfUnpolarizedLight) {
  const Json json = polarization_of({minimal});
  EXPECT_TRUE(json["detector"]["cross_leakage"].is_null());
  EXPECT_TRUE(json["attribution"][0]["cross_leakage"].is_null());
}

TEST(PolarizationCommand, GivesTheSameBytesForAnyNumberOfThreads) {
  EXPECT_EQ(run({"polarization", lidar, "--threads", "1", "--json", "-"}).out,
            run({"polarization", lidar, "--threads", "3", "--json", "-"}).out);
}

TEST(PolarizationCommand, ReachesTheAccuracyAskedFor) {
  const Json json = polarization_of({lidar, "--accuracy", "1e-6"});
  EXPECT_LE(json["detector"]["uncertainty"].get<double>(), 1e-6);
}

TEST(PolarizationCommand, HasNoErrorsForAPatternWithoutThem) {
  const Json json = polarization_of({lidar, "--set", "light.rays={pattern: rings, rings: 4, spokes: 8}"});
  EXPECT_TRUE(json["detector"]["uncertainty"].is_null());
  EXPECT_TRUE(json["detector"]["standard_errors"].is_null());
}

TEST(PolarizationCommand, FillsEightyColumnsAtMost) {
  for (const char* system : {minimal, lidar, relay, crossed}) {
    std::istringstream lines(run({"polarization", system, "--against", "wavelength", "--rays", "256"}).out);
    for (std::string line; std::getline(lines, line);)
      EXPECT_LE(line.size(), 80U) << line;
  }
}

TEST(PolarizationCommand, SaysWhereTheDetectorsAxesPointAndWhoseRightIsMeant) {
  const std::string text = run({"polarization", lidar}).out;
  EXPECT_THAT(text, HasSubstr("At the detector x points along (1, 0, 0) of the bench and y along"));
  EXPECT_THAT(text, HasSubstr("Right is that of IEEE"));
}

TEST(PolarizationCommand, NamesTheGuiltyFoldsOfTheRelay) {
  const std::string text = run({"polarization", relay}).out;
  EXPECT_THAT(text, HasSubstr("for cross leakage fold"));
  EXPECT_THAT(text, HasSubstr("protected_gold bring"));
}

TEST(PolarizationCommand, SeesThatTheCrossedFoldsOfTheRelayCancel) {
  const Json json = polarization_of({crossed});
  ASSERT_EQ(json["cancelling"].size(), 2U);
  EXPECT_EQ(json["cancelling"][0]["names"], (Json{"fold 1", "fold 2"}));
}

TEST(Relay, ScramblesAHundredthAndIsCuredByCrossedFolds) {
  EXPECT_NEAR(polarization_of({relay})["detector"]["cross_leakage"].get<double>(), 0.00974, 1e-4);
  EXPECT_EQ(run({"check", relay}).code, 1);
  EXPECT_EQ(run({"check", crossed}).code, 0);
}

TEST(Check, JudgesPolarizationWithItsUncertainty) {
  const Json verdict = json_of({"check", crossed})["check"]["requirements"][1];
  EXPECT_EQ(verdict["quantity"], "polarization.detector.cross_leakage");
  EXPECT_TRUE(verdict["uncertainty"].is_number());
  EXPECT_TRUE(verdict["met"].get<bool>());
}

TEST(Check, TakesAnExtinctionWithoutBoundsForEnough) {
  const Scratch scratch;
  const std::string file = scratch.file("pure.yaml", R"(
light: {wavelengths: [500], polarization: {linear: 0}, beam: {radius: 1}}
train:
  - {name: analyser, polarize: {axis: 0}, gap: 1}
  - {name: end, does: detect}
requirements:
  - {quantity: polarization.detector.extinction, at_least: 1e9}
)");
  const Outcome outcome = run({"check", file, "--json", "-"});
  EXPECT_EQ(outcome.code, 0);
  const Json verdict = Json::parse(outcome.out)["check"]["requirements"][0];
  EXPECT_TRUE(verdict["value"].is_null());
  EXPECT_TRUE(verdict["met"].get<bool>());
}

TEST(Check, SuggestsTheNearestFigureOfPolarization) {
  const Outcome outcome = run({"check", relay, "--set",
                               "requirements=[{quantity: polarization.detector.cross_leakige, at_most: 1}]"});
  EXPECT_EQ(outcome.code, 2);
  EXPECT_THAT(outcome.err, HasSubstr("did you mean 'polarization.detector.cross_leakage'?"));
}

TEST(PolarizationCommand, PutsAStationARowIntoTheCsv) {
  const std::string csv = run({"polarization", minimal, "--csv", "-"}).out;
  EXPECT_EQ(std::ranges::count(csv, '\n'), 3);
  EXPECT_THAT(csv, HasSubstr("station,name,s0,s1,s2,s3,dop,"));
}

TEST(PolarizationCommand, PutsTheTableAgainstTheWavelengthIntoCsvAndJson) {
  const std::string csv = run({"polarization", relay, "--against", "wavelength", "--csv", "-"}).out;
  EXPECT_EQ(std::ranges::count(csv, '\n'), 42);
  EXPECT_THAT(csv, HasSubstr("wavelength_nm,delivered,dop,azimuth_deg,"));
  const Json json = polarization_of({relay, "--against", "angle"});
  EXPECT_EQ(json["table"]["against"], "angle");
  EXPECT_EQ(json["table"]["rows"].size(), 41U);
}

TEST(PolarizationCommand, WritesMapsAndChartsIntoAFolder) {
  const Scratch scratch;
  const std::string folder = scratch.path("maps");
  EXPECT_EQ(run({"polarization", relay, "--maps", folder, "--against", "wavelength", "--quiet"}).code, 0);
  std::vector<std::string> names;
  for (const auto& entry : std::filesystem::directory_iterator(folder))
    names.push_back(entry.path().filename().string());
  EXPECT_THAT(names, IsSupersetOf({"diattenuation.png", "retardance_deg.png", "cross_leakage.png",
                                   "pupil.csv", "against-wavelength.csv", "against-wavelength-angles.svg"}));
  EXPECT_EQ(content(folder + "/diattenuation.png").substr(1, 3), "PNG");
}

TEST(PolarizationCommand, RefusesAFolderThatIsAFile) {
  const Scratch scratch;
  const std::string file = scratch.file("maps", "text");
  const Outcome outcome = run({"polarization", minimal, "--maps", file});
  EXPECT_EQ(outcome.code, 2);
  EXPECT_THAT(outcome.err, HasSubstr("is no folder to write into"));
}

TEST(PolarizationCommand, RefusesAnythingElseToSetAgainst) {
  const Outcome outcome = run({"polarization", minimal, "--against", "wavelenth"});
  EXPECT_EQ(outcome.code, 2);
  EXPECT_THAT(outcome.err, HasSubstr("did you mean 'wavelength'?"));
}

} // namespace
} // namespace lightledger::contract
