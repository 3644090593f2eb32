#include "report/colour.hpp"

#include <gtest/gtest.h>

#include <cmath>

namespace lightledger::report {
namespace {

Oklab at_step(const ColourMap& map, std::size_t step) {
  return to_oklab(map.at(static_cast<double>(step) / (ColourMap::steps - 1)));
}

double distance(const Oklab& one, const Oklab& other) {
  return std::hypot(one.lightness - other.lightness, one.a - other.a, one.b - other.b);
}

/// Eight bits a channel leave lightness uncertain by about this much.
constexpr double rounding = 0.003;

void expect_lightness_to_run(const ColourMap& map, std::size_t from, std::size_t to, double sign) {
  for (std::size_t step = from; step < to; ++step)
    EXPECT_GT(sign * (at_step(map, step + 1).lightness - at_step(map, step).lightness), -rounding)
        << "at step " << step;
  EXPECT_GT(sign * (at_step(map, to).lightness - at_step(map, from).lightness), 0.5);
}

/// Eighths of the map are equally far from each other, along the curve as well as eight bits can tell.
void expect_even_steps(const ColourMap& map) {
  constexpr std::size_t stride = 15;
  double least = INFINITY;
  double most = 0.0;
  for (std::size_t step = 0; step + stride < ColourMap::steps; step += stride) {
    const double step_size = distance(at_step(map, step), at_step(map, step + stride));
    least = std::min(least, step_size);
    most = std::max(most, step_size);
  }
  EXPECT_LT(most / least, 1.35); // chords across a bend are shorter
}

TEST(ColourMap, SequentialGrowsLighterAllTheWay) {
  expect_lightness_to_run(sequential_map(), 0, ColourMap::steps - 1, 1.0);
}

TEST(ColourMap, DivergingGrowsLighterTowardItsMiddleAndDarkerBeyond) {
  expect_lightness_to_run(diverging_map(), 0, 127, 1.0);
  expect_lightness_to_run(diverging_map(), 128, 255, -1.0);
}

TEST(ColourMap, DivergingIsAsDarkOnBothSides) {
  for (const double share : {0.0, 0.1, 0.25, 0.4})
    EXPECT_NEAR(to_oklab(diverging_map().at(share)).lightness,
                to_oklab(diverging_map().at(1.0 - share)).lightness, 0.03);
}

TEST(ColourMap, CyclicClosesOnItself) {
  EXPECT_EQ(cyclic_map().at(0.0), cyclic_map().at(1.0));
}

TEST(ColourMap, CyclicRunsFromDarkToLightAndBack) {
  expect_lightness_to_run(cyclic_map(), 0, 125, 1.0);
  expect_lightness_to_run(cyclic_map(), 130, 255, -1.0);
}

TEST(ColourMap, StepsLookEven) {
  expect_even_steps(sequential_map());
  expect_even_steps(cyclic_map());
}

/// Deuteranopes keep lightness and the blue–yellow axis (b); by these alone the two sides stand apart.
TEST(ColourMap, SidesOfTheDivergingOneDifferInBlueAndYellow) {
  for (const double share : {0.0, 0.1, 0.25, 0.4})
    EXPECT_GT(to_oklab(diverging_map().at(1.0 - share)).b - to_oklab(diverging_map().at(share)).b, 0.05);
}

/// Reference values of Ottosson (2020), whose table gives XYZ; white and black are exact by definition.
TEST(Oklab, HasWhiteAndBlackAtItsEnds) {
  EXPECT_NEAR(to_oklab({255, 255, 255}).lightness, 1.0, 1e-6);
  EXPECT_NEAR(to_oklab({255, 255, 255}).b, 0.0, 1e-6);
  EXPECT_EQ(to_oklab({0, 0, 0}).lightness, 0.0);
}

TEST(Oklab, ComesBackToTheSameColour) {
  for (int level = 0; level < 256; level += 5) {
    const auto channel = static_cast<std::uint8_t>(level);
    const Colour colour{channel, static_cast<std::uint8_t>(255 - level),
                        static_cast<std::uint8_t>(level / 2)};
    EXPECT_EQ(to_srgb(to_oklab(colour)), colour);
  }
}

} // namespace
} // namespace lightledger::report
