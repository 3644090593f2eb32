#include <lightledger/optics/boundary.hpp>

#include <gtest/gtest.h>

#include <cmath>
#include <random>

namespace lightledger::optics {
namespace {

double reflected_s(const Response& response) {
  return std::norm(response.r_s);
}
double transmitted_s(const Response& response) {
  return std::norm(response.t_s);
}
double reflected_p(const Response& response) {
  return std::norm(response.r_p);
}
double transmitted_p(const Response& response) {
  return std::norm(response.t_p);
}

TEST(BareBoundary, ReflectsSAndPOppositelyAtNormalIncidence) {
  for (const Complex exit : {Complex{1.5, 0.0}, Complex{0.7, 0.0}, Complex{1.44, 5.23}}) {
    const Response at = bare_boundary(1.2, exit, 1.0);
    EXPECT_LT(std::abs(at.r_p + at.r_s), 1e-15);
    EXPECT_NEAR(std::abs(at.t_p), std::abs(at.t_s), 1e-15);
  }
}

TEST(BareBoundary, ReflectsAHigherIndexWithNegativeRs) {
  EXPECT_LT(bare_boundary(1.0, 1.5, 1.0).r_s.real(), 0.0);
  EXPECT_GT(bare_boundary(1.5, 1.0, 1.0).r_s.real(), 0.0);
}

TEST(BareBoundary, IsReversible) {
  const double cos_in = 0.6;
  const double cos_out = normal_component(1.33, 1.9, cos_in).real() / 1.9;
  const Response in = bare_boundary(1.33, 1.9, cos_in);
  const Response out = bare_boundary(1.9, 1.33, cos_out);
  EXPECT_NEAR(in.r_s.real(), -out.r_s.real(), 1e-15);
  EXPECT_NEAR(in.r_p.real(), -out.r_p.real(), 1e-15);
  EXPECT_NEAR(in.t_s.real(), out.t_s.real(), 1e-15);
  EXPECT_NEAR(in.t_p.real(), out.t_p.real(), 1e-15);
}

TEST(BareBoundary, ReflectsEverythingWithAMinusSignAtGrazingIncidence) {
  for (const Complex exit : {Complex{1.5, 0.0}, Complex{0.8, 0.0}, Complex{0.2, 3.4}}) {
    const Response at = bare_boundary(1.0, exit, 0.0);
    EXPECT_LT(std::abs(at.r_s + 1.0), 1e-15);
    EXPECT_LT(std::abs(at.r_p + 1.0), 1e-15);
    EXPECT_LT(std::abs(at.t_s), 1e-60);
    EXPECT_LT(std::abs(at.t_p), 1e-60);
  }
}

TEST(BareBoundary, IsNotThereBetweenEqualMedia) {
  for (const double cos_incident : {1.0, 0.3, 1e-9, 0.0}) {
    const Response at = bare_boundary(1.5, 1.5, cos_incident);
    EXPECT_EQ(at.r_s, 0.0) << cos_incident;
    EXPECT_EQ(at.r_p, 0.0) << cos_incident;
    EXPECT_NEAR(at.t_s.real(), 1.0, 1e-15) << cos_incident;
    EXPECT_NEAR(at.t_p.real(), 1.0, 1e-15) << cos_incident;
  }
}

TEST(BareBoundary, KeepsItsDigitsBetweenNearlyEqualMedia) {
  // To first order in δ = n2 − n1: r_s = −δ/(2 n c²), r_p = −δ (1 − 2c²)/(2 n c²).
  const double delta = 0x1p-40;
  const double c = 0.5;
  const Response at = bare_boundary(1.5, 1.5 + delta, c);
  EXPECT_NEAR(at.r_s.real() / (-delta / (2.0 * 1.5 * c * c)), 1.0, 1e-10);
  EXPECT_NEAR(at.r_p.real() / (-delta * (1.0 - 2.0 * c * c) / (2.0 * 1.5 * c * c)), 1.0, 1e-10);
}

TEST(BareBoundary, KeepsItsDigitsNearGrazingIncidence) {
  // To first order in c: T_s = 4c/√(n² − 1), T_p = n² T_s.
  const double c = 1e-12;
  const Response at = bare_boundary(1.0, 1.5, c);
  const double expected = 4.0 * c / std::sqrt(1.25);
  EXPECT_NEAR(transmitted_s(at) / expected, 1.0, 1e-11);
  EXPECT_NEAR(transmitted_p(at) / (2.25 * expected), 1.0, 1e-11);
}

TEST(BareBoundary, TransmitsExactlyNothingBeyondTheCriticalAngle) {
  for (const double cos_incident : {0.74, 0.5, 0.1, 1e-6}) {
    const Response at = bare_boundary(1.5, 1.0, cos_incident);
    EXPECT_EQ(at.t_s, 0.0);
    EXPECT_EQ(at.t_p, 0.0);
    EXPECT_NEAR(reflected_s(at), 1.0, 1e-14);
    EXPECT_NEAR(reflected_p(at), 1.0, 1e-14);
  }
}

TEST(BareBoundary, TakesTheDecayingWaveForAFaintlyAbsorbingExit) {
  // With the other root |r_s|² would be far above 1.
  const Response clear = bare_boundary(1.5, 1.3, 0.2);
  const Response faint = bare_boundary(1.5, {1.3, 1e-8}, 0.2);
  EXPECT_LT(std::abs(faint.r_s - clear.r_s), 1e-7);
  EXPECT_LE(reflected_s(faint), 1.0);
  EXPECT_NEAR(reflected_s(faint) + transmitted_s(faint), 1.0, 1e-14);
}

TEST(BareBoundary, AbsorbsNothing) {
  const Response at = bare_boundary(1.0, {1.44, 5.23}, 0.5);
  EXPECT_EQ(at.absorptance_s, 0.0);
  EXPECT_EQ(at.absorptance_p, 0.0);
}

TEST(BareBoundary, ConservesPowerForAnyPairOfMedia) {
  std::mt19937_64 random{1};
  std::uniform_real_distribution<double> unit;
  for (int i = 0; i < 20000; ++i) {
    const double incident = 1.0 + 2.0 * unit(random);
    const Complex transparent = 1.0 + 3.0 * unit(random);
    const Complex lossy{0.5 + 3.0 * unit(random), std::pow(10.0, 2.0 - 12.0 * unit(random))};
    const Complex exit = i % 2 == 0 ? transparent : lossy;
    const double cos_incident = i % 3 == 0 ? std::pow(10.0, -12.0 * unit(random)) : unit(random);
    const Response at = bare_boundary(incident, exit, cos_incident);
    EXPECT_NEAR(reflected_s(at) + transmitted_s(at), 1.0, 1e-13);
    EXPECT_NEAR(reflected_p(at) + transmitted_p(at), 1.0, 1e-13);
  }
}

TEST(BareBoundary, FollowsTheClosedFormsInTheAngleOfIncidenceAlone) {
  using Long = std::complex<long double>;
  std::mt19937_64 random{2};
  std::uniform_real_distribution<double> unit;
  for (int i = 0; i < 5000; ++i) {
    const double n1 = 1.0 + unit(random);
    const Complex n2{0.1 + 3.0 * unit(random), i % 2 == 0 ? 0.0 : 5.0 * unit(random)};
    const double c = unit(random);
    const Long n = Long{n2} / Long{n1};
    const Long root = std::sqrt(n * n - (1.0L - static_cast<long double>(c) * c));
    const Long cosine{c};
    const Response at = bare_boundary(n1, n2, c);
    EXPECT_LT(std::abs(Long{at.r_s} - (cosine - root) / (cosine + root)), 1e-13L);
    EXPECT_LT(std::abs(Long{at.r_p} - (n * n * cosine - root) / (n * n * cosine + root)), 1e-13L);
  }
}

TEST(NormalComponent, IsRealWhereLightGoesOn) {
  const Complex q = normal_component(1.0, 1.5, 0.6);
  EXPECT_NEAR(q.real(), std::sqrt(2.25 - 0.64), 1e-15);
  EXPECT_EQ(q.imag(), 0.0);
}

TEST(NormalComponent, IsPositiveImaginaryInTotalReflection) {
  const Complex q = normal_component(1.5, 1.0, 0.6);
  EXPECT_EQ(q.real(), 0.0);
  EXPECT_NEAR(q.imag(), std::sqrt(1.44 - 1.0), 1e-15);
}

TEST(NormalComponent, DecaysIntoAMetal) {
  const Complex q = normal_component(1.0, {0.05, 3.3}, 0.5);
  EXPECT_GT(q.imag(), 0.0);
  EXPECT_LT(std::abs(q * q - (Complex{0.05, 3.3} * Complex{0.05, 3.3} - 0.75)), 1e-14);
}

} // namespace
} // namespace lightledger::optics
