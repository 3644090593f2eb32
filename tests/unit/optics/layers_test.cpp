#include <lightledger/optics/boundary.hpp>

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <numbers>
#include <random>
#include <vector>

namespace lightledger::optics {
namespace {

using Layers = std::vector<Layer>;

constexpr double wavelength = 550.0;

Response coated(double incident, const Layers& layers, Complex exit, double cos_incident) {
  return layered_boundary(incident, layers, exit, cos_incident, wavelength);
}

double closure_s(const Response& response) {
  return std::norm(response.r_s) + std::norm(response.t_s) + response.absorptance_s - 1.0;
}
double closure_p(const Response& response) {
  return std::norm(response.r_p) + std::norm(response.t_p) + response.absorptance_p - 1.0;
}

void expect_near(const Response& one, const Response& other, double within) {
  EXPECT_LT(std::abs(one.r_s - other.r_s), within);
  EXPECT_LT(std::abs(one.r_p - other.r_p), within);
  EXPECT_LT(std::abs(one.t_s - other.t_s), within);
  EXPECT_LT(std::abs(one.t_p - other.t_p), within);
  EXPECT_NEAR(one.absorptance_s, other.absorptance_s, within);
  EXPECT_NEAR(one.absorptance_p, other.absorptance_p, within);
}

Layers reversed(Layers layers) {
  std::ranges::reverse(layers);
  return layers;
}

/// The cosine behind a stack between lossless media.
double cos_behind(double incident, double exit, double cos_incident) {
  return normal_component(incident, exit, cos_incident).real() / exit;
}

/// Random boundaries: films from 1 nm to 50 µm of dielectrics, weak absorbers, metals and the entrance medium
/// itself, before dielectrics, air and metals, from normal to grazing incidence, total reflection included.
class RandomStacks {
public:
  explicit RandomStacks(std::uint64_t seed) : m_random(seed) {}

  double between(double from, double to) { return std::uniform_real_distribution{from, to}(m_random); }

  double decades(double from, double to) { return std::pow(10.0, between(from, to)); }

  Complex dielectric() { return between(1.0, 3.0); }
  Complex weak_absorber() { return {between(1.0, 4.0), decades(-12.0, 0.0)}; }
  Complex metal() { return {between(0.04, 3.0), between(0.0, 8.0)}; }

  Complex film(double incident) {
    const double kind = between(0.0, 1.0);
    if (kind < 0.5)
      return dielectric();
    if (kind < 0.7)
      return weak_absorber();
    return kind < 0.85 ? metal() : Complex{incident, kind < 0.92 ? 0.0 : 1e-9};
  }

  Layers layers(double incident) {
    Layers stack(static_cast<std::size_t>(between(1.0, 12.0)));
    for (Layer& layer : stack)
      layer = {film(incident), decades(0.0, 4.7)};
    return stack;
  }

  Complex exit() {
    const double kind = between(0.0, 1.0);
    return kind < 0.4 ? dielectric() : kind < 0.7 ? Complex{1.0} : metal();
  }

