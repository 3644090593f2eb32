#include "published/record.hpp"
#include "support/walk.hpp"

#include <fmt/format.h>
#include <gtest/gtest.h>

#include <cmath>
#include <numbers>

namespace lightledger::published {
namespace {

using support::ray;
using support::ready;
using support::Walk;
using support::walk;

const std::string light = "light: {wavelengths: [587.6], beam: {radius: 1}}\n";

Walk walked(const std::string& text, const std::array<double, 3>& point,
            const std::array<double, 3>& direction) {
  return walk(ready(light + text).train, ray(point, direction));
}

/// Where a ray that is near the axis crosses it, from the vertex of the last refracting station.
double focal_length(const std::string& text, double height, std::size_t last) {
  const auto direction = walked(text, {0, height, 0}, {0, 0, 1}).direction(last);
  return -height * direction[2] / direction[1];
}

double focus_gap(const std::string& text, std::size_t station) {
  return ready(text).train.bench.gap[station];
}

const std::string field_flattener = R"(
media: {n1: {index: 1.694}, n2: {index: 1.792}, n3: {index: 1.643}, n4: {index: 1.491}}
train:
- {name: a, radius: 10.05, into: n1, gap: 2.08}
- {name: b, radius: -66.137, into: air, gap: 0.23}
- {name: c, radius: -20.40, into: n2, gap: 2.00}
- {name: d, radius: 10.616, into: air, gap: 2.095}
- {name: e, radius: 27.597, into: n3, gap: 2.15}
- {name: f, radius: -12.989, into: air, gap: 18.02}
- {name: g, radius: -13.755, into: n4, gap: 1.50}
- {name: h, into: air, gap: 1}
- {name: film, does: detect}
)";

TEST(PublishedRays, FourElementLensWithFieldFlattenerHasItsPrintedFocalLength) {
  Sheet sheet{"RT-01", "Four-element lens with field flattener: equivalent focal length",
              "E. I. Betensky, US Patent 3,961,844 (1976), claim 1"};
  sheet.printed("focal length (mm)", "23.5", focal_length(field_flattener, 1e-4, 7),
                {.computed = "23.48598", .within = 0.05, .relative = 1e-7});
}

const std::string thick_biconvex = R"(
media: {glass: {index: 1.5}}
train:
- {name: S1, radius: 50, into: glass, gap: 15}
- {name: S2, radius: -50, into: air, gap: 65.517241}
- {name: image, does: detect}
)";

Walk skew_ray() {
  return walked(thick_biconvex, {0, 20, -200}, {0.1, -0.1, std::sqrt(0.98)});
}

TEST(PublishedRays, SkewRayThroughABiconvexLensMeetsThePrintedPoints) {
  Sheet sheet{"RT-03", "Skew ray through a bi-convex lens",
              "W. J. Smith, Modern Optical Engineering, 3rd ed., ch. 10, example B, eqs 10.3c–o"};
  const Walk w = skew_ray();
  const auto s1 = w.hit(0);
  const auto s2 = w.hit(1);
  const auto image = w.hit(2);
  constexpr double print = 5e-6;
  constexpr double ours = 5e-10;
  sheet.printed("S1 x", "20.654614", s1[0], {.computed = "20.654614039", .within = print, .relative = ours});
  sheet.printed("S1 y", "-0.654614", s1[1], {.computed = "-0.654614039", .within = print, .relative = ours});
  sheet.printed("S1 z", "4.470247", s1[2], {.computed = "4.470247098", .within = print, .relative = ours});
  sheet.printed("S1 cos I", "0.8588247", w.tapes[0].cos_incident[0], {.within = print});
  sheet.printed("behind S1, X", "-0.0850734", w.direction(0)[0],
                {.computed = "-0.085073380", .within = print, .relative = ours});
  sheet.printed("behind S1, Y", "-0.0618575", w.direction(0)[1],
                {.computed = "-0.061857515", .within = print, .relative = ours});
  sheet.printed("behind S1, Z", "0.9944527", w.direction(0)[2],
                {.computed = "0.994452698", .within = print, .relative = ours});
  sheet.printed("S2 x", "20.116291", s2[0], {.computed = "20.116292819", .within = print, .relative = ours});
  sheet.printed("S2 y", "-1.046031", s2[1], {.computed = "-1.046031578", .within = print, .relative = ours});
  sheet.printed("S2 z", "-4.237125", s2[2], {.computed = "-4.237126607", .within = print, .relative = ours});
  sheet.printed("S2 cos I", "0.8772472", w.tapes[1].cos_incident[0], {.within = print});
  sheet.printed("behind S2, X", "-0.3778396", w.direction(1)[0],
                {.computed = "-0.377839604", .within = print, .relative = ours});
  sheet.printed("behind S2, Y", "-0.0797745", w.direction(1)[1],
                {.computed = "-0.079774532", .within = print, .relative = ours});
  sheet.printed("behind S2, Z", "0.9224280", w.direction(1)[2],
                {.computed = "0.922427915", .within = print, .relative = ours});
  sheet.printed("image x", "-8.456088", image[0],
                {.computed = "-8.456089036", .within = print, .relative = ours});
  sheet.printed("image y", "-7.078610", image[1],
                {.computed = "-7.078613566", .within = print, .relative = ours});
}

