#include "support/walk.hpp"

#include <lightledger/optics/boundary.hpp>
#include <lightledger/trace/routes.hpp>

#include <gtest/gtest.h>

#include <cmath>
#include <numbers>
#include <string>

/// Light on its way through the plate of a splitter.
namespace lightledger::trace {
namespace {

using support::meetings;
using support::ray;
using support::Ready;
using support::ready;

constexpr double index_of_glass = 1.5;
constexpr double thickness = 3.0;

/// A stop, a splitter at 45 degrees and a detector; `plate` are the splitter's keys but name, tilt, backing.
std::string train(const std::string& plate, const std::string& tilt = "[45, 0, 0]",
                  const std::string& last = "{name: end, does: detect}") {
  return "light: {wavelengths: [500], beam: {radius: 5}}\n"
         "media: {glass: {index: 1.5}}\n"
         "coatings: {half: {ideal: {reflect: 0.4, transmit: 0.5}}, back: {ideal: {reflect: 0.02}}}\n"
         "train:\n"
         "- {name: entry, does: stop, gap: 10}\n"
         "- {name: splitter, does: reflect, tilt: " +
         tilt + ", backing: glass, " + plate +
         ", gap: 20}\n"
         "- " +
         last + '\n';
}

const std::string coated = "coating: half, rear: {thickness: 3, coating: back}";

class PlateRoutes : public testing::TestWithParam<Heading> {
protected:
  static constexpr StationId entry = 0, splitter = 1, end = 2;

  [[nodiscard]] State at(Face face) const { return {splitter, GetParam(), face}; }
  [[nodiscard]] State behind() const {
    return {GetParam() == Heading::along ? end : entry, GetParam(), Face::front};
  }
  [[nodiscard]] Onward next(Face face, Act act) const {
    return std::get<Onward>(m_routes.next(at(face), act));
  }
  void expect_leg(const Onward& onward, assembly::SurfaceId from, assembly::SurfaceId to) const {
    EXPECT_EQ(m_routes.legs()[onward.leg].from, from);
    EXPECT_EQ(m_routes.legs()[onward.leg].to, to);
  }

