#include "report/display_width.hpp"
#include "sample.hpp"

#include <lightledger/report/ghosts.hpp>

#include <gmock/gmock.h>
#include <gtest/gtest.h>
#include <nlohmann/json.hpp>

#include <limits>
#include <sstream>

namespace lightledger::report {
namespace {

using analysis::Ghosts;
using testing::HasSubstr;
using testing::Not;

/// Two ghosts of three paths, too bright by 0.0004.
Ghosts sample_ghosts() {
  Ghosts ghosts;
  ghosts.paths_considered = 3;
  ghosts.paths_traced = 3;
  ghosts.delivered = 0.8;
  ghosts.total = 0.0014;
  ghosts.uncertainty = 2e-6;
  ghosts.returned = 0.03;
  ghosts.not_followed = 1e-5;
  ghosts.closure_error = -2e-16;
  ghosts.rays = 4096;
  analysis::Ghost bright;
  bright.bounces = {"L1 rear", "L1 front"};
  bright.stations = {3, 2};
  bright.power = 0.0012;
  bright.relative_power = 0.0015;
  bright.spot = {{0.0, 0.5}, 1.25};
  bright.path_excess_mm = 9.0;
  bright.stokes = {0.0012, 0.0, 0.0, 0.0};
  bright.cure = {{0.04, 0.03}, {0.04, 0.03}};
  analysis::Ghost faint = bright;
  faint.bounces = {"sensor", "L1 rear"};
  faint.power = 0.0002;
  faint.relative_power = 0.00025;
  faint.cure.clear();
  ghosts.paths = {bright, faint};
  ghosts.limit = 0.001;
  ghosts.culprit = {"L1 rear", 0.0014, 0.04, 0.0286};
  ghosts.foci = {{{"sensor"}, {}, "L1 front", "L1 rear", "crown", {}, 4.0, 0.01, 0.02, 350.0}};
  return ghosts;
}

std::string text_of(const Ghosts& ghosts, const GhostsTextOptions& options = {},
                    const TextStyle& style = {}) {
  return ghosts_text(sample::assembly(), ghosts, {}, std::chrono::milliseconds(21), options, style);
}

TEST(GhostsText, TellsTheBrightestTheCureAndWhatIsCertain) {
  EXPECT_EQ(text_of(sample_ghosts()), R"(Fog-bank lidar receiver    532 nm, linear 0 deg

     bounces at             power   relative  rms mm  excess mm
  1  L1 rear, L1 front  1.200e-03  1.500e-03   1.250      9.000
  2  sensor, L1 rear    2.000e-04  2.500e-04   1.250      9.000
ghosts  1.400e-03 +- 2e-06    closes to 2e-16    4 096 rays, 21 ms

That is 0.0004 more than the 0.001 allowed. Curing path 1 is enough: L1 rear
  from 4 % to 3 %, or L1 front from 4 % to 3 %. L1 rear takes part in 100.0 % of
  it: from 4 % to 2.9 % there would do too.
Of 3 paths of at most 2 bounces, 2 bring light. Within the train as written, for
  the rays sampled (+- 2e-06), all ghosts not listed together bring less than
  1e-05 of the launched power; edges, mounts and scattered light are not
  followed.

Foci in or on glass and on surfaces, irradiance relative to the launched beam
bounces at  focus                    radius mm  irradiance ratio
sensor      in crown after L1 front    0.02000           3.5e+02
Focused and returned beams can damage optics and blind: ask a laser safety
  officer, and see IEC 60825-1.
)");
}

TEST(GhostsText, OfFewerRowsCountsTheOthersAsNotListed) {
  const std::string text = text_of(sample_ghosts(), {.rows = 1});
  EXPECT_THAT(text, Not(HasSubstr("  2  ")));
  EXPECT_THAT(text, HasSubstr("0.00021 of the launched power"));
}

TEST(GhostsText, FitsEightyColumnsWithLongNames) {
  Ghosts ghosts = sample_ghosts();
  ghosts.paths[0].bounces = {"collimator front of the second arm, coated",
                             "collimator rear of the second arm"};
  ghosts.foci[0].from = "collimator front of the second arm, coated";
  ghosts.foci[0].bounces = ghosts.paths[0].bounces;
  ghosts.returned_paths = {{ghosts.paths[0].bounces, 0.01}};
  for (const bool decibels : {false, true}) {
    std::istringstream lines(text_of(ghosts, {.returned = true}, {.decibels = decibels}));
    for (std::string line; std::getline(lines, line);)
      EXPECT_LE(display_width(line), 80) << line;
  }
}

TEST(GhostsText, WithoutGhostsSaysSo) {
  Ghosts none;
  none.paths_considered = 0;
  const std::string text = text_of(none);
  EXPECT_THAT(text, HasSubstr("ghosts  -"));
  EXPECT_THAT(text, Not(HasSubstr("bounces at")));
}

TEST(GhostsJson, HasNullWhereAFigureDoesNotExist) {
  Ghosts ghosts = sample_ghosts();
  ghosts.uncertainty.reset();
  ghosts.paths[0].dop = std::numeric_limits<double>::quiet_NaN();
  const auto json = nlohmann::json::parse(ghosts_json({"1", "ghosts", "t", {}}, ghosts, false))["ghosts"];
  EXPECT_TRUE(json["uncertainty"].is_null());
  EXPECT_TRUE(json["paths"][0]["dop"].is_null());
  EXPECT_TRUE(json["paths"][0]["peak_ratio"].is_null());
  EXPECT_EQ(json["brightest"], 0.0012);
  EXPECT_FALSE(json.contains("returned_paths"));
}

TEST(GhostsCsv, HasARowForEachPath) {
  const std::string csv = ghosts_csv(sample_ghosts());
  EXPECT_THAT(csv, HasSubstr("\r\n1,L1 rear > L1 front,0.0012,"));
  EXPECT_EQ(std::count(csv.begin(), csv.end(), '\n'), 3);
}

} // namespace
} // namespace lightledger::report
