#include "properties/fast.hpp"
#include "support/walk.hpp"

#include <gtest/gtest.h>
#include <rapidcheck/gtest.h>

#include <algorithm>
#include <cmath>
#include <limits>

/// Light that leaves the intended path, in the program's tracer and in the textbook one.
namespace lightledger::properties {
namespace {

using reference::Encounter;
using reference::RayRecord;
using trace::Act;
using trace::Face;

constexpr double agreement = 1e-11;

/// A way through a train from the launch on: what the route table says of it, and its meetings on the bench.
struct Way {
  std::vector<trace::Path::Step> steps;
  std::vector<Encounter> encounters;
  int in_plates = 0; ///< meetings inside of plates
};

/// What light may do at a meeting so that there is more to follow; at an interface either, now and then what
/// is not intended.
Act choose(const assembly::Assembly& assembly, trace::State state, reference::Dice& dice) {
  const assembly::Station& station = assembly.stations[state.visit];
  const assembly::Surface& surface = assembly.surfaces[station.surface];
  if (state.face != Face::front)
    return dice.chance(0.6) == (state.face == Face::rear) ? Act::bounce : Act::pass;
  if (surface.rear)
    return dice.chance(0.6) ? Act::pass : Act::bounce;
  const bool may_bounce =
      station.intended == Act::pass && std::holds_alternative<assembly::Interface>(surface.effect);
  return may_bounce && dice.chance(0.15) ? Act::bounce : station.intended;
}

/// The frame of a meeting's surface, by the textbook's layout.
reference::Frame frame(const Both& both, trace::State state) {
  const reference::Place& place = both.bench.stations[state.visit];
  return state.face == Face::rear ? place.rear : place.surface;
}

Way random_way(const Both& both, reference::Dice& dice) {
  constexpr std::size_t most = 40;
  const trace::Routes& routes = both.train.routes;
  Way way;
  trace::Hop hop = trace::Onward{routes.start(), trace::Routes::launch_leg};
  while (const auto* onward = std::get_if<trace::Onward>(&hop)) {
    const auto [state, leg] = *onward;
    const Act act = choose(*both.assembly, state, dice);
    const trace::OpId op = routes.op(*both.assembly, state);
    way.steps.push_back({leg, op, state.visit, act});
    way.encounters.push_back(
        {op / 2, frame(both, state), op % 2 == 0 ? assembly::Side::before : assembly::Side::beyond, act});
    way.in_plates += state.face == Face::front ? 0 : 1;
    if (way.steps.size() == most)
      break;
    hop = routes.next(state, act);
  }
  return way;
}

/// How far the tracers are apart at the worst of a way's meetings, in units of the agreement.
double disagreement(const Both& both, const Way& way, const reference::Ray& ray, const RayRecord& record) {
  double worst = 0.0;
  std::size_t i = 0;
  trace::RayBlock block = block_of({ray});
  support::follow(way.steps, both.train.plans.front(), optics::coherency(both.assembly->light.polarization),
                  block, [&](const trace::Path::Step&, const trace::Entry& found, const trace::Tape&) {
                    const reference::Step& expected = record.steps.at(i++);
                    for (const double difference :
                         {found.incident - expected.incident, found.onward - expected.onward,
                          found.aside - expected.aside, found.absorbed - expected.absorbed,
                          found.missed - expected.missed, found.clipped - expected.clipped,
                          found.scattered - expected.scattered, found.extra - expected.extra})
                      worst = std::max(worst, std::abs(difference) / agreement);
                    if (block.alive == 0)
                      return;
                    const double size = std::max({10.0, std::abs(expected.optical_path),
                                                  expected.local_point.norm() / expected.cos_incidence});
                    const double path = block.opl[0] - expected.optical_path;
                    worst = std::max(worst, std::abs(path) / (agreement * size));
                  });
  return i == record.steps.size() ? worst : std::numeric_limits<double>::infinity();
}

RC_GTEST_PROP(Kernel, AgreesWithTheTextbookOnAnyWayThroughTheTrain, ()) {
  const std::uint64_t seed = reference::any_seed();
  const Both both = prepare(reference::random_assembly(seed));
  reference::Dice dice(seed + 1);
  const double wavelength = both.assembly->light.wavelengths.front().nm;
  for (const reference::Ray& ray : reference::random_rays(both.assembly->light, dice, 12)) {
    const Way way = random_way(both, dice);
    const RayRecord record = reference::follow(way.encounters, *both.assembly, wavelength, ray);
    if (record.comparable())
      RC_ASSERT(disagreement(both, way, ray, record) < 1.0);
  }
}

TEST(Kernel, IsComparedInsideOfPlatesOften) {
  int inside = 0;
  for (std::uint64_t seed = 0; seed < 100; ++seed) {
    const Both both = prepare(reference::random_assembly(seed));
    reference::Dice dice(seed + 1);
    for (const reference::Ray& ray : reference::random_rays(both.assembly->light, dice, 4)) {
      const Way way = random_way(both, dice);
      const double wavelength = both.assembly->light.wavelengths.front().nm;
      const RayRecord record = reference::follow(way.encounters, *both.assembly, wavelength, ray);
      const bool whole = record.comparable() && record.steps.size() == way.steps.size();
      inside += whole ? way.in_plates : 0;
    }
  }
  EXPECT_GT(inside, 50);
}

RC_GTEST_PROP(Layout, PutsRearFacesWhereTheTextbookDoes, ()) {
  const Both both = prepare(reference::random_assembly(reference::any_seed()));
  for (std::size_t i = 0; i < both.assembly->stations.size(); ++i) {
    const auto& rear = both.assembly->surfaces[both.assembly->stations[i].surface].rear;
    if (!rear)
      continue;
    const trace::Frame& found = both.train.bench.surface[rear->surface];
    RC_ASSERT((found.origin - both.bench.stations[i].rear.origin).norm() < 1e-11);
    RC_ASSERT((found.axes - both.bench.stations[i].rear.axes).norm() < 1e-13);
  }
}

} // namespace
} // namespace lightledger::properties