TEST(PublishedRays, SkewRayHasTheOpticalPathOfItsPrintedLengths) {
  Sheet sheet{"RT-03", "Skew ray through a bi-convex lens",
              "W. J. Smith, Modern Optical Engineering, 3rd ed., ch. 10, example B, eqs 10.3c–o"};
  const Walk w = skew_ray();
  // The printed lengths follow from the printed coordinates to 1e-5 only.
  constexpr double print = 1e-5;
  sheet.printed("object to S1", "206.546141", w.behind[0].opl[0], {.within = print});
  sheet.printed("S1 to S2", "6.327736", (w.behind[1].opl[0] - w.behind[0].opl[0]) / 1.5, {.within = print});
  sheet.printed("S2 to image", "75.620392", w.behind[2].opl[0] - w.behind[1].opl[0], {.within = print});
  sheet.derived("optical path, object to image", "291.658132264", w.behind[2].opl[0], {.relative = 1e-9});
}

std::string biconvex_triplet(const char* object) {
  return fmt::format(R"(
light: {{wavelengths: [587.6], object: {}, beam: {{radius: 1}}}}
media: {{n1: {{index: 1.5}}, n2: {{index: 1.6}}}}
train:
- {{name: S1, radius: 50, into: n1, gap: 10}}
- {{name: S2, radius: -50, into: n2, gap: 2}}
- {{name: S3, into: air, gap: focus}}
- {{name: image, does: detect}}
)",
                     object);
}

TEST(PublishedRays, ParaxialTraceOfThreeSurfacesEndsAtThePrintedImage) {
  Sheet sheet{"RT-04", "Paraxial trace of three surfaces, object 300 before the first",
              "W. J. Smith, Modern Optical Engineering, ch. 3, pp. 42–43 (figs 3.4, 3.5)"};
  // The printed ray of height 10 leaves S3 at 9.496111 with n'u' = −0.047555.
  sheet.printed("image distance", "199.68", focus_gap(biconvex_triplet("{distance: 300}"), 2),
                {.computed = "199.684579", .within = 0.05});
}

TEST(PublishedRays, GregorianFocusesBehindItsPrimary) {
  Sheet sheet{"RT-05", "Gregorian two-mirror objective",
              "W. J. Smith, Modern Optical Engineering, ch. 4, exercise 1"};
  const std::string gregorian = light + R"(
train:
- {name: primary, does: reflect, radius: -200, backing: Al, gap: 130}
- {name: secondary, does: reflect, radius: -50, backing: Al, gap: focus}
- {name: image, does: detect}
)";
  const support::Ready train = ready(gregorian);
  sheet.printed("back focal length", "150", train.train.bench.gap[1], {.within = 1e-10});
  sheet.printed("focus behind the primary", "20", train.train.bench.arriving[2].origin[2], {.within = 1e-10});
  const Walk w = walk(train.train, ray({0, 1e-4, 0}, {0, 0, 1}));
  sheet.printed("height at the secondary, per height at the primary", "0.30", std::abs(w.hit(1)[1]) / 1e-4,
                {.computed = "0.3", .relative = 1e-6});
}

