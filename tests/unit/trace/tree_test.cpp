#include "support/walk.hpp"

#include <lightledger/trace/path_tree.hpp>
#include <lightledger/trace/tree.hpp>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <cmath>
#include <string>

namespace lightledger::trace {
namespace {

using testing::ElementsAre;

const std::string light = "light: {wavelengths: [550], beam: {radius: 1}, rays: {pattern: rings, rings: 3, "
                          "spokes: 8}}\nmedia: {glass: {index: 1.5}}\n";

struct Followed {
  support::Ready made;
  PathTree tree;
  TreeFound found;

  explicit Followed(const std::string& text, int bounces = 2, double floor = 0.0)
      : made(support::ready(text)), tree(*made.assembly, made.train.routes, bounces),
        found(trace_tree(made.train, tree, {.floor = floor, .threads = 1}).total) {}

  [[nodiscard]] std::vector<std::string> names(PathTree::PathNumber number) const {
    return bounce_names(*made.assembly, tree.way(number));
  }
  [[nodiscard]] double power(const std::vector<std::string>& bounces) const {
    for (const PathTable::Row& row : found.paths.rows())
      if (names(row.number) == bounces)
        return row.sums.power;
    return 0.0;
  }
  [[nodiscard]] double returned(const std::vector<std::string>& bounces) const {
    for (const PathTable::Row& row : found.returned.rows())
      if (names(row.number) == bounces)
        return row.sums.power;
    return 0.0;
  }
  [[nodiscard]] double closure_error() const { return 1.0 - found.detector() - found.ledger.sum(); }
};

const std::string plate = light + "train:\n- {name: front, into: glass, gap: 5}\n"
                                  "- {name: rear, into: air, gap: 5}\n";

TEST(Tree, EveryOrderOfAPlateIsItsClosedForm) {
  const Followed plate_(plate + "- {name: end, does: detect}\n", 4);
  constexpr double r = 0.04;
  const double direct = (1.0 - r) * (1.0 - r);
  EXPECT_NEAR(plate_.found.image.power, direct, 1e-14);
  EXPECT_NEAR(plate_.power({"rear", "front"}), direct * r * r, 1e-9 * direct * r * r);
  EXPECT_NEAR(plate_.power({"rear", "front", "rear", "front"}), direct * r * r * r * r,
              1e-9 * direct * r * r * r * r);
  EXPECT_NEAR(plate_.returned({"front"}), r, 1e-14);
  EXPECT_NEAR(plate_.returned({"rear"}), direct * r, 1e-14);
  EXPECT_NEAR(plate_.returned({"rear", "front", "rear"}), direct * r * r * r, 1e-14);
  EXPECT_NEAR(plate_.closure_error(), 0.0, 1e-14);
}

TEST(Tree, WhatIsNotFollowedHoldsTheRestOfTheSeries) {
  const Followed plate_(plate + "- {name: end, does: detect}\n", 4);
  constexpr double r = 0.04;
  const double all = (1.0 - r) / (1.0 + r);
  const double found = plate_.found.image.power + plate_.found.ghosts;
  EXPECT_LT(found, all);
  EXPECT_LE(all, found + plate_.found.ledger.not_followed);
}

TEST(Tree, ADetectorThatReflectsSendsItsShareBackToEveryFace) {
  const Followed plate_(plate + "- {name: end, does: detect, reflectance: 0.5}\n");
  constexpr double r = 0.04;
  const double direct = (1.0 - r) * (1.0 - r);
  EXPECT_EQ(plate_.tree.detected(), 4U);
  EXPECT_NEAR(plate_.power({"end", "rear"}), direct * 0.5 * r, 1e-15);
  EXPECT_NEAR(plate_.power({"end", "front"}), direct * 0.5 * (1.0 - r) * (1.0 - r) * r, 1e-15);
  EXPECT_NEAR(plate_.returned({"end"}), direct * 0.5 * direct, 1e-15);
  EXPECT_NEAR(plate_.found.detector(), 0.5 * (direct + plate_.found.ghosts), 1e-15);
  EXPECT_NEAR(plate_.closure_error(), 0.0, 1e-14);
}

/// Direct (1−R)² R_m; the front reflects R straight to the detector, and what comes back from inside once
/// more to the mirror.
TEST(Tree, ASecondSurfaceMirrorHasGhostsOfOneBounce) {
  constexpr double r = 0.05;
  constexpr double mirror = 0.9;
  const Followed mirror_(light +
                         "coatings: {face: {ideal: {reflect: 0.05}}, silver: {ideal: {reflect: 0.9}}}\n"
                         "train:\n- {name: front, into: glass, coating: face, gap: 6}\n"
                         "- {name: rear, does: reflect, coating: silver}\n"
                         "- {again: front, into: air, gap: 20}\n"
                         "- {name: end, does: detect}\n");
  const double direct = (1.0 - r) * (1.0 - r) * mirror;
  EXPECT_NEAR(mirror_.found.image.power, direct, 1e-14);
  EXPECT_NEAR(mirror_.power({"front"}), r, 1e-14);
  EXPECT_NEAR(mirror_.power({"front again"}), direct * mirror * r, 1e-14);
  EXPECT_NEAR(mirror_.power({"front again", "front again"}), direct * mirror * mirror * r * r, 1e-15);
  EXPECT_NEAR(mirror_.closure_error(), 0.0, 1e-14);
}

TEST(Tree, AMirrorWithARearFaceHasAGhostOfOneBounce) {
  const Followed splitter(
      light + "coatings: {half: {ideal: {reflect: 0.5}}, tenth: {ideal: {reflect: 0.1}}}\ntrain:\n"
              "- {name: splitter, does: reflect, backing: glass, coating: half, "
              "rear: {thickness: 2, coating: tenth}, gap: 9}\n"
              "- {name: end, does: detect}\n");
  EXPECT_NEAR(splitter.power({"splitter rear"}), 0.5 * 0.1 * 0.5, 1e-15);
  // Half of what comes back from the rear turns round once more inside, and then the rear leaks nine tenths.
  EXPECT_NEAR(splitter.found.ledger.leaked, 0.5 * 0.9 + 0.5 * 0.1 * 0.5 * 0.9, 1e-15);
  EXPECT_NEAR(splitter.found.ledger.not_followed, 0.5 * 0.1 * 0.5 * 0.1, 1e-15);
  EXPECT_NEAR(splitter.closure_error(), 0.0, 1e-15);
}

TEST(Tree, WhatAMirrorLetsThroughIsLeaked) {
  const Followed leak(light + "coatings: {most: {ideal: {reflect: 0.8, transmit: 0.15}}}\ntrain:\n"
                              "- {name: mirror, does: reflect, coating: most, gap: 9}\n"
                              "- {name: end, does: detect}\n");
  EXPECT_NEAR(leak.found.ledger.leaked, 0.15, 1e-15);
  EXPECT_NEAR(leak.found.ledger.absorbed, 0.05, 1e-15);
}

/// What comes back from the rear is 0.0384, of which 0.04 may turn round once more.
TEST(Tree, BeamsThatMayBringLessThanTheFloorAreCutOffAndEntered) {
  const std::string train = plate + "- {name: end, does: detect}\n";
  const Followed followed(train, 2, 0.0014);
  EXPECT_EQ(followed.found.paths.rows().size(), 1U);
  EXPECT_TRUE(followed.found.cut.spans().empty());
  const Followed cut(train, 2, 0.0016);
  EXPECT_EQ(cut.found.paths.rows().size(), 0U);
  EXPECT_NEAR(cut.found.ledger.not_followed, 0.96 * 0.04, 1e-15);
  ASSERT_EQ(cut.found.cut.spans().size(), 1U);
  EXPECT_EQ(cut.tree.detected_below(cut.found.cut.spans()[0].end) -
                cut.tree.detected_below(cut.found.cut.spans()[0].first),
            1U);
  EXPECT_NEAR(cut.closure_error(), 0.0, 1e-15);
}

TEST(Tree, ABounceScattersAndLosesOnce) {
  const auto ghost = [](const std::string& keys) {
    return Followed(light + "train:\n- {name: front, into: glass, gap: 5" + keys +
                    "}\n- {name: rear, into: air, gap: 5}\n- {name: end, does: detect}\n");
  };
  const Followed clean = ghost("");
  const Followed dusty = ghost(", loss: 0.1");
  EXPECT_NEAR(dusty.found.ghosts, clean.found.ghosts * 0.9 * 0.9, 1e-16);
  EXPECT_NEAR(dusty.returned({"front"}), 0.04 * 0.9, 1e-15);
  EXPECT_NEAR(dusty.closure_error(), 0.0, 1e-14);
  const Followed rough = ghost(", roughness: 5");
  const double k_sigma = 2.0 * std::acos(-1.0) * 5.0 / 550.0;
  EXPECT_NEAR(rough.returned({"front"}), 0.04 * std::exp(-4.0 * k_sigma * k_sigma), 1e-15);
  EXPECT_NEAR(rough.found.ghosts,
              clean.found.ghosts * std::exp(-0.25 * k_sigma * k_sigma - 9.0 * k_sigma * k_sigma), 1e-16);
}

TEST(PathTree, FindsTheSameBouncesInTheOrderOfItsNumbers) {
  const Followed plate_(plate + "- {name: end, does: detect}\n", 2);
  std::vector<std::vector<std::string>> all;
  for (PathTree::PathNumber number = 0; number < plate_.tree.paths(plate_.tree.start(), 2); ++number)
    all.push_back(plate_.names(number));
  using Names = std::vector<std::string>;
  EXPECT_THAT(all, ElementsAre(Names{"front"}, Names{"rear", "front"}, Names{"rear"}, Names{}));
}

TEST(PathTree, CountsMillionsOfPathsWithoutWalkingThem) {
  std::string train = light + "train:\n";
  for (int i = 0; i < 60; ++i)
    train += "- {name: S" + std::to_string(i) + ", into: " + (i % 2 == 0 ? "glass" : "air") + ", gap: 1}\n";
  const support::Ready made = support::ready(train + "- {name: end, does: detect}\n");
  EXPECT_EQ(PathTree(*made.assembly, made.train.routes, 2).detected(), 1770U + 1U);
  const PathTree four(*made.assembly, made.train.routes, 4);
  EXPECT_GT(four.detected(), 2'500'000U);
  EXPECT_EQ(four.way(four.paths(four.start(), 4) - 1).path.end, End::detected);
}

TEST(PathSums, MergeToTheMomentsOfAllRaysTogether) {
  PathSums one{.power = 1.0, .x = 0.0, .y = 0.0};
  one += PathSums{.power = 3.0, .x = 4.0, .y = 0.0};
  one += PathSums{.power = 0.0};
  EXPECT_DOUBLE_EQ(one.x, 3.0);
  EXPECT_DOUBLE_EQ(one.spread, 9.0 + 3.0);
}

TEST(PathSpans, UniteWhereTheyTouchOrHoldEachOther) {
  PathSpans some;
  some.append(0, 3);
  some.append(10, 12);
  PathSpans more;
  more.append(1, 2);
  more.append(3, 5);
  more.append(11, 20);
  some += more;
  ASSERT_EQ(some.spans().size(), 2U);
  EXPECT_EQ(some.spans()[0].end, 5U);
  EXPECT_EQ(some.spans()[1].end, 20U);
}

} // namespace
} // namespace lightledger::trace