  double cosine() {
    const double kind = between(0.0, 1.0);
    return kind < 0.7 ? between(0.0, 1.0) : kind < 0.95 ? decades(-12.0, 0.0) : kind < 0.98 ? 0.0 : 1.0;
  }

private:
  std::mt19937_64 m_random;
};

TEST(LayeredBoundary, WithoutLayersIsTheBareOne) {
  const Response bare = bare_boundary(1.0, {1.44, 5.23}, 0.4);
  const Response none = coated(1.0, {}, {1.44, 5.23}, 0.4);
  EXPECT_EQ(none.r_p, bare.r_p);
  EXPECT_EQ(none.t_s, bare.t_s);
}

TEST(LayeredBoundary, IgnoresLayersOfNoThickness) {
  for (const Complex exit : {Complex{1.5, 0.0}, Complex{0.2, 3.4}})
    expect_near(coated(1.0, {{2.3, 0.0}, {{0.1, 4.0}, 0.0}}, exit, 0.3), bare_boundary(1.0, exit, 0.3),
                1e-15);
}

TEST(LayeredBoundary, IgnoresAHalfWaveButForItsSign) {
  const Response bare = bare_boundary(1.0, 1.52, 1.0);
  const Response half_wave = coated(1.0, {{2.0, wavelength / 4.0}}, 1.52, 1.0);
  EXPECT_LT(std::abs(half_wave.r_s - bare.r_s), 1e-15);
  EXPECT_LT(std::abs(half_wave.t_s + bare.t_s), 1e-15);
}

TEST(LayeredBoundary, DelaysTransmittedLightByTheThicknessOfALayerLikeTheExit) {
  const double q = normal_component(1.0, 1.5, 0.6).real();
  const double phase = 2.0 * std::numbers::pi * q * 37.0 / wavelength;
  const Response bare = bare_boundary(1.0, 1.5, 0.6);
  const Response film = coated(1.0, {{1.5, 37.0}}, 1.5, 0.6);
  EXPECT_LT(std::abs(film.t_p - bare.t_p * std::polar(1.0, phase)), 1e-15);
}

TEST(LayeredBoundary, MeetsTheFirstLayerFirst) {
  // Thick silver hides what lies behind it.
  const Layer silver{{0.06, 3.6}, 2000.0};
  const Layer film{2.3, 60.0};
  const Response hidden = coated(1.0, {silver, film}, 1.5, 0.8);
  const Response covering = coated(1.0, {film, silver}, 1.5, 0.8);
  EXPECT_LT(std::abs(hidden.r_s - bare_boundary(1.0, silver.index, 0.8).r_s), 1e-14);
  EXPECT_GT(std::abs(covering.r_s - hidden.r_s), 0.1);
}

TEST(LayeredBoundary, AddsUpWhenALayerIsSplit) {
  const Complex chromium{2.9, 4.2};
  expect_near(coated(1.0, {{1.38, 90.0}, {chromium, 12.0}, {chromium, 5.0}}, 1.5, 0.5),
              coated(1.0, {{1.38, 90.0}, {chromium, 17.0}}, 1.5, 0.5), 1e-14);
}

TEST(LayeredBoundary, ClosesItsBudgetForAnyStack) {
  RandomStacks random{1};
  for (int i = 0; i < 20000; ++i) {
    const double incident = random.between(1.0, 2.5);
    const Layers layers = random.layers(incident);
    const Complex exit = random.exit();
    const Response at = coated(incident, layers, exit, random.cosine());
    ASSERT_LT(std::abs(closure_s(at)), 1e-12) << i;
    ASSERT_LT(std::abs(closure_p(at)), 1e-12) << i;
    ASSERT_GT(at.absorptance_s, -1e-13) << i;
    ASSERT_GT(at.absorptance_p, -1e-13) << i;
  }
}

TEST(LayeredBoundary, TransmitsTheSameAmplitudeFromBothSides) {
  RandomStacks random{2};
  for (int i = 0; i < 5000; ++i) {
    const Layers layers = random.layers(1.0);
    const double exit = random.between(1.0, 3.0);
    const double c = random.between(0.01, 1.0);
    const Response there = coated(1.0, layers, exit, c);
    const Response back = coated(exit, reversed(layers), 1.0, cos_behind(1.0, exit, c));
    ASSERT_LT(std::abs(there.t_s - back.t_s), 1e-11) << i;
    ASSERT_LT(std::abs(there.t_p - back.t_p), 1e-11) << i;
  }
}

/// r_s and r_p by the other road: waves summed layer by layer (G. B. Airy 1833), not fields carried.
struct Summed {
  Complex r_s, r_p;
};

Summed summed_reflections(double incident, const Layers& layers, Complex exit, double cos_incident) {
  const auto admittances = [&](Complex n) {
    const Complex q = normal_component(incident, n, cos_incident);
    return std::pair{q, n * n / q};
  };
  const auto join = [](Complex front, Complex behind) { return (front + behind) / (1.0 + front * behind); };
  Summed sum{};
  for (std::size_t i = layers.size() + 1; i-- > 0;) {
    const auto [s1, p1] = admittances(i == 0 ? Complex{incident} : layers[i - 1].index);
    const auto [s2, p2] = admittances(i == layers.size() ? exit : layers[i].index);
    const Complex turn =
        i == layers.size()
            ? Complex{1.0}
            : std::exp(Complex{0.0, 4.0 * std::numbers::pi * layers[i].thickness_nm / wavelength} * s2);
    sum = {join((s1 - s2) / (s1 + s2), sum.r_s * turn), join((p2 - p1) / (p2 + p1), sum.r_p * turn)};
  }
  return sum;
}

TEST(LayeredBoundary, AgreesWithTheSumOfReflections) {
  RandomStacks random{3};
  for (int i = 0; i < 5000; ++i) {
    const double incident = random.between(1.0, 2.5);
    const Layers layers = random.layers(incident);
    const Complex exit = random.exit();
    const double c = random.between(0.01, 1.0);
    const Response at = coated(incident, layers, exit, c);
    const Summed sum = summed_reflections(incident, layers, exit, c);
    ASSERT_LT(std::abs(at.r_s - sum.r_s), 1e-10) << i;
    ASSERT_LT(std::abs(at.r_p - sum.r_p), 1e-10) << i;
  }
}

TEST(LayeredBoundary, AbsorbsExactlyNothingInLosslessLayers) {
  const Response at = coated(1.0, {{1.38, 96.0}, {2.3, 50.0}}, {1.44, 5.23}, 0.6);
  EXPECT_EQ(at.absorptance_s, 0.0);
  EXPECT_EQ(at.absorptance_p, 0.0);
}

TEST(LayeredBoundary, AbsorbsByBeersLawBetweenMediaOfItsOwnIndex) {
  const double kappa = 1e-6;
  const double thickness = 2e6;
  const double c = 0.7;
  const Response at = coated(1.5, {{{1.5, kappa}, thickness}}, 1.5, c);
  const double expected = 1.0 - std::exp(-4.0 * std::numbers::pi * kappa * thickness / c / wavelength);
  EXPECT_NEAR(at.absorptance_s, expected, 1e-10);
  EXPECT_NEAR(at.absorptance_p, expected, 1e-10);
}

TEST(LayeredBoundary, AbsorbsInProportionToAVanishingThickness) {
  // The two expressions for the absorptance meet where the phase passes 1e-8.
  const auto absorbed = [](double thickness) { return coated(1.0, {{{3.0, 3.0}, thickness}}, 1.5, 0.4); };
  const Response thin = absorbed(1e-7);
  const Response thinner = absorbed(1e-8);
  EXPECT_GT(thinner.absorptance_p, 0.0);
  EXPECT_NEAR(thin.absorptance_s / thinner.absorptance_s, 10.0, 1e-6);
  EXPECT_NEAR(thin.absorptance_p / thinner.absorptance_p, 10.0, 1e-6);
}

TEST(LayeredBoundary, ConservesPowerThroughAFilmAtItsCriticalAngle) {
  // sinθ = 0.6 and index 1 of 0.6⁻¹: the normal component in the film is 0 to rounding.
  for (const double kappa : {0.0, 1e-300, 1e-18, 1e-12, 1e-6}) {
    const Response at = coated(1.0 / 0.6, {{{1.0, kappa}, 400.0}}, 1.5, 0.8);
    EXPECT_NEAR(closure_s(at), 0.0, 1e-13) << kappa;
    EXPECT_NEAR(closure_p(at), 0.0, 1e-13) << kappa;
  }
}

TEST(LayeredBoundary, TransmitsExactlyNothingIntoTotalReflection) {
  const Response at = coated(1.5, {{{2.0, 0.01}, 120.0}}, 1.0, 0.3);
  EXPECT_EQ(at.t_s, 0.0);
  EXPECT_EQ(at.t_p, 0.0);
  EXPECT_GT(at.absorptance_s, 0.0);
  EXPECT_NEAR(closure_s(at), 0.0, 1e-14);
  EXPECT_NEAR(closure_p(at), 0.0, 1e-14);
}

TEST(LayeredBoundary, ReflectsEverythingAtGrazingIncidence) {
  const Response at = coated(1.0, {{{1.38, 0.1}, 96.0}, {2.0, 50.0}}, 1.5, 0.0);
  EXPECT_LT(std::abs(at.r_s + 1.0), 1e-15);
  EXPECT_LT(std::abs(at.r_p + 1.0), 1e-15);
  EXPECT_LT(at.absorptance_s, 1e-100);
}

TEST(LayeredBoundary, OfTheMediumOnBothSidesIsNotThereAtGrazingIncidence) {
  const Response at = coated(1.5, {{1.5, 80.0}}, 1.5, 0.0);
  EXPECT_LT(std::abs(at.r_s), 1e-15);
  EXPECT_NEAR(std::norm(at.t_p), 1.0, 1e-15);
}

TEST(LayeredBoundary, HidesTheExitBehindMillimetresOfMetal) {
  const Complex aluminium{1.0, 6.6};
  const Response at = coated(1.0, {{aluminium, 5e6}}, 1.5, 0.7);
  const Response bulk = bare_boundary(1.0, aluminium, 0.7);
  EXPECT_EQ(at.t_s, 0.0);
  EXPECT_EQ(at.t_p, 0.0);
  EXPECT_LT(std::abs(at.r_p - bulk.r_p), 1e-14);
  EXPECT_NEAR(at.absorptance_p, std::norm(bulk.t_p), 1e-14);
}

TEST(LayeredBoundary, StandsAHundredThousandLayersInItsStopBand) {
  Layers layers;
  for (int i = 0; i < 50000; ++i)
    layers.insert(layers.end(), {{2.3, wavelength / 4.0 / 2.3}, {1.46, wavelength / 4.0 / 1.46}});
  const Response at = coated(1.0, layers, 1.52, 1.0);
  EXPECT_EQ(at.t_s, 0.0);
  EXPECT_NEAR(std::norm(at.r_s), 1.0, 1e-14);
  EXPECT_NEAR(at.r_s.real(), -1.0, 1e-9);
}

TEST(LayeredBoundary, StandsAHundredThousandAbsorbingLayers) {
  Layers layers;
  for (int i = 0; i < 50000; ++i)
    layers.insert(layers.end(), {{{2.3, 1e-3}, 60.0}, {{0.1, 3.0}, 2.0}});
  const Response at = coated(1.0, layers, 1.52, 0.8);
  EXPECT_NEAR(closure_s(at), 0.0, 1e-12);
  EXPECT_NEAR(closure_p(at), 0.0, 1e-12);
}

TEST(LayeredBoundary, GivesNumbersForSenselessThicknesses) {
  for (const double thickness : {1e-308, 1e30, 1e308})
    for (const Complex index : {Complex{2.0, 0.0}, Complex{1.1, 0.0}, Complex{2.0, 1e-3}}) {
      const Response at = coated(1.5, {{index, thickness}}, 1.2, 0.5);
      EXPECT_LE(std::norm(at.r_s), 1.0 + 1e-12);
      EXPECT_LE(std::norm(at.t_p), 1.0 + 1e-12);
      EXPECT_TRUE(std::isfinite(at.absorptance_p));
    }
}

TEST(LayeredBoundary, GivesNumbersForASenselessWavelength) {
  const Layer layers[] = {{2.0, 0.0}, {{2.0, 0.1}, 1.0}};
  for (const double nm : {1e-308, 1e308}) {
    const Response at = layered_boundary(1.0, layers, 1.5, 0.5, nm);
    EXPECT_LE(std::norm(at.r_p), 1.0);
    EXPECT_TRUE(std::isfinite(at.absorptance_s));
  }
}

} // namespace
} // namespace lightledger::optics