TEST(PublishedRays, TessarHasTheBackFocusOfItsData) {
  Sheet sheet{"RT-07", "Tessar: back focal length and focal length",
              "data: J. Peatross & M. Ware, Physics of Light and Optics, problem P9.16"};
  const std::string tessar = R"(
media: {n1: {index: 1.6116}, n2: {index: 1.6053}, n3: {index: 1.5123}}
train:
- {name: a, radius: 1.628, into: n1, gap: 0.357}
- {name: b, radius: -27.57, into: air, gap: 0.189}
- {name: c, radius: -3.457, into: n2, gap: 0.081}
- {name: d, radius: 1.582, into: air, gap: 0.325}
- {name: e, into: n3, gap: 0.217}
- {name: f, radius: 1.920, into: n1, gap: 0.396}
- {name: g, radius: -2.400, into: air, gap: focus}
- {name: film, does: detect}
)";
  sheet.derived("back focal length", "4.406097862", focus_gap(light + tessar, 6), {.relative = 1e-9});
  sheet.derived("focal length", "5.078850530", focal_length(tessar, 1e-6, 6), {.relative = 1e-7});
}

std::string singlet(double front, double rear, double thickness, double index) {
  return fmt::format("media: {{glass: {{index: {}}}}}\ntrain:\n"
                     "- {{name: front, radius: {}, into: glass, gap: {}}}\n"
                     "- {{name: rear, radius: {}, into: air, gap: 1}}\n"
                     "- {{name: end, does: detect}}\n",
                     index, front, thickness, rear);
}

TEST(PublishedRays, ThickLensesHaveTheirPrintedFocalLengths) {
  Sheet a{"RT-08a", "Thick bi-concave lens", "University of Tennessee, Optics 507, assignment 1, solution"};
  a.printed("focal length", "-47.619", focal_length(singlet(-50, 50, 15, 1.5), 1e-5, 1),
            {.computed = "-47.619048", .relative = 1e-7});
  Sheet b{"RT-08b", "Bi-convex lens, thick",
          "University of Arizona, OPTI 201R course notes (2010), ch. 7, p. 20-2"};
  b.printed("focal length (mm)", "75.57", focal_length(singlet(77.265, -77.265, 5.102, 1.517), 1e-5, 1),
            {.computed = "75.574745", .relative = 1e-7});
  Sheet c{"RT-08c", "Bi-convex lens with a near object", "E. Hecht, Optics, §6.1, example"};
  c.recalled("focal length (cm)", "26.8", focal_length(singlet(20, -40, 1, 1.5), 1e-5, 1),
             {.computed = "26.815642", .relative = 1e-7});
  const std::string near_object = "light: {wavelengths: [587.6], object: {distance: 30}, beam: {radius: 1}}\n"
                                  "media: {glass: {index: 1.5}}\ntrain:\n"
                                  "- {name: front, radius: 20, into: glass, gap: 1}\n"
                                  "- {name: rear, radius: -40, into: air, gap: focus}\n"
                                  "- {name: end, does: detect}\n";
  // The printed image distance counts from the second principal plane, 0.446927 before the rear vertex.
  c.recalled("image distance from the principal plane (cm)", "238", focus_gap(near_object, 1) + 0.446927,
             {.computed = "237.823977", .relative = 1e-6});
}

TEST(PublishedRays, HubbleSpaceTelescopeFocusesAtItsBackDistance) {
  Sheet sheet{"RT-09", "Hubble Space Telescope, first-order layout (m)",
              "C. J. Burrows, HST Optical Telescope Assembly Handbook v1.0 (STScI, 1990)"};
  const std::string telescope = R"(
train:
- {name: primary, does: reflect, radius: -11.04, backing: Al, gap: 4.90607}
- {name: secondary, does: reflect, radius: 1.358, backing: Al, gap: focus}
- {name: image, does: detect}
)";
  sheet.recalled("secondary to focus", "6.406", focus_gap(light + telescope, 1),
                 {.computed = "6.406308", .relative = 1e-7});
  sheet.recalled("focal length", "57.6", focal_length(telescope, 1e-5, 1),
                 {.computed = "57.600738", .relative = 1e-7});
}

