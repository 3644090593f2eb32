#include "support/walk.hpp"

#include <lightledger/analysis/coating_curve.hpp>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <cmath>
#include <numbers>

namespace lightledger::analysis {
namespace {

using testing::ElementsAre;
using testing::HasSubstr;

/// A glass plate, coated in front and bare behind, and a coated mirror; media of plain indices.
constexpr const char* file = R"(
title: Plate and mirror
light: {wavelengths: [500, 600], beam: {radius: 1}}
media:
  glass: {index: 1.5}
  film: {index: 1.25}
  dye: {table: [[400, 1.3, 0.01], [700, 1.3, 0.01]]}
  tin: {index: 2, kappa: 4}
coatings:
  quarter: {layers: [{medium: film, waves: 0.25, at: 500}]}
  dyed: {layers: [{medium: dye, thickness: 200}]}
  filter: {ideal: {reflect: 0.25, transmit: 0.5}}
  black: {ideal: {reflect: 0, transmit: 0.5}}
  spare: {layers: [{medium: glass, thickness: 100}, {medium: film, thickness: 50}]}
train:
  - {name: front, into: glass, coating: quarter, gap: 1}
  - {name: rear, into: air, gap: 1}
  - {name: mirror, does: reflect, backing: tin, coating: dyed, gap: 1}
  - {name: sensor, does: detect}
)";

const assembly::Assembly& assembly() {
  static const assembly::Assembly loaded = support::loaded(file);
  return loaded;
}

CoatingCurve curve(const CoatingRequest& request) {
  const CoatingCurveResult result = coating_curve(assembly(), request);
  EXPECT_TRUE(result.faults.none()) << assembly::describe(result.faults, "file", "");
  return result.curve.value_or(CoatingCurve{});
}

CoatingRow row(CoatingRequest request) {
  request.wavelengths_nm = {500.0};
  const CoatingCurve found = curve(request);
  return found.rows.empty() ? CoatingRow{} : found.rows.front();
}

std::string fault(const CoatingRequest& request) {
  const CoatingCurveResult result = coating_curve(assembly(), request);
  EXPECT_FALSE(result.curve.has_value());
  return assembly::describe(result.faults, "file", "");
}

TEST(CoatingCurve, TakesAirTheFirstSubstrateTheLightsWavelengthsAndNormalIncidence) {
  const CoatingCurve found = curve({.name = "quarter"});
  EXPECT_EQ(found.name, "quarter");
  EXPECT_EQ(found.incident, "air");
  EXPECT_EQ(found.substrate, "glass");
  ASSERT_EQ(found.rows.size(), 2U);
  EXPECT_EQ(found.rows[0].wavelength_nm, 500.0);
  EXPECT_EQ(found.rows[1].wavelength_nm, 600.0);
  EXPECT_EQ(found.rows[0].angle_deg, 0.0);
}

TEST(CoatingCurve, OrdersAnglesWithinWavelengths) {
  const CoatingCurve found =
      curve({.name = "quarter", .wavelengths_nm = {400.0, 450.0}, .angles_deg = {0.0, 30.0}});
  std::vector<std::pair<double, double>> order;
  for (const CoatingRow& each : found.rows)
    order.emplace_back(each.wavelength_nm, each.angle_deg);
  EXPECT_THAT(order, ElementsAre(std::pair(400.0, 0.0), std::pair(400.0, 30.0), std::pair(450.0, 0.0),
                                 std::pair(450.0, 30.0)));
}

// Quarter wave of index m on glass of index n: R = ((n − m²)/(n + m²))² (Born & Wolf, 7th ed., §1.6.4).
TEST(CoatingCurve, GivesTheReflectanceOfAQuarterWave) {
  const double amplitude = (1.5 - 1.25 * 1.25) / (1.5 + 1.25 * 1.25);
  const CoatingRow found = row({.name = "quarter"});
  EXPECT_NEAR(found.s.reflectance, amplitude * amplitude, 1e-15);
  EXPECT_NEAR(found.p.reflectance, amplitude * amplitude, 1e-15);
  EXPECT_NEAR(found.s.transmittance, 1.0 - amplitude * amplitude, 1e-15);
  EXPECT_EQ(found.s.absorptance, 0.0);
  EXPECT_NEAR(found.s.phase_t_deg.value_or(0.0), 90.0, 1e-12);
}

TEST(CoatingCurve, MeetsTheLastListedLayerFirst) {
  // The inner layer of `spare` is glass, so that on glass the film alone is left.
  const double thick = 50.0 * 1.25 * 4.0 / 500.0; // quarter waves of the film
  const double r01 = (1.0 - 1.25) / (1.0 + 1.25);
  const double r12 = (1.25 - 1.5) / (1.25 + 1.5);
  const double twice = std::cos(thick * std::numbers::pi);
  const double expected = (r01 * r01 + r12 * r12 + 2.0 * r01 * r12 * twice) /
                          (1.0 + r01 * r01 * r12 * r12 + 2.0 * r01 * r12 * twice); // Airy (1833)
  EXPECT_NEAR(row({.name = "spare", .substrate = "glass"}).s.reflectance, expected, 1e-15);
}

TEST(CoatingCurve, OfNoCoatingIsFresnels) {
  const CoatingRow found = row({.name = "bare"});
  EXPECT_NEAR(found.s.reflectance, 0.04, 1e-16);
  EXPECT_NEAR(found.p.transmittance, 0.96, 1e-15);
  EXPECT_EQ(found.s.phase_r_deg, 180.0);
  EXPECT_EQ(found.p.phase_r_deg, 0.0);
  EXPECT_EQ(found.s.phase_t_deg, 0.0);
}

TEST(CoatingCurve, OfNoCoatingStandsOnTheSideThatIsNoGas) {
  EXPECT_EQ(curve({.name = "bare"}).substrate, "glass");
}

TEST(CoatingCurve, HasNoPhaseWhereNothingIsReflected) {
  const CoatingRow found = row({.name = "bare", .incident = "glass"});
  EXPECT_EQ(found.s.reflectance, 0.0);
  EXPECT_EQ(found.s.phase_r_deg, std::nullopt);
  EXPECT_EQ(found.s.transmittance, 1.0);
}

TEST(CoatingCurve, TransmitsExactlyNothingBeyondTheCriticalAngle) {
  const CoatingRow found =
      row({.name = "quarter", .incident = "glass", .substrate = "air", .angles_deg = {60.0}});
  EXPECT_NEAR(found.s.reflectance, 1.0, 1e-14);
  EXPECT_EQ(found.s.transmittance, 0.0);
  EXPECT_EQ(found.p.transmittance, 0.0);
  EXPECT_EQ(found.s.phase_t_deg, std::nullopt);
}

TEST(CoatingCurve, EndsAtGrazingIncidenceInTotalReflection) {
  const CoatingRow found = row({.name = "bare", .angles_deg = {90.0}});
  EXPECT_NEAR(found.s.reflectance, 1.0, 1e-14);
  EXPECT_NEAR(found.p.reflectance, 1.0, 1e-14);
  EXPECT_NEAR(found.s.transmittance, 0.0, 1e-14);
}

TEST(CoatingCurve, GivesWhatEntersAnOpaqueSubstrateAsTransmittanceWithoutPhase) {
  const CoatingRow found = row({.name = "dyed", .angles_deg = {30.0}});
  EXPECT_GT(found.s.transmittance, 0.0);
  EXPECT_GT(found.s.absorptance, 0.0);
  EXPECT_NEAR(found.s.reflectance + found.s.transmittance + found.s.absorptance, 1.0, 1e-14);
  EXPECT_NEAR(found.p.reflectance + found.p.transmittance + found.p.absorptance, 1.0, 1e-14);
  EXPECT_EQ(found.s.phase_t_deg, std::nullopt);
  EXPECT_NE(found.s.phase_r_deg, std::nullopt);
}

TEST(CoatingCurve, OfAnIdealCoatingIsTheSameAtEveryAngle) {
  const CoatingRow found = row({.name = "filter", .substrate = "glass", .angles_deg = {75.0}});
  EXPECT_EQ(found.s.reflectance, 0.25);
  EXPECT_EQ(found.p.transmittance, 0.5);
  EXPECT_EQ(found.s.absorptance, 0.25);
  EXPECT_EQ(found.s.phase_r_deg, 180.0);
  EXPECT_EQ(found.p.phase_r_deg, 0.0);
  EXPECT_EQ(found.p.phase_t_deg, 0.0);
}

TEST(CoatingCurve, OfAnIdealCoatingReflectsWhatItDoesNotAbsorbBeyondTheCriticalAngle) {
  const CoatingRow found =
      row({.name = "filter", .incident = "glass", .substrate = "air", .angles_deg = {60.0}});
  EXPECT_EQ(found.s.reflectance, 0.75);
  EXPECT_EQ(found.s.transmittance, 0.0);
  EXPECT_EQ(found.s.absorptance, 0.25);
  EXPECT_EQ(found.s.phase_t_deg, std::nullopt);
}

TEST(CoatingCurve, OfAnIdealCoatingThatReflectsNothingHasNoPhase) {
  EXPECT_EQ(row({.name = "black", .substrate = "glass"}).s.phase_r_deg, std::nullopt);
}

TEST(CoatingCurve, AsksForTheSubstrateOfACoatingThatNoStationUses) {
  EXPECT_THAT(fault({.name = "spare"}), HasSubstr("no station tells the substrate of 'spare'\n"
                                                  "    accepted: --substrate MEDIUM"));
  EXPECT_EQ(curve({.name = "spare", .substrate = "fused-silica"}).substrate, "fused-silica");
}

TEST(CoatingCurve, RefusesAnUnknownCoatingWithTheNearestName) {
  EXPECT_THAT(fault({.name = "quater"}), HasSubstr("the file has no coating 'quater'"));
  EXPECT_THAT(fault({.name = "quater"}), HasSubstr("did you mean 'quarter'?"));
}

TEST(CoatingCurve, RefusesAnUnknownMediumWithItsOption) {
  EXPECT_THAT(fault({.name = "quarter", .substrate = "glas"}),
              HasSubstr("there is no medium 'glas' for --substrate"));
  EXPECT_THAT(fault({.name = "quarter", .incident = "glas"}), HasSubstr("did you mean 'glass'?"));
}

TEST(CoatingCurve, RefusesWavelengthsOutsideARangeAndNamesIt) {
  EXPECT_THAT(fault({.name = "dyed", .wavelengths_nm = {800.0}}),
              HasSubstr("dye is known from 400 to 700 nm, not at 800 nm"));
  EXPECT_THAT(fault({.name = "quarter", .substrate = "fused-silica", .wavelengths_nm = {100.0}}),
              HasSubstr("fused-silica is known from 210 to 3710 nm, not at 100 nm"));
}

TEST(CoatingCurve, RefusesLightThroughAnOpaqueMedium) {
  EXPECT_THAT(fault({.name = "quarter", .incident = "tin"}),
              HasSubstr("tin is opaque at 500 nm (kappa 4): no light arrives through it"));
}

/// 0.1 and 0.3 reflected, 0.8 and 0.5 transmitted at 0 and 40 degrees in air, the same at both wavelengths.
assembly::Assembly with_measured(bool phases) {
  assembly::Assembly measured = assembly();
  const auto point = [](double reflect, double transmit) {
    return assembly::Measured::Point{
        {reflect, reflect}, {transmit, transmit}, {reflect, reflect}, {std::numbers::pi, 0.0, 0.5, 0.5}};
  };
  measured.coatings.push_back(
      {"vendor", assembly::Measured{{500, 600},
                                    {0, 40},
                                    {point(0.1, 0.8), point(0.3, 0.5), point(0.1, 0.8), point(0.3, 0.5)},
                                    {},
                                    phases,
                                    {}}});
  return measured;
}

TEST(CoatingCurve, ReadsMeasuredCurvesBetweenTheirAngles) {
  const auto result =
      coating_curve(with_measured(true), {.name = "vendor", .substrate = "glass", .angles_deg = {20}});
  ASSERT_TRUE(result.curve);
  const CoatingComponent& s = result.curve->rows.front().s;
  EXPECT_NEAR(s.reflectance, 0.2, 1e-14);
  EXPECT_NEAR(s.transmittance, 0.65, 1e-14);
  EXPECT_NEAR(s.absorptance, 0.15, 1e-14);
  EXPECT_NEAR(s.phase_t_deg.value(), 0.5 * 180.0 / std::numbers::pi, 1e-12);
}

TEST(CoatingCurve, KnowsNoPhasesWhereNoneWereMeasured) {
  const auto result = coating_curve(with_measured(false), {.name = "vendor", .substrate = "glass"});
  ASSERT_TRUE(result.curve);
  EXPECT_FALSE(result.curve->rows.front().p.phase_r_deg);
}

TEST(CoatingCurve, RefusesWavelengthsThatWereNotMeasured) {
  const auto result =
      coating_curve(with_measured(true), {.name = "vendor", .substrate = "glass", .wavelengths_nm = {650}});
  EXPECT_FALSE(result.curve);
  EXPECT_THAT(assembly::describe(result.faults, "file", ""),
              HasSubstr("'vendor' was measured from 500 to 600 nm"));
}

TEST(CoatingCurve, RefusesAnglesThatAreNoIncidence) {
  EXPECT_THAT(fault({.name = "quarter", .angles_deg = {0.0, 91.0}}),
              HasSubstr("91 deg is no angle of incidence"));
  EXPECT_THAT(fault({.name = "quarter", .angles_deg = {-1.0}}), HasSubstr("-1 deg is no angle of incidence"));
}

} // namespace
} // namespace lightledger::analysis
