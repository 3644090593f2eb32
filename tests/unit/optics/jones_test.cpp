#include <lightledger/optics/jones.hpp>

#include <gtest/gtest.h>

#include <cmath>
#include <numbers>

namespace lightledger::optics {
namespace {

constexpr double degree = std::numbers::pi / 180.0;
constexpr Complex i{0.0, 1.0};

/// Amplitudes along an azimuth and across it.
Jones along(double azimuth_deg, Complex a, Complex b) {
  const double c = std::cos(azimuth_deg * degree);
  const double s = std::sin(azimuth_deg * degree);
  return {c * c * a + s * s * b, c * s * (a - b), c * s * (a - b), s * s * a + c * c * b};
}

Jones retarder(double fast_deg, double retardance_deg) {
  return along(fast_deg, 1.0, std::polar(1.0, retardance_deg * degree));
}

double distance(const Jones& a, const Jones& b) {
  return std::sqrt(std::norm(a.xx - b.xx) + std::norm(a.xy - b.xy) + std::norm(a.yx - b.yx) +
                   std::norm(a.yy - b.yy));
}

const Jones any{{0.3, -0.2}, {-0.7, 0.1}, {0.4, 0.9}, {-0.1, -0.6}};
const Jones other{{-0.5, 0.8}, {0.2, 0.3}, {0.6, -0.4}, {0.7, 0.1}};

TEST(PauliVector, HoldsTheWholeMatrix) {
  EXPECT_LT(distance(jones(pauli(any)), any), 1e-15);
}

TEST(PauliVector, MultipliesAsMatricesDo) {
  EXPECT_LT(distance(jones(product(pauli(any), pauli(other))), any * other), 1e-15);
}

TEST(Diattenuation, IsThatOfThePowers) {
  const auto found = diattenuation(pauli(along(30.0, 0.9, 0.6)));
  ASSERT_TRUE(found);
  EXPECT_NEAR(found->size, (0.81 - 0.36) / (0.81 + 0.36), 1e-15);
  EXPECT_NEAR(azimuth_of(found->axis[0], found->axis[1]), 30.0, 1e-12);
}

TEST(Diattenuation, OfALongChainOfRetardersIsRounding) {
  PauliVector k = pauli({});
  for (int n = 0; n < 50; ++n)
    k = product(pauli(std::polar(0.98, 0.3 * n) * retarder(7.0 * n, 13.0 * n)), k);
  EXPECT_LT(diattenuation(k)->size, 1e-14);
}

TEST(Diattenuation, OfNothingIsNone) {
  EXPECT_FALSE(diattenuation(PauliVector{}));
}

// J = U H with H Hermitian and positive: a retarder behind a diattenuator.
TEST(Retardance, IsThatOfTheUnitaryFactor) {
  for (const double size : {1e-7, 0.01, 45.0, 90.0, 179.0}) {
    const Jones chain = std::polar(0.8, 2.1) * (retarder(-20.0, size) * along(55.0, 0.9, 0.2));
    const auto found = retardance(pauli(chain));
    ASSERT_TRUE(found);
    EXPECT_NEAR(found->size, size, 1e-12 * std::max(size, 1.0));
    EXPECT_NEAR(azimuth_of(found->axis[0], found->axis[1]), -20.0, size < 1e-3 ? 1e-5 : 1e-9);
  }
}

TEST(Retardance, OfAHalfWaveIs180) {
  EXPECT_NEAR(retardance(pauli(retarder(12.0, 180.0)))->size, 180.0, 1e-12);
}

TEST(Retardance, IsCountedTheShortWayRound) {
  const auto found = retardance(pauli(retarder(10.0, 270.0)));
  EXPECT_NEAR(found->size, 90.0, 1e-12);
  EXPECT_NEAR(azimuth_of(found->axis[0], found->axis[1]), -80.0, 1e-12);
}

TEST(Retardance, OfAPolarizerIsNone) {
  EXPECT_FALSE(retardance(pauli(along(30.0, 1.0, 0.0))));
  EXPECT_TRUE(retardance(pauli(along(30.0, 1.0, 1e-6))));
}

TEST(Crossing, GivesTheAmplitudeOfTheOrthogonalState) {
  const double azimuth = 25.0 * degree;
  const double ellipticity = -12.0 * degree;
  const Complex ex =
      std::cos(azimuth) * std::cos(ellipticity) - i * std::sin(azimuth) * std::sin(ellipticity);
  const Complex ey =
      std::sin(azimuth) * std::cos(ellipticity) + i * std::cos(azimuth) * std::sin(ellipticity);
  const Complex out_x = any.xx * ex + any.xy * ey;
  const Complex out_y = any.yx * ex + any.yy * ey;
  const double expected = std::norm(-ey * out_x + ex * out_y); // e⊥ = (−ey*, ex*)
  const auto t = crossing(elliptical(25.0, -12.0));
  const PauliVector k = pauli(any);
  EXPECT_NEAR(std::norm(t[0] * k[1] + t[1] * k[2] + t[2] * k[3]), expected, 1e-14);
}

TEST(Azimuth, LiesAboveMinus90) {
  EXPECT_EQ(azimuth_of(-1.0, -0.0), 90.0);
  EXPECT_EQ(azimuth_of(-1.0, 0.0), 90.0);
  EXPECT_NEAR(azimuth_of(0.0, -1.0), -45.0, 1e-14);
}

} // namespace
} // namespace lightledger::optics
