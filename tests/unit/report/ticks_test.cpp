#include "report/ticks.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <string>
#include <vector>

namespace lightledger::report {
namespace {

std::vector<std::string> named(const std::vector<Tick>& ticks) {
  std::vector<std::string> labels;
  for (const Tick& tick : ticks)
    if (!tick.label.empty())
      labels.push_back(tick.label);
  return labels;
}

using Labels = std::vector<std::string>;

TEST(LinearTicks, AreRoundAndHaveTheDecimalsOfTheirStep) {
  EXPECT_EQ(named(linear_ticks({0.0, 1.0}, 5)), (Labels{"0.0", "0.2", "0.4", "0.6", "0.8", "1.0"}));
  EXPECT_EQ(named(linear_ticks({-12.0, 12.0}, 4)), (Labels{"-10", "-5", "0", "5", "10"}));
}

TEST(LinearTicks, StayWithinTheInterval) {
  for (const Tick& tick : linear_ticks({0.3, 0.7}, 7)) {
    EXPECT_GE(tick.value, 0.3 - 1e-9);
    EXPECT_LE(tick.value, 0.7 + 1e-9);
  }
}

TEST(LinearTicks, AreFewEvenOfTinyAndHugeIntervals) {
  for (const double size : {1e-290, 1e-9, 1e9, 1e290})
    EXPECT_LE(linear_ticks({0.0, size}, 6).size(), 12U) << size;
}

TEST(LinearTicks, NameNoNegativeZero) {
  for (const std::string& label : named(linear_ticks({-0.3, 0.3}, 6)))
    EXPECT_NE(label, "-0.0");
}

TEST(DecadeTicks, NamePowersOfTen) {
  EXPECT_EQ(named(decade_ticks({1e-6, 1.0}, 10)),
            (Labels{"1e-6", "1e-5", "1e-4", "0.001", "0.01", "0.1", "1"}));
}

TEST(DecadeTicks, NameOnlyAsManyAsThereIsRoomFor) {
  EXPECT_LE(named(decade_ticks({1e-200, 1.0}, 8)).size(), 9U);
}

TEST(Drawable, KeepsAnIntervalThatHasALength) {
  EXPECT_EQ(drawable({2.0, 3.0}).from, 2.0);
  EXPECT_EQ(drawable({2.0, 3.0}).to, 3.0);
}

TEST(Drawable, GivesLengthToAPoint) {
  for (const double value : {0.0, 5.0, -1e-200, 1e290})
    EXPECT_GT(drawable({value, value}).length(), 0.0) << value;
}

TEST(Drawable, ReplacesWhatIsNotFinite) {
  EXPECT_TRUE(std::isfinite(drawable({NAN, INFINITY}).length()));
}

} // namespace
} // namespace lightledger::report
