#include <lightledger/optics/mueller.hpp>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <cmath>
#include <numbers>

namespace lightledger::optics {
namespace {

using testing::DoubleNear;
using testing::ElementsAre;

constexpr double degree = std::numbers::pi / 180.0;
constexpr Complex i{0.0, 1.0};

Mueller diagonal(double a, double b, double c, double d) {
  Mueller m{};
  m[0][0] = a;
  m[1][1] = b;
  m[2][2] = c;
  m[3][3] = d;
  return m;
}

/// Amplitudes along x and along y.
PauliVector along_x(Complex x, Complex y) {
  return pauli({x, 0.0, 0.0, y});
}

PauliCoherency sum(const PauliCoherency& a, const PauliCoherency& b) {
  PauliCoherency both = a;
  both += b;
  return both;
}

const Jones any{{0.3, -0.2}, {-0.7, 0.1}, {0.4, 0.9}, {-0.1, -0.6}};

// Stokes vectors of J e by their definition (contract §2), for six states that span all.
TEST(Mueller, DoesToStokesVectorsWhatJonesDoesToFields) {
  const double half = std::sqrt(0.5);
  const std::array<std::array<Complex, 2>, 6> fields{
      {{1.0, 0.0}, {0.0, 1.0}, {half, half}, {half, -half}, {half, i * half}, {half, -i * half}}};
  const auto stokes_of = [](Complex x, Complex y) {
    return Stokes{std::norm(x) + std::norm(y), std::norm(x) - std::norm(y), 2.0 * (std::conj(x) * y).real(),
                  2.0 * (std::conj(x) * y).imag()};
  };
  const Mueller m = mueller(pauli(any));
  for (const auto& [x, y] : fields) {
    const Stokes out = through(m, stokes_of(x, y));
    const Stokes expected = stokes_of(any.xx * x + any.xy * y, any.yx * x + any.yy * y);
    for (std::size_t k = 0; k < 4; ++k)
      EXPECT_NEAR(out[k], expected[k], 1e-14);
  }
}

// "a quarter wave with axis 0 turns linear 45 into right-handed" (contract §3)
TEST(Mueller, OfAQuarterWaveTurns45IntoRight) {
  const Stokes out = through(mueller(along_x(1.0, i)), stokes(linear(45.0)));
  EXPECT_NEAR(out[3], 1.0, 1e-15);
  EXPECT_NEAR(ellipticity_deg(out).value_or(0.0), 45.0, 1e-12);
}

TEST(StokesVector, HasNoAzimuthWhereItIsCircular) {
  EXPECT_FALSE(azimuth_deg({1.0, 0.0, 0.0, 0.7}));
  EXPECT_FALSE(ellipticity_deg({1.0, 0.0, 0.0, 0.0}));
  EXPECT_FALSE(degree_of_polarization({0.0, 0.0, 0.0, 0.0}));
  EXPECT_NEAR(azimuth_deg({2.0, 0.0, -1.0, 0.3}).value_or(0.0), -45.0, 1e-13);
}

TEST(CoherencyEigenvalues, OfAPureMatrixAreOne) {
  const PauliVector k = pauli(any);
  const double power = std::norm(k[0]) + std::norm(k[1]) + std::norm(k[2]) + std::norm(k[3]);
  EXPECT_THAT(coherency_eigenvalues(mueller(k)), ElementsAre(DoubleNear(0, 1e-14), DoubleNear(0, 1e-14),
                                                             DoubleNear(0, 1e-14), DoubleNear(power, 1e-14)));
}

TEST(CoherencyEigenvalues, OfAMixtureAreItsShares) {
  const PauliCoherency mixed =
      sum(coherency_of(along_x(1.0, 1.0), 0.7), coherency_of(along_x(1.0, -1.0), 0.3));
  EXPECT_THAT(coherency_eigenvalues(mueller(mixed)),
              ElementsAre(DoubleNear(0, 1e-15), DoubleNear(0, 1e-15), DoubleNear(0.3, 1e-14),
                          DoubleNear(0.7, 1e-14)));
}

TEST(Decomposition, OfARetarderBehindADiattenuatorGivesTheRetarderBack) {
  const Jones diattenuator{0.9, 0.1, 0.1, 0.5};
  const double delta = 50.0 * degree;
  const Jones retarder{1.0, 0.0, 0.0, std::polar(1.0, delta)};
  const auto parts = decompose(mueller(pauli(retarder * diattenuator)));
  ASSERT_TRUE(parts);
  EXPECT_NEAR(parts->retardance_deg, 50.0, 1e-11);
  EXPECT_NEAR(parts->axis[0], 1.0, 1e-12);
  EXPECT_NEAR(parts->depolarization, 0.0, 1e-13);
}

// A retarder whose retardance is spread evenly over 2 w keeps its mean, and shrinks S2 and S3 by sinc w.
TEST(Decomposition, OfASpreadOfRetardersGivesTheirMeanAndTheirDepolarization) {
  PauliCoherency t;
  constexpr int count = 2000;
  const double mean = 1.1;
  const double w = 0.7;
  for (int n = 0; n < count; ++n) {
    const double delta = mean + w * (2.0 * (n + 0.5) / count - 1.0);
    t += coherency_of(along_x(std::polar(1.0, -0.5 * delta), std::polar(1.0, 0.5 * delta)), 1.0 / count);
  }
  const double shrunk = std::sin(w) / w;
  const auto parts = decompose(mueller(t));
  ASSERT_TRUE(parts);
  EXPECT_NEAR(parts->retardance_deg, mean / degree, 1e-9);
  EXPECT_NEAR(parts->depolarization, 1.0 - (1.0 + 2.0 * shrunk) / 3.0, 1e-7);
}

TEST(Decomposition, OfAPolarizerAndOfADepolarizerIsNone) {
  EXPECT_FALSE(decompose(mueller(along_x(1.0, 0.0))));
  EXPECT_FALSE(decompose(diagonal(1.0, 0.0, 0.0, 0.0)));
  EXPECT_FALSE(decompose(Mueller{}));
}

TEST(Decomposition, SeesRetardanceFarBelowADegree) {
  const auto parts = decompose(mueller(along_x(1.0, std::polar(1.0, 1e-9))));
  EXPECT_NEAR(parts->retardance_deg, 1e-9 / degree, 1e-14);
}

TEST(DiattenuationAndPolarizance, AreOfTheFirstRowAndColumn) {
  Mueller m = diagonal(0.5, 0.1, 0.1, 0.1);
  m[0][2] = 0.3;
  m[3][0] = -0.4;
  EXPECT_DOUBLE_EQ(diattenuation(m).value_or(0.0), 0.6);
  EXPECT_DOUBLE_EQ(polarizance(m).value_or(0.0), 0.8);
}

} // namespace
} // namespace lightledger::optics