TEST(PublishedRays, AsphereHasTheSagAndSlopeOfIso10110) {
  Sheet sheet{"RT-12", "Sag of a rotationally symmetric asphere", "ISO 10110-12, basic equation"};
  const auto sag = [](const char* shape) {
    return walked(
        fmt::format("media: {{glass: {{index: 1.5}}}}\ntrain:\n- {{name: face, {}, into: glass, gap: 1}}\n"
                    "- {{name: end, does: detect}}\n",
                    shape),
        {0, 10, 0}, {0, 0, 1});
  };
  const Walk asphere = sag("radius: 50, conic: -0.5, asphere: {A4: 1.0e-6, A6: -2.0e-9}");
  sheet.derived("sag", "1.0130506338833465", asphere.hit(0)[2], {.relative = 1e-15});
  sheet.derived("slope", "0.20483050891044216",
                std::sqrt(1.0 / std::pow(asphere.tapes[0].cos_incident[0], 2) - 1.0), {.relative = 1e-14});
  sheet.derived("sag of the sphere", "1.0102051443364382", sag("radius: 50").hit(0)[2], {.relative = 1e-15});
  sheet.derived("sag of the paraboloid", "1.0", sag("radius: 50, conic: -1").hit(0)[2], {.within = 1e-15});
}

double crossing(const Walk& w, std::size_t station) {
  const auto p = w.hit(station);
  const auto d = w.direction(station);
  return p[2] - p[1] * d[2] / d[1];
}

TEST(PublishedRays, CartesianSurfacesAreStigmaticInEveryZone) {
  Sheet sheet{"RT-13", "Exactly stigmatic surfaces",
              "R. Descartes, La Géométrie (1637); Born & Wolf, Principles of Optics, §4.2"};
  for (const double h : {1.0, 10.0, 20.0}) {
    const std::array<double, 3> start = {0, h, -30};
    const auto zone = [&](const char* name) { return fmt::format("{}, height {}", name, h); };
    sheet.exactly(
        zone("paraboloid mirror"), -50.0,
        crossing(
            walked("train:\n- {name: bowl, does: reflect, radius: -100, conic: -1, backing: Al, gap: 1}\n"
                   "- {name: end, does: detect}\n",
                   start, {0, 0, 1}),
            0),
        4e-13);
    sheet.exactly(
        zone("ellipsoid into glass"), 150.0,
        crossing(walked(fmt::format("media: {{glass: {{index: 1.5}}}}\ntrain:\n"
                                    "- {{name: face, radius: 50, conic: {:.17g}, into: glass, gap: 1}}\n"
                                    "- {{name: end, does: detect}}\n",
                                    -1.0 / 2.25),
                        start, {0, 0, 1}),
                 0),
        4e-13);
    sheet.exactly(zone("hyperboloid out of glass"), 100.0,
                  crossing(walked("media: {glass: {index: 1.5}}\ntrain:\n"
                                  "- {name: flat, into: glass, gap: 40}\n"
                                  "- {name: face, radius: -50, conic: -2.25, into: air, gap: 1}\n"
                                  "- {name: end, does: detect}\n",
                                  start, {0, 0, 1}),
                           1),
                  4e-13);
  }
}

TEST(PublishedRays, AplanaticPointsOfASphereAreImagedExactly) {
  Sheet sheet{"RT-13d", "Aplanatic points of a sphere", "Born & Wolf, Principles of Optics, §4.2.3"};
  // Light from R/n beyond the centre inside the glass leaves as if from nR; the sphere faces the light with
  // its hollow side.
  for (const double degrees : {5.0, 30.0, 55.0}) {
    const double angle = degrees * std::numbers::pi / 180.0;
    const Walk w = walk(ready("light: {wavelengths: [587.6], medium: glass, beam: {radius: 1}}\n"
                              "media: {glass: {index: 1.5}}\ntrain:\n"
                              "- {name: dome, radius: -10, into: air, gap: 1}\n- {name: end, does: detect}\n")
                            .train,
                        ray({0, 0, -10.0 - 10.0 / 1.5}, {0, std::sin(angle), std::cos(angle)}));
    sheet.exactly(fmt::format("virtual image from the centre, at {} deg", degrees), -15.0,
                  crossing(w, 0) + 10.0, 1e-12);
    sheet.exactly(fmt::format("ratio of sines, at {} deg", degrees), 1.5, std::sin(angle) / w.direction(0)[1],
                  1e-13);
  }
}

