#include "report/colour_scale.hpp"

#include <lightledger/report/picture.hpp>

#include <gtest/gtest.h>

#include <cmath>
#include <cstdint>
#include <limits>
#include <memory>
#include <vector>

#define STB_IMAGE_IMPLEMENTATION
#define STB_IMAGE_STATIC
#define STBI_ONLY_PNG
#include <stb/stb_image.h>

namespace lightledger::report {
namespace {

constexpr double nan = std::numeric_limits<double>::quiet_NaN();

struct Decoded {
  int width = 0, height = 0;
  std::vector<Colour> dots;

  [[nodiscard]] int count(Colour colour) const {
    return static_cast<int>(std::count(dots.begin(), dots.end(), colour));
  }
  /// The mean height of all dots of a colour, from the top.
  [[nodiscard]] double mean_row(Colour colour) const {
    double sum = 0.0;
    for (std::size_t i = 0; i < dots.size(); ++i)
      if (dots[i] == colour)
        sum += static_cast<double>(i / static_cast<std::size_t>(width));
    return sum / count(colour);
  }
};

Decoded decode(const std::string& bytes) {
  Decoded picture;
  int channels = 0;
  const std::unique_ptr<stbi_uc, void (*)(void*)> data(
      stbi_load_from_memory(reinterpret_cast<const stbi_uc*>(bytes.data()), static_cast<int>(bytes.size()),
                            &picture.width, &picture.height, &channels, 3),
      stbi_image_free);
  if (!data)
    return picture;
  for (int i = 0; i < picture.width * picture.height; ++i)
    picture.dots.push_back({data.get()[3 * i], data.get()[3 * i + 1], data.get()[3 * i + 2]});
  return picture;
}

MapPicture map_of(std::size_t columns, std::size_t rows, std::vector<double> values) {
  MapPicture map;
  map.title = "Pupil";
  map.quantity = "diattenuation";
  map.x_label = "x, mm";
  map.y_label = "y, mm";
  map.columns = columns;
  map.rows = rows;
  map.values = std::move(values);
  return map;
}

TEST(MapPicture, IsAPngThatCanBeDecoded) {
  const Decoded picture = decode(png(map_of(2, 2, {0.0, 1.0, 2.0, 3.0})));
  EXPECT_GT(picture.width, 560);
  EXPECT_GT(picture.height, 560);
}

TEST(MapPicture, ShowsTheFirstRowAtTheFoot) {
  MapPicture map = map_of(1, 2, {-1.0, 1.0});
  map.scale = Scale::diverging;
  const Decoded picture = decode(png(map));
  const Colour low = diverging_map().at(0.0);
  const Colour high = diverging_map().at(1.0);
  EXPECT_GT(picture.count(low), 100 * 100);
  EXPECT_GT(picture.mean_row(low), picture.mean_row(high));
}

TEST(MapPicture, IsTrueToScale) {
  MapPicture map = map_of(1, 1, {1.0});
  map.x_from = -12.0;
  map.x_to = 12.0;
  map.y_from = -6.0;
  map.y_to = 6.0;
  const Decoded wide = decode(png(map));
  std::swap(map.x_from, map.y_from);
  std::swap(map.x_to, map.y_to);
  const Decoded high = decode(png(map));
  EXPECT_NEAR(wide.height + 280, high.height, 1);
}

TEST(MapPicture, DrawsNoColourWhereThereIsNothing) {
  MapPicture map = map_of(1, 2, {nan, 1.0});
  map.scale = Scale::diverging;
  EXPECT_LT(decode(png(map)).count(diverging_map().at(1.0)), 560 * 300);
}

TEST(MapPicture, IsDrawnOfAnyValues) {
  for (const Scale scale : {Scale::linear, Scale::logarithmic, Scale::diverging, Scale::cyclic})
    for (const std::vector<double>& values : std::vector<std::vector<double>>{
             {nan, nan}, {0.0, 0.0}, {-1e308, 1e308}, {1e-308, 0.0}, {INFINITY, 1.0}, {}}) {
      MapPicture map = map_of(2, 1, values);
      map.scale = scale;
      map.x_to = map.x_from;
      EXPECT_GT(decode(png(map)).width, 0);
    }
}

TEST(MapPicture, IsDrawnWithoutCells) {
  EXPECT_GT(decode(png(map_of(0, 0, {}))).width, 0);
}

TEST(MapPicture, ShowsMeansOfMapsThatAreLargerThanIt) {
  std::vector<double> stripes(4096 * 2);
  for (std::size_t i = 0; i < stripes.size(); ++i)
    stripes[i] = i % 2 == 0 ? 0.0 : 2.0;
  MapPicture map = map_of(4096, 2, stripes);
  map.x_to = 4.0;
  map.scale = Scale::diverging;
  EXPECT_GT(decode(png(map)).count(diverging_map().at(1.0)), 10000);
}

TEST(ColourScale, LogarithmicCoversWholeDecadesOfPositiveValues) {
  const std::vector<double> values{0.0, 3e-5, 0.4, -1.0};
  const ColourScale scale(Scale::logarithmic, values);
  EXPECT_NEAR(scale.range().from, 1e-5, 1e-18);
  EXPECT_NEAR(scale.range().to, 1.0, 1e-12);
  EXPECT_NEAR(scale.place(1e-2), 0.6, 1e-12);
  EXPECT_EQ(scale.place(0.0), 0.0);
}

TEST(ColourScale, LogarithmicReachesNineDecadesDown) {
  const std::vector<double> values{1e-30, 1.0};
  EXPECT_NEAR(std::log10(ColourScale(Scale::logarithmic, values).range().from), -9.0, 1e-9);
}

TEST(ColourScale, DivergingPutsZeroInTheMiddle) {
  const std::vector<double> values{-0.5, 2.0};
  const ColourScale scale(Scale::diverging, values);
  EXPECT_EQ(scale.place(0.0), 0.5);
  EXPECT_EQ(scale.place(2.0), 1.0);
}

TEST(ColourScale, CyclicTakesTheSmallestCircleThatHoldsTheAngles) {
  const std::vector<double> azimuths{-80.0, 90.0};
  const std::vector<double> phases{-170.0, 20.0};
  const std::vector<double> turns{10.0, 350.0};
  EXPECT_EQ(ColourScale(Scale::cyclic, azimuths).range().to, 90.0);
  EXPECT_EQ(ColourScale(Scale::cyclic, phases).range().from, -180.0);
  EXPECT_EQ(ColourScale(Scale::cyclic, turns).range().to, 360.0);
}

TEST(ColourScale, LinearStartsAtZeroWhereValuesReachDownToIt) {
  const std::vector<double> wide{0.1, 1.0};
  const std::vector<double> narrow{0.9, 1.0};
  EXPECT_EQ(ColourScale(Scale::linear, wide).range().from, 0.0);
  EXPECT_EQ(ColourScale(Scale::linear, narrow).range().from, 0.9);
}

} // namespace
} // namespace lightledger::report
