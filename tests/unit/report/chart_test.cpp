#include <lightledger/report/chart.hpp>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <cmath>
#include <string>

namespace lightledger::report {
namespace {

using testing::HasSubstr;
using testing::Not;

LineChart reflectance() {
  LineChart chart;
  chart.title = "broad_ar";
  chart.description = "Reflectance against wavelength";
  chart.x = {"wavelength", "nm"};
  chart.y = {"reflectance", "%"};
  chart.series = {{"0 deg", {400.0, 500.0, 600.0}, {1.0, 0.2, 0.8}}};
  return chart;
}

std::size_t count(const std::string& text, std::string_view part) {
  std::size_t found = 0;
  for (std::size_t at = text.find(part); at != std::string::npos; at = text.find(part, at + part.size()))
    ++found;
  return found;
}

TEST(LineChart, NamesItselfItsAxesAndItsSeries) {
  const std::string drawn = svg(reflectance());
  EXPECT_THAT(drawn, HasSubstr("<title>broad_ar</title>"));
  EXPECT_THAT(drawn, HasSubstr("<desc>Reflectance against wavelength</desc>"));
  EXPECT_THAT(drawn, HasSubstr(">wavelength, nm</text>"));
  EXPECT_THAT(drawn, HasSubstr(">reflectance, %</text>"));
  EXPECT_THAT(drawn, HasSubstr(">0 deg</text>"));
}

TEST(LineChart, DrawsALinePerSeries) {
  LineChart chart = reflectance();
  chart.series.push_back(chart.series.front());
  EXPECT_EQ(count(svg(chart), "<path class=\"series"), 2U);
}

TEST(LineChart, BreaksALineWhereThereIsNoValue) {
  LineChart chart = reflectance();
  chart.series = {{"gap", {1.0, 2.0, 3.0, 4.0, 5.0}, {1.0, 2.0, NAN, 2.0, 1.0}}};
  const std::string drawn = svg(chart);
  const std::size_t path = drawn.find(" d=\"M");
  EXPECT_EQ(count(drawn.substr(path, drawn.find('"', path + 4) - path), "M"), 2U);
}

TEST(LineChart, PutsMarksOnlyWhereTheAxisReaches) {
  LineChart chart = reflectance();
  chart.marks_x = {{532.0, "532"}, {1064.0, "1064"}};
  const std::string drawn = svg(chart);
  EXPECT_THAT(drawn, HasSubstr(">532</text>"));
  EXPECT_THAT(drawn, Not(HasSubstr(">1064</text>")));
}

TEST(LineChart, FollowsTheReadersLightOrDarkSetting) {
  EXPECT_THAT(svg(reflectance()), HasSubstr("prefers-color-scheme:dark"));
}

TEST(LineChart, HoldsAnyWordsAsText) {
  LineChart chart = reflectance();
  chart.title = "<script>\"&\x01\xFF";
  EXPECT_THAT(svg(chart), HasSubstr("<title>&lt;script&gt;&quot;&amp; \xEF\xBF\xBD</title>"));
}

TEST(LineChart, IsDrawnOfAnyValues) {
  LineChart chart = reflectance();
  chart.y.logarithmic = true;
  for (const double value :
       {0.0, -1.0, 1e308, 1e-308, static_cast<double>(NAN), static_cast<double>(INFINITY)}) {
    chart.series = {{"odd", {value, value}, {value, 1.0}}};
    const std::string drawn = svg(chart);
    EXPECT_THAT(drawn, Not(HasSubstr("nan")));
    EXPECT_THAT(drawn, Not(HasSubstr("inf")));
  }
}

} // namespace
} // namespace lightledger::report
