#include "analysis/profile.hpp"

#include <lightledger/analysis/drawing.hpp>
#include <lightledger/assembly/load.hpp>

#include <gtest/gtest.h>

#include <cmath>
#include <string>

namespace lightledger::analysis {
namespace {

using Eigen::Vector3d;

assembly::Assembly assembly_of(const std::string& train, const std::string& light = "beam: {radius: 4}") {
  const std::string text = "title: T\nlight:\n  wavelengths: [500]\n  " + light + "\ntrain:\n" + train;
  assembly::Loaded loaded = assembly::load_text("t.yaml", text);
  EXPECT_TRUE(loaded.assembly) << loaded.report();
  return *loaded.assembly;
}

DrawnView view_of(const assembly::Assembly& assembly, DrawingOptions options = {}) {
  DrawingResult result = drawing(assembly, options);
  EXPECT_TRUE(result.drawing);
  return result.drawing->views.front();
}

const std::string lens = "  - {name: front, radius: 50, into: crown-517642, clear: {diameter: 20}, gap: 4}\n"
                         "  - {name: rear, radius: -50, into: air, clear: {diameter: 16}, gap: 30}\n";
const std::string sensor = "  - {name: sensor, does: detect, clear: {width: 10, height: 6}}\n";
const std::string fold =
    "  - {name: fold, does: reflect, tilt: [45, 0, 0], backing: Al, clear: {diameter: 20}, gap: 25}\n";

TEST(Drawing, SectionHasTheSagOfTheSurface) {
  const DrawnView view = view_of(assembly_of(lens + sensor));
  for (const Vector3d& point : view.stations[0].section.front())
    EXPECT_NEAR(std::hypot(point[1], point[2] - 50.0), 50.0, 1e-12);
  EXPECT_NEAR(view.stations[0].section.front().back().tail<2>().norm(),
              std::hypot(10.0, 50.0 - std::sqrt(2400.0)), 1e-12);
}

TEST(Drawing, SectionEndsAtTheEdgeOfTheClearArea) {
  const DrawnView along_x = view_of(assembly_of(lens + sensor), {.views = {View::x}});
  const DrawnView along_y = view_of(assembly_of(lens + sensor), {.views = {View::y}});
  EXPECT_NEAR(std::abs(along_x.stations[2].section.front().front()[1]), 3.0, 1e-12);
  EXPECT_NEAR(std::abs(along_y.stations[2].section.front().front()[0]), 5.0, 1e-12);
}

TEST(Drawing, SectionLeavesAHoleOpen) {
  const DrawnView view = view_of(assembly_of(
      "  - {name: ring, does: stop, clear: {diameter: 20, hole: {diameter: 8}}, gap: 5}\n" + sensor,
      "beam: {radius: 8, inner: 5}"));
  ASSERT_EQ(view.stations[0].section.size(), 2U);
  EXPECT_NEAR(view.stations[0].section[0].back().norm(), 4.0, 1e-12);
  EXPECT_NEAR(view.stations[0].section[1].back().norm(), 10.0, 1e-12);
}

TEST(Drawing, GlassFillsALensAndNothingElse) {
  const DrawnView view = view_of(assembly_of(lens + sensor));
  ASSERT_EQ(view.glass.size(), 1U);
  EXPECT_EQ(view.glass[0].front, 0U);
  EXPECT_EQ(view.glass[0].rear, 1U);
}

TEST(Drawing, RimOfALensIsAsHighAsItsLargerFace) {
  for (const Vector3d& point : view_of(assembly_of(lens + sensor)).glass[0].contour)
    EXPECT_LE(std::abs(point[1]), 10.0 + 1e-9);
}

TEST(Drawing, RaysRunFromSurfaceToSurface) {
  const DrawnView view = view_of(assembly_of(lens + sensor));
  ASSERT_EQ(view.rays.size(), 7U);
  for (const DrawnRay& ray : view.rays) {
    EXPECT_EQ(ray.end, RayEnd::arrived);
    ASSERT_EQ(ray.points.size(), 4U);
    EXPECT_NEAR(std::hypot(ray.points[1][1], ray.points[1][2] - 50.0), 50.0, 1e-9);
    EXPECT_NEAR(ray.points[3][2], 34.0, 1e-9);
  }
}

TEST(Drawing, RayOutsideTheClearAreaEndsThere) {
  const DrawnView view =
      view_of(assembly_of("  - {name: iris, does: stop, clear: {diameter: 4}, gap: 5}\n" + sensor));
  EXPECT_EQ(view.rays.front().end, RayEnd::clipped);
  EXPECT_EQ(view.rays.front().points.size(), 2U);
  EXPECT_EQ(view.rays[3].end, RayEnd::arrived);
}

TEST(Drawing, RaysAvoidTheHoleOfTheBeam) {
  for (const DrawnRay& ray : view_of(assembly_of(sensor, "beam: {radius: 2.5, inner: 1}")).rays)
    EXPECT_GT(std::abs(ray.points.back()[1]), 1.0);
}

TEST(Drawing, ChoosesTheViewThatShowsTheFold) {
  EXPECT_EQ(view_of(assembly_of(lens + fold + sensor)).along, View::x);
  std::string sideways = fold;
  sideways.replace(sideways.find("[45, 0, 0]"), 10, "[0, 45, 0]");
  EXPECT_EQ(view_of(assembly_of(lens + sideways + sensor)).along, View::y);
}

TEST(Drawing, ChoosesTheViewInWhichFieldsSpread) {
  EXPECT_EQ(view_of(assembly_of(lens + sensor, "beam: {radius: 1}\n  fields: [[0, 0], [2, 0]]")).along,
            View::y);
  EXPECT_EQ(view_of(assembly_of(lens + sensor, "beam: {radius: 1}\n  fields: [[0, 0], [0, 2]]")).along,
            View::x);
}

TEST(Drawing, SurfaceSeenFaceOnHasAnOutlineOnly) {
  const DrawnView view = view_of(assembly_of(lens + sensor), {.views = {View::z}});
  EXPECT_TRUE(view.stations[0].section.empty());
  EXPECT_NEAR(view.stations[0].outline.front().head<2>().norm(), 10.0, 1e-12);
}

TEST(Drawing, SurfaceWithoutLimitsReachesBeyondItsRays) {
  const DrawnView view = view_of(assembly_of(
      "  - {name: pane, into: fused-silica, gap: 2}\n  - {name: out, into: air, gap: 5}\n" + sensor,
      "beam: {radius: 2.5}"));
  const double half = std::abs(view.stations[0].section.front().back()[1]);
  EXPECT_GT(half, 2.5);
  EXPECT_LT(half, 3.5);
}

TEST(Drawing, SurfaceMetAgainNamesItsFirstVisit) {
  const std::string mangin =
      "  - {name: front, into: fused-silica, tilt: [30, 0, 0], clear: {diameter: 30}, gap: 5}\n"
      "  - {name: silver, does: reflect, tilt: [30, 0, 0], backing: Ag, clear: {diameter: 30}}\n"
      "  - {again: front, into: air, gap: 30}\n";
  const DrawnView view = view_of(assembly_of(mangin + sensor));
  EXPECT_EQ(view.stations[2].first_visit, 0U);
  EXPECT_EQ(view.glass.size(), 1U);
}

TEST(Drawing, FollowsTheRaysOfAGhost) {
  const DrawnView view =
      view_of(assembly_of(lens + sensor), {.views = {}, .ghost = Bounces{"rear", "front"}});
  ASSERT_FALSE(view.ghost_rays.empty());
  const DrawnRay& ray = view.ghost_rays[view.ghost_rays.size() / 2];
  ASSERT_EQ(ray.points.size(), 6U);
  EXPECT_NEAR(ray.points[1][2], 0.0, 1e-9);
  EXPECT_NEAR(ray.points[2][2], 4.0, 1e-9);
  EXPECT_NEAR(ray.points[3][2], 0.0, 1e-9);
  EXPECT_NEAR(ray.points[4][2], 4.0, 1e-9);
}

TEST(Drawing, FollowsAGhostThatBouncesOffTheDetector) {
  const std::string shiny = "  - {name: sensor, does: detect, clear: {diameter: 20}, reflectance: 0.05}\n";
  const DrawnView view =
      view_of(assembly_of(lens + shiny), {.views = {}, .ghost = Bounces{"sensor", "rear"}});
  ASSERT_FALSE(view.ghost_rays.empty());
  const DrawnRay& ray = view.ghost_rays[view.ghost_rays.size() / 2];
  EXPECT_EQ(ray.end, RayEnd::arrived);
  ASSERT_EQ(ray.points.size(), 6U);
  EXPECT_NEAR(ray.points[3][2], 34.0, 1e-9);
  EXPECT_NEAR(ray.points[4][2], 4.0, 1e-9);
}

TEST(Drawing, RefusesAGhostThatIsNone) {
  const DrawingResult result =
      drawing(assembly_of(lens + sensor), {.views = {}, .ghost = Bounces{"front", "rear"}});
  EXPECT_FALSE(result.drawing);
  EXPECT_FALSE(result.faults.none());
}

const std::string plate =
    "  - {name: splitter, does: reflect, tilt: [45, 0, 0], backing: fused-silica, coating: half, "
    "clear: {diameter: 30}, rear: {thickness: 3}, gap: 30}\n";

assembly::Assembly splitter() {
  const std::string text = "title: T\nlight: {wavelengths: [500], beam: {radius: 2}}\n"
                           "coatings: {half: {ideal: {reflect: 0.5}}}\ntrain:\n" +
                           plate + sensor;
  assembly::Loaded loaded = assembly::load_text("t.yaml", text);
  EXPECT_TRUE(loaded.assembly) << loaded.report();
  return *loaded.assembly;
}

TEST(Drawing, PlateHasItsRearFaceAndItsGlass) {
  const DrawnView view = view_of(splitter());
  ASSERT_EQ(view.glass.size(), 1U);
  EXPECT_EQ(view.glass[0].front, view.glass[0].rear);
  ASSERT_EQ(view.stations[0].rear.size(), 1U);
  const Vector3d across_plate = view.stations[0].rear[0].front() - view.stations[0].section[0].front();
  EXPECT_NEAR(across_plate.norm(), 3.0, 1e-12);
}

TEST(Drawing, FollowsAGhostThroughAPlate) {
  const DrawnView view = view_of(splitter(), {.views = {}, .ghost = Bounces{"splitter rear"}});
  ASSERT_FALSE(view.ghost_rays.empty());
  EXPECT_EQ(view.ghost_rays[3].points.size(), 5U);
}

TEST(PathPictures, ShowTheImageThenTheGhosts) {
  const auto pictures = path_pictures(assembly_of(lens + sensor), View::x, {{"rear", "front"}});
  ASSERT_EQ(pictures.size(), 2U);
  EXPECT_EQ(pictures[0].spot.size(), 36U);
  EXPECT_FALSE(pictures[1].rays.empty());
}

/// ISO 10110-12 by hand: a paraboloid has z = r²/2R, whatever r.
TEST(Sag, IsThatOfAParaboloid) {
  EXPECT_NEAR(*sag(assembly::Conic{40.0, -1.0}, 30.0), 900.0 / 80.0, 1e-12);
}

TEST(Sag, EndsAtTheEquator) {
  EXPECT_TRUE(sag(assembly::Sphere{10.0}, 9.99));
  EXPECT_FALSE(sag(assembly::Sphere{10.0}, 10.01));
}

TEST(Sag, AddsTheTermsOfAnAsphere) {
  assembly::Asphere asphere{INFINITY, 0.0};
  asphere.terms[1] = 1e-4;
  EXPECT_NEAR(*sag(asphere, 10.0), 1.0, 1e-12);
}

} // namespace
} // namespace lightledger::analysis
