#include "support/walk.hpp"

#include <lightledger/trace/bench.hpp>

#include <gtest/gtest.h>

#include <cmath>
#include <numbers>
#include <string>

namespace lightledger::trace {
namespace {

using assembly::Side;
using support::ray;
using support::Ready;
using support::ready;
using support::walk;

const std::string head = "light: {wavelengths: [500], beam: {radius: 5}}\n"
                         "media: {glass: {index: 1.5}}\n"
                         "coatings: {mirror: {ideal: {reflect: 0.9}}}\ntrain:\n";

/// A Mangin mirror: in through the front, back from the silvered rear, out through the front again.
const std::string mangin = head + "- {name: front, radius: -80, into: glass, gap: 6}\n"
                                  "- {name: rear, does: reflect, radius: -120, coating: mirror}\n"
                                  "- {again: front, into: air, gap: focus}\n"
                                  "- {name: image, does: detect}\n";

TEST(Again, TheAxisMeetsTheSurfaceWhereItStands) {
  const Ready r = ready(mangin);
  EXPECT_NEAR(r.train.bench.gap[1], 6.0, 1e-14);
  EXPECT_EQ(r.train.bench.from[0], Side::before);
  EXPECT_EQ(r.train.bench.from[2], Side::beyond);
}

TEST(Again, AManginMirrorFocusesWhereItsUnfoldedLensDoes) {
  // Unfolded: refraction into glass, the mirror as a power −2n/R, refraction out through the same face met
  // from behind, whose curvature has then changed sign.
  const double n = 1.5;
  double y = 1.0;
  double w = -y * (n - 1.0) / -80.0;
  y += 6.0 * w / n;
  w -= y * (-2.0 * n / -120.0);
  y += 6.0 * w / n;
  w -= y * (1.0 - n) / 80.0;
  const Ready r = ready(mangin);
  EXPECT_NEAR(r.train.bench.gap[2], -y / w, 1e-10);
}

TEST(Again, ARayComesBackThroughTheSameFace) {
  const Ready r = ready(mangin);
  const support::Walk w = walk(r.train, ray({0, 2, -10}, {0, 0, 1}));
  ASSERT_EQ(w.tapes.size(), 4U);
  const auto hit = w.hit(2);
  const double sag =
      (hit[0] * hit[0] + hit[1] * hit[1]) / (-80.0 * (1.0 + std::sqrt(1.0 - hit[1] * hit[1] / 6400.0)));
  EXPECT_NEAR(hit[2], sag, 1e-14);
  EXPECT_NEAR(w.hit(3)[1], 0.0, 0.01);
}

TEST(Again, GivesTheBudgetOfTheSameTrainWrittenOut) {
  // A plane plate silvered behind, and the same light through two plates.
  const Ready folded = ready(head + "- {name: front, into: glass, gap: 4}\n"
                                    "- {name: rear, does: reflect, coating: mirror}\n"
                                    "- {again: front, into: air, gap: 10}\n"
                                    "- {name: end, does: detect}\n");
  const Ready straight = ready(head + "- {name: front, into: glass, gap: 4}\n"
                                      "- {name: rear, does: reflect, coating: mirror, gap: 4}\n"
                                      "- {name: out, into: air, gap: 10}\n"
                                      "- {name: end, does: detect}\n");
  const RayBlock launched = ray({0, 0, 0}, {0.3, 0.1, 1});
  const auto a = walk(folded.train, launched);
  const auto b = walk(straight.train, launched);
  for (std::size_t i = 0; i < 4; ++i)
    EXPECT_NEAR(a.ledger.rows[i].onward, b.ledger.rows[i].onward, 1e-15) << i;
  EXPECT_NEAR(a.behind[3].opl[0], b.behind[3].opl[0], 1e-13);
}

/// What passes an analyzer along x after linear light along x went through a rotator to a mirror and back.
double passed_after_two_turns(const std::string& kind) {
  const Ready r = ready(head + "- {name: rotator, rotate: {angle: 45, kind: " + kind + "}, gap: 5}\n" +
                        "- {name: turn, does: reflect, coating: mirror}\n"
                        "- {again: rotator, gap: 3}\n"
                        "- {name: analyzer, polarize: {axis: 0}, gap: 1}\n"
                        "- {name: end, does: detect}\n");
  return walk(r.train, ray({0, 0, 0}, {0, 0, 1}), optics::linear(0)).ledger.delivered();
}

TEST(Again, AFaradayRotatorTurnsTwiceAsFarOnADoublePass) {
  EXPECT_NEAR(passed_after_two_turns("faraday"), 0.0, 1e-15);
}

TEST(Again, AnActiveRotatorUndoesItselfOnADoublePass) {
  EXPECT_NEAR(passed_after_two_turns("active"), 0.9, 1e-15);
}

TEST(Again, LightReflectedAtTheFrontJoinsTheLegThatLeavesTheSameSide) {
  const Ready r = ready(mangin);
  const Hop hop = r.train.routes.next({0, Heading::along}, Act::bounce);
  const auto* onward = std::get_if<Onward>(&hop);
  ASSERT_NE(onward, nullptr);
  EXPECT_EQ(onward->state.visit, 3U);
  EXPECT_EQ(onward->state.heading, Heading::along);
}

TEST(Again, LightReflectedInsideGoesRoundAgain) {
  const Ready r = ready(mangin);
  const Hop hop = r.train.routes.next({2, Heading::along}, Act::bounce);
  const auto* onward = std::get_if<Onward>(&hop);
  ASSERT_NE(onward, nullptr);
  EXPECT_EQ(onward->state.visit, 1U);
}

TEST(Again, AnAxisThatDoesNotComeBackIsAFault) {
  const assembly::Assembly assembly = support::loaded(head + "- {name: front, into: glass, gap: 4}\n"
                                                             "- {name: rear, into: air}\n"
                                                             "- {again: front, into: glass, gap: 10}\n"
                                                             "- {name: end, does: detect}\n");
  assembly::Faults faults;
  EXPECT_FALSE(lay_out(assembly, faults));
  ASSERT_EQ(faults.count(), 1U);
  EXPECT_NE(faults.kept()[0].message.find("runs away"), std::string::npos) << faults.kept()[0].message;
}

} // namespace
} // namespace lightledger::trace
