#include "reference/disc.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <optional>

namespace lightledger::reference {
namespace {

assembly::Beam unit_disc(std::optional<double> gaussian, double inner) {
  return {.radius = 1.0, .gaussian = gaussian, .inner = inner, .at = {}};
}

TEST(ReferenceDisc, GaussLegendreIntegratesPolynomialsUpToTwiceItsCount) {
  double integral = 0.0;
  for (const Node& node : gauss_legendre(4))
    integral += node.weight * std::pow(node.at, 7);
  EXPECT_NEAR(integral, 1.0 / 8.0, 1e-15);
}

TEST(ReferenceDisc, RingsLeaveTheHoleOutAndCoverTheRestEvenly) {
  const assembly::Beam beam{.radius = 4.0, .gaussian = {}, .inner = 2.0, .at = {1.0, -1.0}};
  double second_moment = 0.0;
  for (const DiscPoint& point : disc_points(beam, assembly::Rings{3, 6}))
    second_moment += point.share * (std::pow(point.at[0] - 1.0, 2) + std::pow(point.at[1] + 1.0, 2));
  EXPECT_NEAR(second_moment, (16.0 + 4.0) / 2.0, 1e-13);
}

TEST(ReferenceDisc, GridTakesTheCellsWhoseCentresLieOnTheDisc) {
  EXPECT_EQ(disc_points(unit_disc({}, 0.0), assembly::Grid{4}).size(), 12U);
  EXPECT_EQ(disc_points(unit_disc({}, 0.5), assembly::Grid{4}).size(), 8U);
}

TEST(ReferenceDisc, GaussianWeighsByIrradiance) {
  const auto points = disc_points(unit_disc(0.5, 0.0), assembly::Grid{3});
  ASSERT_EQ(points.size(), 9U);
  EXPECT_NEAR(points[1].share / points[4].share, std::exp(-2.0 * 4.0 / 9.0 / 0.25), 1e-15);
}

} // namespace
} // namespace lightledger::reference
