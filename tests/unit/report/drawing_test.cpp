#include <lightledger/assembly/load.hpp>
#include <lightledger/report/drawing.hpp>

#include <gmock/gmock.h>
#include <gtest/gtest.h>
#include <nlohmann/json.hpp>

#include <filesystem>
#include <string>

namespace lightledger::report {
namespace {

using analysis::View;
using testing::HasSubstr;
using testing::Not;
using testing::StartsWith;

assembly::Assembly system(const std::string& name) {
  const auto path = std::filesystem::path(LIGHTLEDGER_SOURCE_DIR) / "systems" / (name + ".yaml");
  assembly::Loaded loaded = assembly::load(path);
  EXPECT_TRUE(loaded.assembly) << loaded.report();
  return *loaded.assembly;
}

std::string svg_of(const std::string& name, std::vector<View> views = {}) {
  const assembly::Assembly assembly = system(name);
  return drawing_svg(assembly.title, *analysis::drawing(assembly, {.views = std::move(views)}).drawing);
}

TEST(DrawingSvg, HasAGroupPerStationWithItsNumberAsId) {
  const std::string svg = svg_of("fog-bank-lidar");
  for (int number = 1; number <= 13; ++number)
    EXPECT_THAT(svg, HasSubstr("<g id=\"" + std::to_string(number) + "\" class=\"station"));
}

TEST(DrawingSvg, TellsStationsOfSeveralViewsApart) {
  const std::string svg = svg_of("minimal", {View::x, View::y});
  EXPECT_THAT(svg, HasSubstr("<g id=\"x-1\""));
  EXPECT_THAT(svg, HasSubstr("<g id=\"y-1\""));
}

TEST(DrawingSvg, NamesEveryStationAsText) {
  const std::string svg = svg_of("tide-pool-camera");
  for (const assembly::Station& station : system("tide-pool-camera").stations)
    EXPECT_THAT(svg, HasSubstr(">" + station.name + "</tspan>"));
}

TEST(DrawingSvg, NumbersASurfaceMetAgainOnce) {
  EXPECT_THAT(svg_of("harbour-monitor"), HasSubstr(">1, 3</tspan>"));
}

TEST(DrawingSvg, HasAScaleBarAndSaysWhichWayItLooks) {
  const std::string svg = svg_of("minimal");
  EXPECT_THAT(svg, HasSubstr("class=\"scale\""));
  EXPECT_THAT(svg, HasSubstr(">5 mm</text>"));
  EXPECT_THAT(svg, HasSubstr("seen along x: z to the right, y up"));
}

TEST(DrawingSvg, NamesTheFields) {
  EXPECT_THAT(svg_of("tide-pool-camera"), HasSubstr(">field corner</text>"));
}

TEST(DrawingSvg, NamesWhatLiesBeyondALongEmptyWay) {
  const std::string svg = svg_of("fog-bank-transceiver");
  EXPECT_THAT(svg, HasSubstr("clip-path=\"url(#frame)\""));
  EXPECT_THAT(svg, testing::ContainsRegex("fog, [0-9.]+ mm on"));
  EXPECT_THAT(svg_of("fog-bank-lidar"), Not(HasSubstr("clip-path")));
}

TEST(DrawingSvg, HoldsNoNumberThatIsNone) {
  for (const char* name : {"fog-bank-lidar", "harbour-monitor", "relay-terminal", "tide-pool-camera"}) {
    const std::string svg = svg_of(name, {View::x, View::y, View::z});
    EXPECT_THAT(svg, Not(HasSubstr("nan"))) << name;
    EXPECT_THAT(svg, Not(HasSubstr("inf"))) << name;
  }
}

TEST(DrawingJson, HoldsTheLinesInBenchCoordinates) {
  const auto drawing = *analysis::drawing(system("minimal")).drawing;
  const auto json = nlohmann::json::parse(drawing_json({"0.1.0", "draw", "Rain window", {}}, drawing));
  const auto& view = json["draw"]["views"][0];
  EXPECT_EQ(view["along"], "x");
  EXPECT_EQ(view["stations"].size(), 3U);
  EXPECT_EQ(view["glass"][0]["between"][1], "window rear");
  EXPECT_EQ(view["rays"][0]["points_mm"].back()[2], 15.0);
}

TEST(DrawingCsv, HasARowPerPoint) {
  EXPECT_THAT(drawing_csv(*analysis::drawing(system("minimal")).drawing),
              StartsWith("view,kind,number,name,x_mm,y_mm,z_mm\r\nx,section,1,window front,"));
}

} // namespace
} // namespace lightledger::report
