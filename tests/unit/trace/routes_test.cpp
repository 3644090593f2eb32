#include "support/walk.hpp"

#include <lightledger/trace/routes.hpp>

#include <gtest/gtest.h>

namespace lightledger::trace {
namespace {

/// A lens face, a stop, a mirror and a detector that reflects.
class RoutesTest : public testing::Test {
protected:
  support::Ready m_ready =
      support::ready("light: {wavelengths: [550], beam: {radius: 5}}\n"
                     "train:\n"
                     "- {name: face, into: fused-silica, gap: 5}\n"
                     "- {name: iris, does: stop, clear: {diameter: 8}, gap: 5}\n"
                     "- {name: mirror, does: reflect, tilt: [45, 0, 0], backing: Al, gap: 5}\n"
                     "- {name: end, does: detect, reflectance: 0.1}\n");
  const Routes& m_routes = m_ready.train.routes;

  void expect_onward(const Hop& hop, StationId from, StationId to, Heading heading) {
    const auto* onward = std::get_if<Onward>(&hop);
    ASSERT_NE(onward, nullptr);
    EXPECT_EQ(onward->state.visit, to);
    EXPECT_EQ(onward->state.heading, heading);
    EXPECT_EQ(m_routes.legs()[onward->leg].from, from);
    EXPECT_EQ(m_routes.legs()[onward->leg].to, to);
  }
};

TEST_F(RoutesTest, LightThatPassesALensGoesToTheNextVisit) {
  expect_onward(m_routes.next({0, Heading::along}, Act::pass), 0, 1, Heading::along);
}

TEST_F(RoutesTest, LightThatBouncesAtTheFirstFaceReturns) {
  EXPECT_EQ(std::get<End>(m_routes.next({0, Heading::along}, Act::bounce)), End::returned);
}

TEST_F(RoutesTest, AMirrorActsAsIntendedInBothDirections) {
  expect_onward(m_routes.next({2, Heading::along}, Act::bounce), 2, 3, Heading::along);
  expect_onward(m_routes.next({2, Heading::against}, Act::bounce), 2, 1, Heading::against);
}

TEST_F(RoutesTest, LightThatPassesAMirrorLeaks) {
  EXPECT_EQ(std::get<End>(m_routes.next({2, Heading::along}, Act::pass)), End::leaked);
}

TEST_F(RoutesTest, AStopPassesBothWaysAndReflectsNothing) {
  expect_onward(m_routes.next({1, Heading::against}, Act::pass), 1, 0, Heading::against);
  EXPECT_EQ(std::get<End>(m_routes.next({1, Heading::along}, Act::bounce)), End::absorbed);
}

TEST_F(RoutesTest, LightThatMeetsALensFromBehindGoesBackOrIsTurnedRound) {
  EXPECT_EQ(std::get<End>(m_routes.next({0, Heading::against}, Act::pass)), End::returned);
  expect_onward(m_routes.next({0, Heading::against}, Act::bounce), 0, 1, Heading::along);
}

TEST_F(RoutesTest, TheDetectorDetectsOrSendsBack) {
  EXPECT_EQ(std::get<End>(m_routes.next({3, Heading::along}, Act::detect)), End::detected);
  expect_onward(m_routes.next({3, Heading::along}, Act::bounce), 3, 2, Heading::against);
}

TEST_F(RoutesTest, LegsRunInTheMediumBehindTheirStation) {
  const auto& media = m_ready.assembly->media;
  EXPECT_EQ(media[m_routes.legs()[Routes::launch_leg].medium].name, "air");
  EXPECT_EQ(media[m_routes.legs()[1].medium].name, "fused-silica");
  EXPECT_EQ(media[m_routes.legs()[3].medium].name, "fused-silica");
}

TEST_F(RoutesTest, TheIntendedPathVisitsEveryStationOnceAndIsDetected) {
  const Path path = intended_path(*m_ready.assembly, m_routes);
  ASSERT_EQ(path.steps.size(), 4U);
  for (StationId visit = 0; visit < 4; ++visit)
    EXPECT_EQ(path.steps[visit].visit, visit);
  EXPECT_EQ(path.end, End::detected);
}

} // namespace
} // namespace lightledger::trace