  Ready m_ready = ready(train(coated));
  const Routes& m_routes = m_ready.train.routes;
  const assembly::SurfaceId m_front = m_ready.assembly->stations[splitter].surface;
  const assembly::SurfaceId m_rear = m_ready.assembly->surfaces[m_front].rear.value().surface;
};

TEST_P(PlateRoutes, LightThatPassesTheFrontGoesToTheRear) {
  const Onward onward = next(Face::front, Act::pass);
  EXPECT_EQ(onward.state, at(Face::rear));
  expect_leg(onward, m_front, m_rear);
}

TEST_P(PlateRoutes, LightThatTheRearReflectsComesToTheFrontFromInside) {
  const Onward onward = next(Face::rear, Act::bounce);
  EXPECT_EQ(onward.state, at(Face::inside));
  expect_leg(onward, m_rear, m_front);
}

TEST_P(PlateRoutes, LightThatPassesTheFrontFromInsideJoinsWhatTheFrontReflects) {
  const Onward out = next(Face::inside, Act::pass);
  const Onward reflected = next(Face::front, Act::bounce);
  EXPECT_EQ(out.state, behind());
  EXPECT_EQ(out.state, reflected.state);
  EXPECT_EQ(out.leg, reflected.leg);
}

TEST_P(PlateRoutes, LightThatTheFrontReflectsInsideGoesToTheRearAgain) {
  EXPECT_EQ(next(Face::inside, Act::bounce).state, at(Face::rear));
}

TEST_P(PlateRoutes, LightThatPassesTheRearLeaks) {
  EXPECT_EQ(std::get<End>(m_routes.next(at(Face::rear), Act::pass)), End::leaked);
}

TEST_P(PlateRoutes, TheFacesAreMetFromTheirOwnSides) {
  const assembly::Assembly& assembly = *m_ready.assembly;
  EXPECT_EQ(m_routes.op(assembly, at(Face::front)), 2 * m_front);
  EXPECT_EQ(m_routes.op(assembly, at(Face::rear)), 2 * m_rear);
  EXPECT_EQ(m_routes.op(assembly, at(Face::inside)), 2 * m_front + 1);
}

TEST_P(PlateRoutes, InsideThePlateEveryReflectionIsABounce) {
  const assembly::Assembly& assembly = *m_ready.assembly;
  EXPECT_FALSE(Routes::bounces(assembly, at(Face::front)));
  EXPECT_TRUE(Routes::bounces(assembly, at(Face::rear)));
  EXPECT_TRUE(Routes::bounces(assembly, at(Face::inside)));
}

TEST_P(PlateRoutes, BouncesAreCalledByTheStationAndTheFace) {
  const assembly::Assembly& assembly = *m_ready.assembly;
  EXPECT_EQ(Routes::bounce_name(assembly, at(Face::rear)), "splitter rear");
  EXPECT_EQ(Routes::bounce_name(assembly, at(Face::inside)), "splitter");
}

TEST_P(PlateRoutes, TheLegsInsideRunInTheGlass) {
  for (const Onward& inside : {next(Face::front, Act::pass), next(Face::rear, Act::bounce)})
    EXPECT_EQ(m_ready.assembly->media[m_routes.legs()[inside.leg].medium].name, "glass");
}

INSTANTIATE_TEST_SUITE_P(BothWays, PlateRoutes, testing::Values(Heading::along, Heading::against),
                         [](const auto& each) { return each.param == Heading::along ? "Along" : "Against"; });

/// Where a ray ends, and with what power, that acts as told.
struct Arrival {
  RayBlock block;
  double power;
};

Arrival arrival(const Ready& r, const std::vector<Act>& acts, optics::State state = {}) {
  Arrival result{ray({0, 0, 0}, {0, 0, 1}), 0.0};
  support::follow(meetings(r.train, acts), r.train.plans[0], optics::coherency(state), result.block,
                  [&](const Path::Step&, const Entry& entry, const Tape&) { result.power = entry.onward; });
  return result;
}

/// From the stop through the plate to the detector, with so many reflections at the rear face.
std::vector<Act> order(int reflections) {
  std::vector<Act> acts{Act::pass, Act::pass};
  for (int i = 0; i < reflections; ++i) {
    if (i > 0)
      acts.push_back(Act::bounce);
    acts.push_back(Act::bounce);
  }
  acts.insert(acts.end(), {Act::pass, Act::detect});
  return acts;
}

const std::vector<Act> direct{Act::pass, Act::bounce, Act::detect};

TEST(Plate, OrdersHaveThePowersOfTheirCoatings) {
  const Ready r = ready(train(coated));
  EXPECT_NEAR(arrival(r, direct).power, 0.4, 1e-15);
  for (int m = 1; m <= 4; ++m)
    EXPECT_NEAR(arrival(r, order(m)).power, 0.5 * 0.5 * std::pow(0.02, m) * std::pow(0.4, m - 1), 1e-16) << m;
}

TEST(Plate, BareOrdersHaveThePowersOfFresnel) {
  const Ready r = ready(train("rear: {thickness: 3}"));
  // From Fresnel's equations at 45 degrees in the angle of incidence alone: with n = 1.5 and
  // q = √(n² − ½), r_s = (√½ − q)/(√½ + q) and r_p = (n²√½ − q)/(n²√½ + q); from inside the same R.
  const double c = std::sqrt(0.5);
  const double q = std::sqrt(index_of_glass * index_of_glass - 0.5);
  const double n2 = index_of_glass * index_of_glass;
  const double R_s = std::pow((c - q) / (c + q), 2);
  const double R_p = std::pow((n2 * c - q) / (n2 * c + q), 2);
  for (int m = 1; m <= 3; ++m) {
    const auto power = [m](double R) { return (1.0 - R) * (1.0 - R) * std::pow(R, 2 * m - 1); };
    // The plane of incidence is that of y and z: x is s.
    EXPECT_NEAR(arrival(r, order(m), optics::linear(0)).power, power(R_s), 1e-15) << m;
    EXPECT_NEAR(arrival(r, order(m), optics::linear(90)).power, power(R_p), 1e-15) << m;
  }
}

TEST(Plate, OrdersStandBesideEachOther) {
  const Ready r = ready(train(coated));
  const double inside = std::asin(std::sin(std::numbers::pi / 4.0) / index_of_glass);
  const double step = 2.0 * thickness * std::tan(inside) * std::cos(std::numbers::pi / 4.0);
  const Arrival first = arrival(r, direct);
  EXPECT_NEAR(first.block.p[1][0], 0.0, 1e-14);
  // The front is tilted about x: the beam inside runs on along z, which the detector's y is opposed to.
  for (int m = 1; m <= 3; ++m) {
    const Arrival later = arrival(r, order(m));
    EXPECT_NEAR(later.block.p[0][0], 0.0, 1e-14);
    EXPECT_NEAR(std::abs(later.block.p[1][0]), m * step, 1e-13) << m;
    EXPECT_NEAR(later.block.d[2][0], 1.0, 1e-15);
  }
}

TEST(Plate, OrdersAreDelayedByTwiceTheOpticalThickness) {
  const Ready r = ready(train(coated));
  const double cosine = std::sqrt(1.0 - 0.5 / (index_of_glass * index_of_glass));
  for (int m = 1; m <= 3; ++m)
    EXPECT_NEAR(arrival(r, order(m)).block.opl[0] - arrival(r, direct).block.opl[0],
                m * 2.0 * index_of_glass * thickness * cosine, 1e-12)
        << m;
}

TEST(Plate, AWedgeTurnsTheLightOfTheRearByTwiceItselfInTheGlass) {
  const Ready r = ready(train("coating: half, rear: {thickness: 3, wedge: [2, 0]}", "[0, 0, 0]"));
  const Arrival back = arrival(r, order(1));
  const double out = std::asin(index_of_glass * std::sin(4.0 * std::numbers::pi / 180.0));
  EXPECT_NEAR(std::abs(back.block.d[1][0]), std::sin(out), 1e-14);
  EXPECT_NEAR(back.block.d[0][0], 0.0, 1e-15);
}

TEST(Plate, ReflectsInsideOnTheWayBackToo) {
  const Ready r = ready(train(coated, "[45, 0, 0]",
                              "{name: pane, into: glass, coating: half, gap: 1}\n"
                              "- {name: end, does: detect}"));
  // To the pane, back from it, through the plate and past the stop to where the light came from.
  const Arrival back =
      arrival(r, {Act::pass, Act::bounce, Act::bounce, Act::pass, Act::bounce, Act::pass, Act::pass});
  EXPECT_NEAR(back.power, 0.4 * 0.4 * 0.5 * 0.02 * 0.5, 1e-16);
}

TEST(Plate, ChangesNothingInABudget) {
  const Ready with = ready(train(coated));
  const Ready without = ready(train("coating: half"));
  const support::Walk one = support::walk(with.train, ray({0, 0, 0}, {0, 0, 1}));
  const support::Walk other = support::walk(without.train, ray({0, 0, 0}, {0, 0, 1}));
  for (std::size_t i = 0; i < 3; ++i) {
    EXPECT_EQ(one.ledger.rows[i].onward, other.ledger.rows[i].onward);
    EXPECT_EQ(one.ledger.rows[i].aside, other.ledger.rows[i].aside);
  }
  EXPECT_NEAR(one.ledger.rows[1].aside, 0.5, 1e-15);
}

} // namespace
} // namespace lightledger::trace
