#include <lightledger/analysis/occurring_coatings.hpp>
#include <lightledger/assembly/load.hpp>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <cmath>
#include <string>

namespace lightledger::analysis {
namespace {

using testing::ElementsAre;

std::vector<OccurringCoating> coatings_of(const std::string& train, double wavelength_nm = 550.0) {
  const std::string text = "title: T\nlight:\n  wavelengths: [" + std::to_string(wavelength_nm) +
                           "]\n  beam: {radius: 1}\n  rays: {pattern: rings, rings: 2, spokes: 4}\n"
                           "coatings:\n  ar: {layers: [{medium: MgF2-film, waves: 0.25, at: 550}]}\n"
                           "  thin: {ideal: {reflect: 0.1}}\ntrain:\n" +
                           train + "  - {name: out, does: detect}\n";
  const assembly::Loaded loaded = assembly::load_text("t.yaml", text);
  EXPECT_TRUE(loaded.assembly) << loaded.report();
  return occurring_coatings(*loaded.assembly, *budget(*loaded.assembly).budget);
}

std::vector<double> angles_of(const OccurringCoating& coating) {
  std::vector<double> angles;
  for (const CoatingRow& row : coating.curve.rows)
    if (row.wavelength_nm == coating.curve.rows.front().wavelength_nm)
      angles.push_back(row.angle_deg);
  return angles;
}

const std::string tilted_plate =
    "  - {name: front, into: fused-silica, coating: ar, tilt: [30, 0, 0], gap: 3}\n"
    "  - {name: rear, into: air, coating: ar, tilt: [30, 0, 0], gap: 9}\n";

TEST(OccurringCoatings, JoinTheStationsThatShareCoatingAndMedia) {
  const auto coatings = coatings_of(tilted_plate);
  ASSERT_EQ(coatings.size(), 1U);
  EXPECT_THAT(coatings[0].stations, ElementsAre(0U, 1U));
  EXPECT_EQ(coatings[0].curve.incident, "air");
  EXPECT_EQ(coatings[0].curve.substrate, "fused-silica");
}

/// Inside the plate the angle is Snell's; told outside the coating it is 30° at both faces.
TEST(OccurringCoatings, HaveTheirAnglesOutsideTheCoating) {
  EXPECT_THAT(angles_of(coatings_of(tilted_plate).front()), ElementsAre(30.0));
}

TEST(OccurringCoatings, CoverLeastMeanAndGreatestAngle) {
  const auto coatings = coatings_of("  - {name: front, radius: 5, into: fused-silica, coating: ar, gap: 2}\n"
                                    "  - {name: rear, into: air, gap: 9}\n");
  const std::vector<double> angles = angles_of(coatings.at(0));
  ASSERT_EQ(angles.size(), 3U);
  EXPECT_LT(angles[0], angles[1]);
  EXPECT_LT(angles[1], angles[2]);
  EXPECT_LT(angles[2], std::asin(1.0 / 5.0) * 180.0 / 3.14159265358979);
}

TEST(OccurringCoatings, ReachBeyondTheLight) {
  const auto& rows = coatings_of(tilted_plate).front().curve.rows;
  EXPECT_LE(rows.front().wavelength_nm, 490.0);
  EXPECT_GE(rows.back().wavelength_nm, 610.0);
}

/// Fused silica is known from 210 nm.
TEST(OccurringCoatings, StayWhereTheMediaAreKnown) {
  EXPECT_GE(coatings_of(tilted_plate, 215.0).at(0).curve.rows.front().wavelength_nm, 210.0);
}

TEST(OccurringCoatings, AreNoneOfBareSurfaces) {
  EXPECT_TRUE(
      coatings_of("  - {name: front, into: fused-silica, gap: 3}\n  - {name: rear, into: air, gap: 9}\n")
          .empty());
}

} // namespace
} // namespace lightledger::analysis
