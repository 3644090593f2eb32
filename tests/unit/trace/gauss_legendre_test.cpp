#include "trace/gauss_legendre.hpp"

#include <gtest/gtest.h>

#include <cmath>

namespace lightledger::trace {
namespace {

// Abramowitz & Stegun, Handbook of Mathematical Functions (1964), Table 25.4, n = 5.
TEST(GaussLegendre, HasTheTabulatedNodesAndWeightsOfFivePoints) {
  const auto rule = gauss_legendre(5);
  ASSERT_EQ(rule.size(), 5U);
  EXPECT_NEAR(rule[4].node, 0.906179845938664, 1e-15);
  EXPECT_NEAR(rule[4].weight, 0.236926885056189, 1e-15);
  EXPECT_NEAR(rule[3].node, 0.538469310105683, 1e-15);
  EXPECT_NEAR(rule[3].weight, 0.478628670499366, 1e-15);
  EXPECT_EQ(rule[2].node, 0.0);
  EXPECT_NEAR(rule[2].weight, 0.568888888888889, 1e-15);
}

TEST(GaussLegendre, OfOnePointIsTheMiddle) {
  const auto rule = gauss_legendre(1);
  EXPECT_EQ(rule[0].node, 0.0);
  EXPECT_NEAR(rule[0].weight, 2.0, 1e-15);
}

TEST(GaussLegendre, IntegratesPowersBelowTwiceItsCountExactly) {
  for (const int count : {2, 7, 24, 301}) {
    const auto rule = gauss_legendre(count);
    for (int power = 0; power < 2 * count; power += 3) {
      double sum = 0.0;
      for (const auto& [node, weight] : rule)
        sum += weight * std::pow(node, power);
      EXPECT_NEAR(sum, power % 2 == 0 ? 2.0 / (power + 1.0) : 0.0, 1e-13)
          << count << " points, power " << power;
    }
  }
}

} // namespace
} // namespace lightledger::trace
