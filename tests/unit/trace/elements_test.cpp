#include "support/walk.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <numbers>
#include <string>

namespace lightledger::trace {
namespace {

using support::ray;
using support::Ready;
using support::ready;
using support::Walk;
using support::walk;

constexpr double degree = std::numbers::pi / 180.0;

Ready elements(const std::string& stations) {
  return ready(
      "light: {wavelengths: [500], beam: {radius: 5}}\ncoatings: {half: {ideal: {reflect: 0.5}}}\ntrain:\n" +
      stations + "- {name: end, does: detect}\n");
}

double delivered(const std::string& stations, optics::State state,
                 const std::array<double, 3>& direction = {0, 0, 1}) {
  return walk(elements(stations).train, ray({0, 0, 0}, direction), state).ledger.delivered();
}

/// The Stokes parameters of light behind the last element, for a ray along z.
optics::State behind(const std::string& stations, optics::State state) {
  const Ready r = elements(stations);
  const RayBlock launched = ray({0, 0, 0}, {0, 0, 1});
  const Walk w = walk(r.train, launched, state);
  const std::size_t last = r.assembly->stations.size() - 2;
  const Eigen::Matrix3cd p = support::polarization_matrix(r.train, w, launched, last);
  const optics::Coherency in = optics::coherency(state);
  Eigen::Matrix2cd phi;
  phi << in.xx, in.xy, std::conj(in.xy), in.yy;
  const Eigen::Matrix2cd jones = p.topLeftCorner<2, 2>();
  const Eigen::Matrix2cd out = jones * phi * jones.adjoint();
  const double power = out.trace().real();
  return {(out(0, 0) - out(1, 1)).real() / power, 2.0 * out(0, 1).real() / power,
          -2.0 * out(0, 1).imag() / power};
}

TEST(Polarizer, PassesByTheLawOfMalus) {
  for (const double angle : {0.0, 20.0, 45.0, 71.0, 90.0})
    EXPECT_NEAR(delivered("- {name: p, polarize: {axis: 30}, gap: 1}\n", optics::linear(30.0 + angle)),
                std::pow(std::cos(angle * degree), 2), 1e-15)
        << angle;
}

TEST(Polarizer, AbsorbsWhatItBlocks) {
  const Ready r = elements("- {name: p, polarize: {axis: 0, pass: 0.9, block: 0.02}, gap: 1}\n");
  const Walk w = walk(r.train, ray({0, 0, 0}, {0, 0, 1}));
  EXPECT_NEAR(w.ledger.rows[0].onward, 0.5 * 0.92, 1e-15);
  EXPECT_NEAR(w.ledger.rows[0].absorbed, 0.5 * 1.08, 1e-15);
}

TEST(Polarizer, ProjectsItsAxisAcrossAnObliqueRay) {
  // Along a ray in the x–z plane at 40° an axis at azimuth 45 projects onto (cos 40°, 1)/…, the double-pole
  // x', y.
  const double c = std::cos(40 * degree);
  const double expected = c * c / (1.0 + c * c);
  EXPECT_NEAR(delivered("- {name: p, polarize: {axis: 45}, gap: 1}\n", optics::linear(0),
                        {std::sin(40 * degree), 0, std::cos(40 * degree)}),
              expected, 1e-15);
}

TEST(Retarder, AQuarterWaveWithAxisZeroTurnsLinear45IntoRightHanded) {
  const optics::State out =
      behind("- {name: q, retard: {axis: 0, waves: 0.25}, gap: 1}\n", optics::linear(45));
  EXPECT_NEAR(out.s3, 1.0, 1e-15);
}

TEST(Retarder, AHalfWaveMirrorsTheAzimuthAtItsAxis) {
  const optics::State out =
      behind("- {name: h, retard: {axis: 20, degrees: 180}, gap: 1}\n", optics::linear(5));
  const optics::State expected = optics::linear(35);
  EXPECT_NEAR(out.s1, expected.s1, 1e-15);
  EXPECT_NEAR(out.s2, expected.s2, 1e-15);
}

TEST(Retarder, ItsRetardanceScalesWithTheWavelengthItIsStatedAt) {
  // A quarter wave at 1000 nm is a half wave at 500 nm.
  const optics::State out =
      behind("- {name: q, retard: {axis: 45, waves: 0.25, at: 1000}, gap: 1}\n", {1, 0, 0});
  EXPECT_NEAR(out.s1, -1.0, 1e-15);
}

TEST(Retarder, AbsorbsExactlyNothing) {
  const Ready r = elements("- {name: q, retard: {axis: 17, waves: 0.3}, gap: 1}\n");
  EXPECT_EQ(walk(r.train, ray({0, 0, 0}, {0.2, 0.1, 1})).ledger.rows[0].absorbed, 0.0);
}

TEST(Rotator, TurnsXTowardY) {
  const optics::State out =
      behind("- {name: r, rotate: {angle: 30, kind: active}, gap: 1}\n", optics::linear(10));
  const optics::State expected = optics::linear(40);
  EXPECT_NEAR(out.s1, expected.s1, 1e-15);
  EXPECT_NEAR(out.s2, expected.s2, 1e-15);
}

/// Met from its far side by light on its way back, an element acts on the same field in space.
optics::State back_through(const char* kind, double angle) {
  const Ready r =
      elements("- {name: r, rotate: {angle: " + std::to_string(angle) + ", kind: " + kind + "}, gap: 1}\n");
  const Plan& plan = r.train.plans[0];
  RayBlock block = ray({0, 0, 1}, {0, 0, 1});
  block.d[2][0] = -1.0; // u = x, v = d × u = −y
  const PlanLeg still{LegKind::along_z, false, {{1, 0, 0}, {0, 1, 0}, {0, 0, 1}}, {0, 0, 0}, 0.0, 1.0};
  interact(still, plan.ops[1], optics::Coherency{}, block, {&block, nullptr, nullptr, nullptr, false});
  const double ex = block.J[0][0] * block.u[0][0] +
                    block.J[4][0] * (block.d[1][0] * block.u[2][0] - block.d[2][0] * block.u[1][0]);
  const double ey = block.J[0][0] * block.u[1][0] +
                    block.J[4][0] * (block.d[2][0] * block.u[0][0] - block.d[0][0] * block.u[2][0]);
  return {ex * ex - ey * ey, 2.0 * ex * ey, 0.0};
}

TEST(Rotator, AFaradayRotatorKeepsItsSenseInSpaceOnTheWayBack) {
  EXPECT_NEAR(back_through("faraday", 30).s2, std::sin(60 * degree), 1e-15);
}

TEST(Rotator, AnActiveOneKeepsTheSenseSeenByTheLight) {
  EXPECT_NEAR(back_through("active", 30).s2, -std::sin(60 * degree), 1e-15);
}

TEST(Elements, AllowNoReflection) {
  const Ready r = elements("- {name: p, polarize: {axis: 0}, gap: 1}\n");
  RayBlock pass;
  RayBlock bounce;
  interact(r.train.plans[0].legs[0], r.train.plans[0].ops[0], {}, ray({0, 0, 0}, {0, 0, 1}),
           {&pass, &bounce, nullptr, nullptr, false});
  EXPECT_EQ(bounce.alive, 0U);
}

} // namespace
} // namespace lightledger::trace