TEST(PublishedRays, SphericalMirrorCrossesItsAxisWhereTheFormulaSays) {
  Sheet sheet{"RT-14", "Spherical mirror: axial crossing R − R/(2 cosθ), sinθ = h/R", "elementary geometry"};
  const auto cross = [](double h) {
    return -crossing(walked("train:\n- {name: bowl, does: reflect, radius: -100, backing: Al, gap: 1}\n"
                            "- {name: end, does: detect}\n",
                            {0, h, -60}, {0, 0, 1}),
                     0);
  };
  sheet.derived("height 10", "49.748109237", cross(10), {.relative = 1e-10});
  sheet.derived("height 50", "42.264973081", cross(50), {.relative = 1e-10});
}

TEST(PublishedRays, TiltedPlateDisplacesTheRay) {
  Sheet sheet{"RT-15", "Tilted plane-parallel plate: lateral displacement",
              "W. J. Smith, Modern Optical Engineering, ch. 7, p. 134 (exact form)"};
  const auto displacement = [](double tilt) {
    const double gap = 10.0 / std::cos(tilt * std::numbers::pi / 180.0);
    return std::abs(walked(fmt::format("media: {{glass: {{index: 1.5}}}}\ntrain:\n"
                                       "- {{name: front, tilt: [{0}, 0, 0], into: glass, gap: {1:.17g}}}\n"
                                       "- {{name: rear, tilt: [{0}, 0, 0], into: air, gap: 20}}\n"
                                       "- {{name: end, does: detect}}\n",
                                       tilt, gap),
                           {0, 0, 0}, {0, 0, 1})
                        .hit(2)[1]);
  };
  sheet.derived("10 deg", "0.5886975947", displacement(10), {.relative = 1e-10});
  sheet.derived("30 deg", "1.9381378215", displacement(30), {.relative = 1e-10});
  sheet.derived("45 deg", "3.2914230818", displacement(45), {.relative = 1e-10});
}

TEST(PublishedRays, PrismDeviatesByItsMinimum) {
  Sheet sheet{"RT-16", "Minimum deviation of a 60° prism, n = 1.5168", "2 asin(n sin(A/2)) − A"};
  constexpr double degree = std::numbers::pi / 180.0;
  const double incidence = std::asin(1.5168 * 0.5);
  const Walk w = walked("media: {glass: {index: 1.5168}}\ntrain:\n"
                        "- {name: front, tilt: [30, 0, 0], into: glass, gap: 20}\n"
                        "- {name: rear, tilt: [-30, 0, 0], into: air, gap: 20}\n"
                        "- {name: end, does: detect, tilt: [-40, 0, 0]}\n",
                        {0, 0, 0}, {0, std::sin(incidence - 30 * degree), std::cos(incidence - 30 * degree)});
  // The rays cross the prism along its base, at the axis; each face turns them by half the deviation.
  const std::array<double, 3> in = {0, std::sin(incidence - 30 * degree), std::cos(incidence - 30 * degree)};
  const trace::RayBlock& out = w.behind[1];
  // Behind the rear face directions are in its own frame, tilted by −30° about x.
  const double y = std::cos(30 * degree) * out.d[1][0] + std::sin(30 * degree) * out.d[2][0];
  const double z = -std::sin(30 * degree) * out.d[1][0] + std::cos(30 * degree) * out.d[2][0];
  sheet.derived("deviation (deg)", "38.646695472", std::acos(in[1] * y + in[2] * z) / degree,
                {.relative = 1e-10});
}

} // namespace
} // namespace lightledger::published
