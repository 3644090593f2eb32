#include "published/record.hpp"
#include "support/walk.hpp"

#include <lightledger/analysis/polarization.hpp>

#include <fmt/format.h>
#include <gtest/gtest.h>

#include <cmath>
#include <numbers>

/// The figures of `polarization` where their definitions were published, or have closed forms.
namespace lightledger::published {
namespace {

using analysis::Polarization;

constexpr double degree = std::numbers::pi / 180.0;
const char* const yun = "G. Yun, K. Crabtree & R. A. Chipman, Appl. Opt. 50, 2855 (2011)";

Polarization polarization_of(const std::string& yaml) {
  const analysis::PolarizationResult result = analysis::polarization(support::loaded(yaml));
  if (!result.polarization)
    throw std::runtime_error(result.faults.kept().front().message);
  return *result.polarization;
}

/// Folds of aluminium at 800 nm (n + iκ = 2.80 + 8.45i), each tilted about x and y.
Polarization folded(const std::vector<std::array<double, 2>>& tilts) {
  std::string text = "light: {wavelengths: [800], beam: {radius: 1}, rays: {pattern: grid, across: 4}}\n"
                     "media: {metal: {index: 2.80, kappa: 8.45}}\ntrain:\n";
  for (std::size_t i = 0; i < tilts.size(); ++i)
    text += fmt::format(
        "- {{name: fold {}, does: reflect, tilt: [{:.17g}, {:.17g}, 0], backing: metal, gap: 10}}\n", i + 1,
        tilts[i][0], tilts[i][1]);
  return polarization_of(text + "- {name: end, does: detect}\n");
}

double radians(std::optional<double> degrees) {
  return degrees.value_or(std::nan("")) * degree;
}

TEST(PublishedPolarization, CrossedFoldsCompensate) {
  Sheet sheet{"PR-03", "Crossed 45° folds, aluminium at 800 nm",
              "W. S. T. Lam & R. A. Chipman, Appl. Opt. 54, 3236 (2015), abstract; exact closed form"};
  const Polarization p = folded({{0, -45}, {-45, 0}});
  sheet.exactly("diattenuation of the chief ray", 0.0, p.chief->diattenuation.value(), 1e-12);
  sheet.exactly("retardance of the chief ray in rad", 0.0, radians(p.chief->retardance_deg), 1e-12);
  sheet.derived("transmittance of unpolarized light", "0.743966957", p.detector.mueller[0][0],
                {.relative = 2e-9});
}

TEST(PublishedPolarization, ParallelFoldsAddUp) {
  Sheet sheet{"PR-04", "Two parallel folds (periscope), aluminium at 800 nm", yun};
  const Polarization p = folded({{0, -45}, {0, -45}});
  sheet.derived("diattenuation of all light", "0.098268062", p.detector.diattenuation.value(),
                {.relative = 1e-8});
  sheet.derived("retardance of the chief ray in rad", "0.300649871", radians(p.chief->retardance_deg),
                {.relative = 3e-9});
  sheet.derived("Lu–Chipman retardance of all light in rad", "0.300649871",
                radians(p.detector.retardance_deg), {.relative = 3e-9});
  sheet.derived("retardance of one fold alone, doubled, in rad", "0.300649871",
                2.0 * radians(p.chief->stations[0].retardance_deg), {.relative = 3e-9});
}

TEST(PublishedPolarization, KMirrorAddsItsRetardancesAndNoGeometry) {
  Sheet sheet{"PR-09", "K-mirror 60°/30°/60°, aluminium at 800 nm", yun};
  const Polarization p = folded({{60, 0}, {-30, 0}, {60, 0}});
  sheet.derived("diattenuation of the chief ray", "0.220978395", p.chief->diattenuation.value(),
                {.relative = 1e-8});
  sheet.derived("retardance of the chief ray in rad", "0.695810527", radians(p.chief->retardance_deg),
                {.relative = 2e-9});
}

// The assembly turned by t about the axis turns the image by 2t: x goes to the angle 2t.
TEST(PublishedPolarization, KMirrorTurnsTheImage) {
  Sheet sheet{"PR-09", "K-mirror 60°/30°/60°, aluminium at 800 nm", yun};
  for (const double t : {10.0, 22.5}) {
    const Polarization p = polarization_of(fmt::format(
        "light: {{wavelengths: [800], polarization: {{linear: 0}}, beam: {{radius: 1}}, rays: {{pattern: "
        "grid, across: 4}}}}\n"
        "coatings: {{full: {{ideal: {{reflect: 1}}}}}}\ntrain:\n"
        "- {{name: turn, does: stop, turn: [0, 0, {}], gap: 5}}\n"
        "- {{name: one, does: reflect, tilt: [60, 0, 0], coating: full, gap: 10}}\n"
        "- {{name: two, does: reflect, tilt: [-30, 0, 0], coating: full, gap: 10}}\n"
        "- {{name: three, does: reflect, tilt: [60, 0, 0], coating: full, turn: [0, 0, -{}], gap: 10}}\n"
        "- {{name: end, does: detect}}\n",
        t, t));
    sheet.exactly(fmt::format("rotation of the image at {} deg, over the doubled angle", t), 1.0,
                  p.chief->rotation_deg / (2.0 * t), 1e-12);
    sheet.exactly(fmt::format("retardance of ideal mirrors at {} deg", t), 0.0,
                  p.chief->retardance_deg.value(), 1e-11);
  }
}

TEST(PublishedPolarization, FresnelRhombIsAQuarterWave) {
  Sheet sheet{"PR-08", "Fresnel rhomb, n = 1.51, two total reflections at 54.623105°",
              "Born & Wolf, Principles of Optics, 7th ed., §1.5.4"};
  const Polarization p =
      polarization_of("light: {wavelengths: [589], medium: crown, polarization: {linear: 45}, beam: {radius: "
                      "1}, rays: {pattern: grid, across: 4}}\n"
                      "media: {crown: {index: 1.51}}\ntrain:\n"
                      "- {name: first, does: reflect, tilt: [0, 54.623105, 0], backing: air, gap: 10}\n"
                      "- {name: second, does: reflect, tilt: [0, 54.623105, 0], backing: air, gap: 10}\n"
                      "- {name: end, does: detect}\n");
  sheet.recalled("retardance of the chief ray", "90.0", p.chief->retardance_deg.value());
  sheet.recalled("ellipticity of the light", "45.0", p.detector.ellipticity_deg.value());
  sheet.exactly("diattenuation", 0.0, p.detector.diattenuation.value(), 1e-12);
}

TEST(PublishedPolarization, RefractionDiattenuatesTheChiefRay) {
  Sheet sheet{"PR-10", "Refraction into n = 1.5: T_p/T_s = 1/cos²(θi − θt)",
              "A. Fresnel (1823); Born & Wolf, Principles of Optics, §1.5.3"};
  const std::array<std::pair<int, const char*>, 3> cases{
      {{30, "0.016978470091"}, {45, "0.043983162188"}, {60, "0.095941480553"}}};
  for (const auto& [angle, diattenuation] : cases) {
    const Polarization p =
        polarization_of(fmt::format("light: {{wavelengths: [589], fields: [[0, {}]], beam: {{radius: 1}}, "
                                    "rays: {{pattern: grid, across: 4}}}}\n"
                                    "media: {{glass: {{index: 1.5}}}}\ntrain:\n"
                                    "- {{name: face, into: glass, gap: 1}}\n- {{name: end, does: detect}}\n",
                                    angle));
    sheet.derived(fmt::format("diattenuation of a chief ray, {} deg", angle), diattenuation,
                  p.chief->diattenuation.value());
    sheet.derived(fmt::format("diattenuation of all light, {} deg", angle), diattenuation,
                  p.detector.diattenuation.value());
  }
}

TEST(PublishedPolarization, MeasuredMatrixIsFoundUnphysical) {
  Sheet sheet{"PR-14", "A measured matrix that no optics can have",
              "B. J. Howell, Appl. Opt. 18, 809 (1979)"};
  const optics::Mueller m{{{.7599, -.0623, .0295, .1185},
                           {-.0573, .4687, -.1811, -.1863},
                           {.0384, -.1714, .5394, .0282},
                           {.1240, -.2168, -.0120, .6608}}};
  const auto eigenvalues = optics::coherency_eigenvalues(m);
  const std::array<const char*, 4> expected{"-0.097005", "0.061636", "0.176629", "0.618640"};
  for (std::size_t i = 0; i < 4; ++i)
    sheet.derived(fmt::format("coherency eigenvalue {}", i + 1), expected[i], eigenvalues[i],
                  {.relative = 1e-5});
  sheet.derived("depolarization index", "0.808020", optics::depolarization_index(m).value(),
                {.relative = 1e-6});
  sheet.derived("diattenuation", "0.180406", optics::diattenuation(m).value(), {.relative = 4e-6});
  sheet.derived("polarizance", "0.186727", optics::polarizance(m).value(), {.relative = 4e-6});
}

TEST(PublishedPolarization, DepolarizationIndexHasItsValues) {
  Sheet sheet{"PR-15", "Depolarization index", "J. J. Gil & E. Bernabeu, Opt. Acta 32, 259 (1985)"};
  const auto diagonal = [](double a, double b, double c, double d) {
    optics::Mueller m{};
    m[0][0] = a;
    m[1][1] = b;
    m[2][2] = c;
    m[3][3] = d;
    return m;
  };
  const optics::Mueller horizontal = optics::mueller(optics::pauli({1.0, 0.0, 0.0, 0.0}));
  optics::PauliCoherency both = optics::coherency_of(optics::pauli({1.0, 0.0, 0.0, 0.0}));
  both += optics::coherency_of(optics::pauli({0.0, 0.0, 0.0, 1.0}));
  sheet.exactly("a polarizer", 1.0, optics::depolarization_index(horizontal).value());
  sheet.derived("two crossed polarizers side by side", "0.577350269",
                optics::depolarization_index(optics::mueller(both)).value(), {.relative = 1e-9});
  sheet.exactly("diag(1, ½, ½, ½)", 0.5, optics::depolarization_index(diagonal(1, .5, .5, .5)).value());
  sheet.derived("diag(1, ½, ½, ¼)", "0.433012702",
                optics::depolarization_index(diagonal(1, .5, .5, .25)).value(), {.relative = 1e-9});
}

} // namespace
} // namespace lightledger::published
