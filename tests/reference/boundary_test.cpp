#include "reference/boundary.hpp"
#include "reference/random.hpp"
#include "reference/train.hpp"

#include <gtest/gtest.h>

#include <Eigen/Dense>
#include <cmath>
#include <numbers>

namespace lightledger::reference {
namespace {

constexpr double degree = std::numbers::pi / 180.0;

Incidence at(double degrees) {
  return {std::cos(degrees * degree), std::sin(degrees * degree)};
}

/// Born & Wolf, 7th ed., §1.6.2: the plain product of characteristic matrices, in the sign of exp(−iωt).
struct AbelesAmplitudes {
  Complex r, t;
};
AbelesAmplitudes abeles(double incident, const std::vector<Film>& films, Complex exit, double sine,
                        double wavelength_nm, bool p) {
  const auto q = [&](Complex n) { return std::sqrt(n * n - incident * incident * sine * sine); };
  const auto eta = [&](Complex n) { return p ? n * n / q(n) : q(n); };
  Eigen::Matrix2cd product = Eigen::Matrix2cd::Identity();
  for (const Film& film : films) {
    const Complex delta = 2.0 * std::numbers::pi * film.thickness_nm / wavelength_nm * q(film.index);
    const Complex i(0.0, 1.0);
    Eigen::Matrix2cd matrix;
    matrix << std::cos(delta), -i * std::sin(delta) / eta(film.index), -i * eta(film.index) * std::sin(delta),
        std::cos(delta);
    product *= matrix;
  }
  const Eigen::Vector2cd fields = product * Eigen::Vector2cd(1.0, eta(exit));
  const Complex eta0 = eta(incident);
  const Complex sum = eta0 * fields[0] + fields[1];
  return {(eta0 * fields[0] - fields[1]) / sum, 2.0 * eta0 / sum};
}

std::vector<Film> random_films(Dice& dice) {
  std::vector<Film> films;
  for (int count = dice.whole(1, 8); count > 0; --count)
    films.push_back({{dice.between(1.2, 2.6), dice.chance(0.5) ? 0.0 : dice.magnitude(1e-5, 0.5)},
                     dice.between(5.0, 300.0)});
  if (dice.chance(0.3))
    films.push_back({{0.06, 3.6}, dice.between(5.0, 40.0)});
  return films;
}

TEST(ReferenceFresnel, HasTheAmplitudesOfGlassAtSixtyDegrees) {
  const Boundary glass = bare(1.0, 1.5, at(60.0));
  EXPECT_NEAR(glass.s.r.real(), -0.420204102887, 1e-12);
  EXPECT_NEAR(glass.p.r.real(), -0.0424492346407, 1e-13);
  EXPECT_NEAR(glass.s.transmitted, 0.823428511917, 1e-12);
  EXPECT_NEAR(glass.p.transmitted, 0.998198062478, 1e-12);
}

TEST(ReferenceFresnel, ReversesTheSignOfPAtNormalIncidence) {
  const Boundary glass = bare(1.0, 1.5, {1.0, 0.0});
  EXPECT_NEAR(glass.s.r.real(), -0.2, 1e-16);
  EXPECT_NEAR(glass.p.r.real(), 0.2, 1e-16);
}

TEST(ReferenceFresnel, ReflectsTotallyWithTheEvanescentPhase) {
  const Boundary inside = bare(1.5, 1.0, at(45.0));
  EXPECT_NEAR(inside.s.reflected, 1.0, 1e-15);
  EXPECT_EQ(inside.s.transmitted, 0.0);
  EXPECT_EQ(inside.p.transmitted, 0.0);
  EXPECT_NEAR(std::arg(inside.s.r) / degree, -36.8698976458, 1e-9);
  EXPECT_NEAR(std::arg(inside.p.r) / degree, -73.7397952917, 1e-9);
}

TEST(ReferenceFresnel, ReflectsFromAluminiumAsComputed) {
  const Boundary aluminium = bare(1.0, {1.44, 5.23}, at(45.0));
  EXPECT_NEAR(aluminium.s.reflected, 0.875257416765, 1e-12);
  EXPECT_NEAR(aluminium.p.reflected, 0.766075545602, 1e-12);
  EXPECT_NEAR(std::arg(aluminium.p.r / aluminium.s.r) / degree, -165.74409287, 1e-8);
  EXPECT_NEAR(aluminium.p.reflected + aluminium.p.transmitted, 1.0, 1e-15);
}

TEST(ReferenceStack, WithoutFilmsIsTheBareBoundary) {
  for (const Complex exit : {Complex(1.5), Complex(1.1), Complex(0.9, 6.5)})
    for (const double angle : {0.0, 30.0, 50.0, 80.0}) {
      const Boundary expected = bare(1.3, exit, at(angle));
      const Boundary found = stack(1.3, {}, exit, at(angle), 500.0);
      EXPECT_LT(std::abs(found.s.r - expected.s.r), 1e-14);
      EXPECT_LT(std::abs(found.p.r - expected.p.r), 1e-14);
      EXPECT_NEAR(found.s.transmitted, expected.s.transmitted, 1e-14);
      EXPECT_NEAR(found.p.transmitted, expected.p.transmitted, 1e-14);
    }
}

// W. J. Smith, Modern Optical Engineering, ch. 11, exercise 1: a quarter wave of 1.38 on 1.52.
TEST(ReferenceStack, MatchesThePrintedQuarterWaveCoat) {
  const std::vector<Film> film{{1.38, 550.0 / 4.0 / 1.38}};
  const Boundary forty = stack(1.0, film, 1.52, at(40.0), 550.0);
  EXPECT_NEAR(forty.s.reflected, 0.0311021246275, 1e-12);
  EXPECT_NEAR(forty.p.reflected, 0.00317011637009, 1e-12);
}

// Frustrated total reflection: Zhu, Yu, Hawley & Roy, Am. J. Phys. 54, 601 (1986).
TEST(ReferenceStack, TunnelsThroughAGap) {
  const Boundary gap = stack(1.5, {{1.0, 250.0}}, 1.5, at(45.0), 500.0);
  EXPECT_NEAR(gap.s.transmitted, 0.164213627088, 1e-12);
  EXPECT_NEAR(gap.p.transmitted, 0.33465677014, 1e-11);
  EXPECT_EQ(gap.s.absorbed, 0.0);
}

TEST(ReferenceStack, NeitherOverflowsNorInventsLightInThickMetal) {
  const Boundary thick = stack(1.0, {{Complex(0.06, 3.6), 1e6}}, 1.5, at(30.0), 500.0);
  EXPECT_EQ(thick.s.transmitted, 0.0);
  EXPECT_NEAR(thick.p.reflected + thick.p.absorbed, 1.0, 1e-13);
}

TEST(ReferenceStack, AgreesWithTheProductOfCharacteristicMatrices) {
  Dice dice(11);
  for (int i = 0; i < 200; ++i) {
    const std::vector<Film> films = random_films(dice);
    const Complex exit = dice.chance(0.5) ? Complex(dice.between(1.0, 1.9)) : Complex(0.9, 6.0);
    const double incident = dice.one_of({1.0, 1.33, 1.6});
    const Incidence angle = at(dice.between(0.0, 85.0));
    const Boundary found = stack(incident, films, exit, angle, 600.0);
    const AbelesAmplitudes s = abeles(incident, films, exit, angle.sine, 600.0, false);
    const AbelesAmplitudes p = abeles(incident, films, exit, angle.sine, 600.0, true);
    EXPECT_LT(std::abs(found.s.r - s.r), 1e-12);
    EXPECT_LT(std::abs(found.p.r + p.r), 1e-12);
    if (exit.imag() == 0.0 && found.s.transmitted > 0.0) {
      EXPECT_NEAR(std::arg(found.s.t / s.t), 0.0, 1e-11);
      EXPECT_NEAR(std::arg(found.p.t / p.t), 0.0, 1e-11);
    }
  }
}

TEST(ReferenceStack, AccountsForAllPower) {
  Dice dice(12);
  for (int i = 0; i < 500; ++i) {
    const std::vector<Film> films = random_films(dice);
    const Complex exit = dice.chance(0.5) ? Complex(dice.between(1.0, 1.9)) : Complex(0.9, 6.0);
    const Boundary found = stack(dice.one_of({1.0, 1.5}), films, exit, at(dice.between(0.0, 89.0)), 600.0);
    EXPECT_NEAR(found.s.reflected + found.s.transmitted + found.s.absorbed, 1.0, 2e-13);
    EXPECT_NEAR(found.p.reflected + found.p.transmitted + found.p.absorbed, 1.0, 2e-13);
  }
}

// F. L. Pedrotti et al., Introduction to Optics: quarter waves of 1.65 and 2.1 on 1.52; the other order
// reflects 18 %.
TEST(ReferenceInterface, MeetsTheLastWrittenLayerFirst) {
  Train train(600.0);
  const auto glass = train.medium(1.52);
  const auto quarter = [&](double n) {
    return assembly::Film{train.medium(n), assembly::Film::Waves{0.25, 600.0}, {}};
  };
  const assembly::Layers layers{{quarter(2.1), quarter(1.65)}};
  train.refract(assembly::Plane{}, glass).coat(layers, assembly::Side::beyond);
  const auto reflectance = [&] {
    return interface_at(train.assembly, train.surface(), {1.0, 0.0}, 600.0).boundary.s.reflected;
  };
  EXPECT_NEAR(reflectance(), 0.00101099627495, 1e-14);
  train.surface().coating->substrate = assembly::Side::before;
  EXPECT_NEAR(reflectance(), 0.178357621302, 1e-12);
}

TEST(ReferenceInterface, IdealCoatingReflectsAllItDoesNotAbsorbBeyondTheCriticalAngle) {
  const assembly::Ideal coating{{0.3, 0.6}, {0.5, 0.5}};
  const Boundary beyond = ideal(coating, true);
  EXPECT_NEAR(beyond.s.reflected, 0.9, 1e-15);
  EXPECT_NEAR(beyond.s.absorbed, 0.1, 1e-15);
  EXPECT_EQ(beyond.s.transmitted, 0.0);
  EXPECT_NEAR(beyond.p.reflected, 1.0, 1e-15);
}

} // namespace
} // namespace lightledger::reference
