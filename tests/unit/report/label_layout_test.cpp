#include "report/label_layout.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <array>
#include <numbers>

namespace lightledger::report {
namespace {

using testing::DoubleNear;
using testing::ElementsAre;

const Box unit_square{{0.0, 0.0}, {1.0, 1.0}};

TEST(Spread, LeavesPlacesThatAreFarEnoughApart) {
  EXPECT_THAT(spread(std::array{0.0, 10.0}, std::array{5.0}), ElementsAre(0.0, 10.0));
}

TEST(Spread, MovesCrowdedPlacesApartAboutTheirMean) {
  EXPECT_THAT(spread(std::array{4.0, 4.0, 4.0}, std::array{2.0, 2.0}), ElementsAre(2.0, 4.0, 6.0));
}

TEST(Spread, LetsGroupsPushEachOther) {
  const std::vector<double> places = spread(std::array{0.0, 0.0, 1.0, 20.0}, std::array{2.0, 2.0, 2.0});
  EXPECT_THAT(places, ElementsAre(DoubleNear(-5.0 / 3.0, 1e-12), DoubleNear(1.0 / 3.0, 1e-12),
                                  DoubleNear(7.0 / 3.0, 1e-12), 20.0));
}

TEST(Segments, CrossABoxThroughItsInsideOnly) {
  EXPECT_TRUE(crosses({{-1.0, 0.5}, {2.0, 0.5}}, unit_square));
  EXPECT_TRUE(crosses({{0.2, 0.2}, {0.4, 0.4}}, unit_square));
  EXPECT_FALSE(crosses({{-1.0, 0.5}, {-0.5, 0.5}}, unit_square));
  EXPECT_FALSE(crosses({{-1.0, 0.5}, {0.5, 3.0}}, unit_square));
}

TEST(LabelPlacer, PutsALabelBesideItsTie) {
  LabelPlacer placer;
  const auto placed = placer.place(std::array{Tie{{0.0, 0.0}, {1.0, 0.0}}}, {30.0, 14.0});
  ASSERT_TRUE(placed);
  EXPECT_GT(placed->box.low[0], 0.0);
  EXPECT_LT(placed->box.low[0], 20.0);
}

TEST(LabelPlacer, KeepsLabelsOfTheSameTieApart) {
  LabelPlacer placer;
  std::vector<Box> boxes;
  for (int i = 0; i < 12; ++i) {
    const auto placed = placer.place(std::array{Tie{{0.0, 0.0}, {0.0, -1.0}}}, {50.0, 14.0});
    ASSERT_TRUE(placed) << i;
    for (const Box& other : boxes)
      EXPECT_FALSE(placed->box.overlaps(other)) << i;
    boxes.push_back(placed->box);
  }
}

TEST(LabelPlacer, KeepsOffForbiddenLines) {
  LabelPlacer placer;
  const Segment wall{{10.0, -100.0}, {10.0, 100.0}};
  placer.forbid(wall);
  const auto placed = placer.place(std::array{Tie{{0.0, 0.0}, {1.0, 0.0}}}, {30.0, 14.0});
  ASSERT_TRUE(placed);
  EXPECT_FALSE(crosses(wall, placed->box));
}

TEST(LabelPlacer, PrefersToLeaveRaysFree) {
  const Segment ray{{-100.0, -16.0}, {100.0, -16.0}};
  LabelPlacer placer;
  placer.avoid(ray);
  const std::array ties{Tie{{0.0, 0.0}, {0.0, -1.0}}, Tie{{0.0, 0.0}, {0.0, 1.0}}};
  const auto placed = placer.place(ties, {30.0, 14.0});
  ASSERT_TRUE(placed);
  EXPECT_FALSE(crosses(ray, placed->box));
}

} // namespace
} // namespace lightledger::report
