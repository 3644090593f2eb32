#include "published/record.hpp"
#include "support/walk.hpp"

#include <lightledger/trace/path_image.hpp>
#include <lightledger/trace/path_tree.hpp>
#include <lightledger/trace/tree.hpp>

#include <fmt/format.h>
#include <gtest/gtest.h>

#include <cmath>

namespace lightledger::published {
namespace {

using support::ready;
using support::Ready;
using trace::PathSums;
using trace::PathTree;
using trace::TracedTree;

/// One ray, at normal incidence unless the train is tilted.
const std::string one_ray = "light: {wavelengths: [550], beam: {radius: 0.001}, "
                            "rays: {pattern: rings, rings: 1, spokes: 4}}\n";

struct Followed {
  Ready made;
  PathTree tree;
  TracedTree traced;

  Followed(const std::string& text, int bounces)
      : made(ready(text)), tree(*made.assembly, made.train.routes, bounces),
        traced(trace::trace_tree(made.train, tree, {.floor = 0.0, .threads = 1})) {}

  [[nodiscard]] double delivered() const { return traced.total.image.power; }
  [[nodiscard]] PathSums path(const std::vector<std::string>& bounces) const {
    for (const trace::PathTable::Row& row : traced.total.paths.rows())
      if (trace::bounce_names(*made.assembly, tree.way(row.number)) == bounces)
        return row.sums;
    return {};
  }
  [[nodiscard]] std::optional<double> image(const std::vector<std::string>& bounces) const {
    for (PathTree::PathNumber number = 0; number < tree.paths(tree.start(), tree.bounces()); ++number)
      if (const PathTree::Way way = tree.way(number); trace::bounce_names(*made.assembly, way) == bounces)
        return trace::paraxial_image(made.train, way);
    return std::nullopt;
  }
};

/// Faces that reflect the same share of light at every angle.
std::string faces(int count, double reflectance) {
  std::string text =
      one_ray + fmt::format("media: {{glass: {{index: 1.5}}}}\ncoatings: {{even: {{ideal: {{reflect: "
                            "{}}}}}}}\ntrain:\n",
                            reflectance);
  for (int i = 1; i <= count; ++i)
    text +=
        fmt::format("- {{name: S{}, into: {}, coating: even, gap: 1}}\n", i, i % 2 == 1 ? "glass" : "air");
  return text + "- {name: end, does: detect}\n";
}

std::string plate(double index, const std::string& light, const std::string& tilt, double gap) {
  return light + fmt::format("media: {{glass: {{index: {}}}}}\ntrain:\n", index) +
         fmt::format("- {{name: front, into: glass, tilt: {}, gap: {:.17g}}}\n", tilt, gap) +
         fmt::format("- {{name: rear, into: air, tilt: {}, gap: 50}}\n", tilt) +
         "- {name: end, does: detect}\n";
}

TEST(PublishedGhosts, AreAsManyAsThePairsOfFaces) {
  Sheet sheet{"GH-01", "Number of ghost paths",
              "R. Abd El-Maksoud & J. Sasián, Proc. SPIE 7428 (2009), two reflections: N(N−1)/2; own count"};
  const auto count = [](int faces_, int bounces) {
    const Ready made = ready(faces(faces_, 0.04));
    return static_cast<double>(PathTree(*made.assembly, made.train.routes, bounces).detected() - 1);
  };
  struct Row {
    int faces, two, four;
  };
  for (const auto& [n, two, four] :
       {Row{2, 1, 1}, Row{3, 3, 8}, Row{4, 6, 31}, Row{6, 15, 190}, Row{10, 45, 1695}, Row{20, 190, 30115}}) {
    sheet.exactly(fmt::format("{} faces, two reflections", n), two, count(n, 2));
    sheet.exactly(fmt::format("{} faces, four reflections", n), four, count(n, 4) - count(n, 2));
  }
}

/// The series of the plate: each pair of reflections more brings R² of the light before.
double all_orders(const Followed& plate_) {
  const double rest = std::pow(plate_.path({"rear", "front"}).power / plate_.delivered(), 3.0);
  const double ratio = std::cbrt(rest);
  return plate_.delivered() + plate_.traced.total.ghosts + plate_.delivered() * rest / (1.0 - ratio);
}

TEST(PublishedGhosts, OfAPlateAddUpToAllOrders) {
  Sheet sheet{"GH-02", "Plane-parallel plate, all orders",
              "W. J. Smith, Modern Optical Engineering, 3rd ed., eqs 10.5–10.7"};
  for (const auto& [index, transmitted] :
       {std::pair{1.5, "0.923076923077"}, std::pair{1.52, "0.918318028033"}}) {
    const Followed four(plate(index, one_ray, "[0, 0, 0]", 10.0), 4);
    sheet.derived(fmt::format("T, n = {}", index), transmitted, all_orders(four));
    const double r = std::pow((index - 1.0) / (index + 1.0), 2.0);
    sheet.exactly(fmt::format("T within what is not followed, n = {}", index), 0.0,
                  std::max(0.0, (1.0 - r) / (1.0 + r) - four.delivered() - four.traced.total.ghosts -
                                    four.traced.total.ledger.not_followed));
  }
}

TEST(PublishedGhosts, OfAnUncoatedPlateBringTheSquareOfItsReflectance) {
  Sheet sheet{"GH-03", "First ghost of an uncoated plate",
              "term ratio R² of W. J. Smith, Modern Optical Engineering, 3rd ed., eq. 10.5"};
  const Followed normal(plate(1.5, one_ray, "[0, 0, 0]", 10.0), 2);
  sheet.derived("direct", "0.9216", normal.delivered());
  sheet.derived("first ghost", "0.00147456", normal.traced.total.ghosts);
  sheet.derived("first ghost over direct", "1.6e-3", normal.traced.total.ghosts / normal.delivered());

  const auto ratio = [](const char* state) {
    const std::string light =
        fmt::format("light: {{wavelengths: [550], polarization: {{linear: {}}}, beam: {{radius: "
                    "0.001}}, rays: {{pattern: rings, rings: 1, spokes: 4}}}}\n",
                    state);
    const Followed tilted(plate(1.5, light, "[45, 0, 0]", 10.0 * std::sqrt(2.0)), 2);
    return tilted.traced.total.ghosts / tilted.delivered();
  };
  sheet.derived("ghost over direct at 45 deg, s", "0.008466458979", ratio("0"));
  sheet.derived("ghost over direct at 45 deg, p", "7.168092764e-5", ratio("90"));
}

TEST(PublishedGhosts, OfThreeEqualFacesMakeTheLedgerByOrder) {
  Sheet sheet{"GH-04", "Ledger by order for equal lossless surfaces",
              "closed sums of G. G. Stokes, Proc. R. Soc. 11, 545 (1862); orders derived"};
  const Followed two(faces(3, 0.04), 2);
  sheet.derived("order 0", "0.884736", two.delivered());
  sheet.derived("order 2", "0.004135751516", two.traced.total.ghosts, {.relative = 1e-9});
  const Followed four(faces(3, 0.04), 4);
  const double found = four.delivered() + four.traced.total.ghosts;
  sheet.derived("all orders", "0.888888888889", found, {.relative = 3e-7});
}

TEST(PublishedGhosts, OfAPlateMakeFringesOfAirysContrast) {
  Sheet sheet{"GH-06", "Coherent plate, fringe contrast",
              "G. B. Airy 1833; M. Born & E. Wolf, Principles of Optics, 7th ed., §7.6.1"};
  const Followed two(plate(1.5, one_ray, "[0, 0, 0]", 10.0), 2);
  const PathSums ghost = two.path({"rear", "front"});
  sheet.derived("contrast 2R/(1+R²)", "0.079872204", ghost.interference / ghost.intensity,
                {.relative = 1e-8});
}

TEST(PublishedGhosts, OfAThinLensComeToTheirFocus) {
  Sheet sheet{"GH-07", "Foci of the ghosts of a thin lens",
              "power φ (n(2m+1) − 1)/(n − 1) after m pairs of reflections; f/7 for n = 1.5 is textbook"};
  const auto focus = [](double n) {
    const double radius = 2.0 * (n - 1.0) * 50.0; // f = 50
    const Followed lens(one_ray + fmt::format("media: {{glass: {{index: {}}}}}\ntrain:\n"
                                              "- {{name: front, radius: {:.17g}, into: glass, gap: 0}}\n"
                                              "- {{name: rear, radius: {:.17g}, into: air, gap: 50}}\n"
                                              "- {{name: end, does: detect}}\n",
                                              n, radius, -radius),
                        4);
    return std::pair{50.0 / (50.0 + *lens.image({"rear", "front"})),
                     50.0 / (50.0 + *lens.image({"rear", "front", "rear", "front"}))};
  };
  sheet.derived("f over the first, n = 1.5", "7", focus(1.5).first);
  sheet.derived("f over the second, n = 1.5", "13", focus(1.5).second);
  sheet.derived("f over the first, n = 1.6", "6.333333", focus(1.6).first, {.relative = 1e-7});
  sheet.derived("f over the second, n = 1.6", "11.666667", focus(1.6).second, {.relative = 1e-7});
  sheet.derived("f over the first, n = 1.7", "5.857143", focus(1.7).first, {.relative = 1e-7});
}

TEST(PublishedGhosts, OfAThickLensComeToTheirFocus) {
  Sheet sheet{"GH-08", "Ghost of a thick bi-convex lens",
              "system matrices of W. J. Smith, Modern Optical Engineering, 3rd ed., ch. 3"};
  const Followed lens(one_ray + "media: {glass: {index: 1.5}}\ntrain:\n"
                                "- {name: S1, radius: 50, into: glass, gap: 15}\n"
                                "- {name: S2, radius: -50, into: air, gap: 40}\n"
                                "- {name: end, does: detect}\n",
                      2);
  sheet.derived("focus of the ghost of S2 and S1, from S2 (mm)", "-7.219827586",
                *lens.image({"S2", "S1"}) + 40.0, {.relative = 1e-9});
}

TEST(PublishedGhosts, OfAPlateStandBesideTheDirectBeam) {
  Sheet sheet{"GH-10", "Geometry of a plate's ghost",
              "separation 2t tanθt cosθi, extra path 2nt cosθt (M. Born & E. Wolf, 7th ed., §7.6.1)"};
  const Followed tilted(plate(1.5, one_ray, "[45, 0, 0]", 10.0 * std::sqrt(2.0)), 2);
  const PathSums ghost = tilted.path({"rear", "front"});
  const PathSums& direct = tilted.traced.total.image;
  sheet.derived("separation (mm)", "7.559289460", std::hypot(ghost.x - direct.x, ghost.y - direct.y),
                {.relative = 1e-9});
  sheet.derived("extra optical path (mm)", "26.457513111", ghost.excess / ghost.shared, {.relative = 1e-9});

  // Light that converges on a point 100 mm behind the plate's front.
  const std::string light =
      "light: {wavelengths: [550], object: {distance: -100}, beam: {radius: 0.001}, rays: "
      "{pattern: rings, rings: 1, spokes: 4}}\n";
  const Followed converging(plate(1.5, light, "[0, 0, 0]", 10.0), 2);
  const double direct_focus = *trace::paraxial_image(
      converging.made.train, converging.tree.way(converging.tree.paths(converging.tree.start(), 2) - 1));
  sheet.derived("ghost focus before the direct one (mm)", "13.333333",
                direct_focus - *converging.image({"rear", "front"}), {.relative = 1e-7});
}

} // namespace
} // namespace lightledger::published
