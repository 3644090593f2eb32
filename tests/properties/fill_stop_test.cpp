#include "properties/fast.hpp"
#include "reference/aim.hpp"
#include "reference/train.hpp"

#include <gtest/gtest.h>
#include <rapidcheck/gtest.h>

#include <optional>
#include <stdexcept>

/// Beams that fill the stop, against rays that the textbook tracer aims.
namespace lightledger::properties {
namespace {

using Eigen::Vector2d;
using reference::Dice;
using reference::Train;

void disturb(Train& train, Dice& dice) {
  if (dice.chance(0.5))
    train.tilt(dice.around_zero(3.0), dice.around_zero(3.0), dice.around_zero(90.0));
  if (dice.chance(0.5))
    train.surface().shift = {dice.around_zero(0.5), dice.around_zero(0.5)};
}

void lens(Train& train, assembly::MediumId glass, Dice& dice) {
  const double radius = dice.one_of({-1.0, 1.0}) * dice.between(80.0, 250.0);
  train.refract(assembly::Sphere{radius}, glass, dice.between(2.0, 5.0));
  disturb(train, dice);
  train.refract(assembly::Conic{-radius * dice.between(0.8, 3.0), dice.around_zero(1.0)}, 0,
                dice.between(3.0, 8.0));
  disturb(train, dice);
}

assembly::Clear outline(Dice& dice) {
  assembly::Clear clear;
  const double size = dice.between(1.0, 3.0);
  clear.opening = assembly::Clear::Disc{size};
  if (dice.chance(0.3))
    clear.opening = assembly::Clear::Rectangle{size, 0.8 * size};
  if (dice.chance(0.3))
    clear.opening = assembly::Clear::Ellipse{0.7 * size, size};
  if (dice.chance(0.3))
    clear.at = {dice.around_zero(0.5), dice.around_zero(0.5)};
  return clear;
}

/// Lenses and folds in front of a stop, small apertures among them, and a lens behind it.
assembly::Assembly camera(Dice& dice) {
  Train train;
  const auto glass = train.medium(dice.between(1.45, 1.8));
  const auto metal = train.medium(1.0, 6.0);
  for (int lenses = dice.whole(1, 2); lenses > 0; --lenses) {
    lens(train, glass, dice);
    train.surface().clear.opening = assembly::Clear::Disc{dice.between(1.0, 6.0)};
    if (dice.chance(0.3))
      train.reflect(assembly::Plane{}, metal, 8.0)
          .tilt(dice.between(30.0, 50.0), dice.around_zero(10.0), 0.0);
  }
  train.stop(3.0);
  disturb(train, dice);
  train.surface().clear = outline(dice);
  lens(train, glass, dice);
  train.detect();
  assembly::Light& light = train.assembly.light;
  light.beam.fill_stop = true;
  light.sampling = assembly::Rings{2, 6};
  if (dice.chance(0.4))
    light.object_distance = dice.between(100.0, 400.0);
  light.fields = {{{dice.around_zero(5.0), dice.around_zero(5.0)}, 1.0, {}}, {{0.0, 0.0}, 0.5, {}}};
  return train.assembly;
}

std::size_t stop_of(const assembly::Assembly& assembly) {
  std::size_t i = 0;
  while (!std::holds_alternative<assembly::Opening>(assembly.surfaces[assembly.stations[i].surface].effect))
    ++i;
  return i;
}

struct HalfLengths {
  Vector2d operator()(const assembly::Clear::Disc& disc) const { return {disc.radius, disc.radius}; }
  Vector2d operator()(const assembly::Clear::Rectangle& r) const { return {r.half_width, r.half_height}; }
  Vector2d operator()(const assembly::Clear::Ellipse& ellipse) const {
    return {ellipse.semi_x, ellipse.semi_y};
  }
  Vector2d operator()(const assembly::Clear::Unlimited&) const { return {0.0, 0.0}; }
};

Vector2d vector(const std::array<double, 2>& pair) {
  return {pair[0], pair[1]};
}

/// The launch ellipse of a field from four rays that the textbook tracer aims, starting at the edge of
/// another.
std::optional<trace::Footprint> textbook_footprint(const Both& both, const assembly::Field& field,
                                                   const trace::Footprint& guess) {
  const assembly::Assembly opened = reference::opened(*both.assembly);
  const std::size_t stop = stop_of(opened);
  const assembly::Clear& clear = both.assembly->surfaces[both.assembly->stations[stop].surface].clear;
  const Vector2d half = std::visit(HalfLengths{}, clear.opening);
  const auto launch = [&](double x, double y) {
    const reference::Aim aim{stop, {clear.at[0] + x * half.x(), clear.at[1] + y * half.y()}};
    return reference::launch_point(opened, both.bench, field, aim,
                                   vector(guess.centre) + x * vector(guess.first) + y * vector(guess.second));
  };
  const auto right = launch(1.0, 0.0);
  const auto left = launch(-1.0, 0.0);
  const auto up = launch(0.0, 1.0);
  const auto down = launch(0.0, -1.0);
  if (!right || !left || !up || !down)
    return std::nullopt;
  const Vector2d centre = (*right + *left + *up + *down) / 4.0;
  const Vector2d first = (*right - *left) / 2.0;
  const Vector2d second = (*up - *down) / 2.0;
  return trace::Footprint{{centre.x(), centre.y()}, {first.x(), first.y()}, {second.x(), second.y()}};
}

/// A random camera made ready; none where a lens is too small or too steep for any ray to come to the edge of
/// the stop.
std::optional<Both> reachable_camera(std::uint64_t seed) {
  Dice dice(seed);
  try {
    return prepare(camera(dice));
  } catch (const std::runtime_error&) {
    return std::nullopt;
  }
}

TEST(FillStop, ReachesTheStopOfNearlyAllCameras) {
  int reached = 0;
  for (std::uint64_t seed = 0; seed < 400; ++seed)
    reached += reachable_camera(seed) ? 1 : 0;
  EXPECT_GE(reached, 398);
}

RC_GTEST_PROP(FillStop, AimsAtTheEdgeOfTheStopAsTheTextbookDoes, ()) {
  const auto both = reachable_camera(reference::any_seed());
  RC_PRE(both.has_value());
  for (std::size_t i = 0; i < both->assembly->light.fields.size(); ++i) {
    const trace::Footprint& found = both->train.footprints.at(i);
    const auto expected = textbook_footprint(*both, both->assembly->light.fields[i], found);
    RC_ASSERT(expected.has_value());
    RC_ASSERT((vector(found.centre) - vector(expected->centre)).norm() < 1e-9);
    RC_ASSERT((vector(found.first) - vector(expected->first)).norm() < 1e-9);
    RC_ASSERT((vector(found.second) - vector(expected->second)).norm() < 1e-9);
  }
}

RC_GTEST_PROP(FillStop, LaunchesTheDiscOntoTheEllipse, ()) {
  const auto both = reachable_camera(reference::any_seed());
  RC_PRE(both.has_value());
  const Textbook expected = textbook(*both);
  RC_PRE(expected.left_out == 0);
  const double delivered = trace::trace(both->train, {.threads = 1}).total.delivered();
  RC_ASSERT(std::abs(delivered - expected.ledger.delivered) < 1e-11);
}

} // namespace
} // namespace lightledger::properties
