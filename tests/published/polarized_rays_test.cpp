#include "published/record.hpp"
#include "support/walk.hpp"

#include <lightledger/optics/boundary.hpp>

#include <fmt/format.h>
#include <gtest/gtest.h>

#include <Eigen/Geometry>
#include <Eigen/SVD>
#include <cmath>
#include <numbers>

namespace lightledger::published {
namespace {

using optics::Complex;
using support::ray;
using support::ready;
using support::walk;

constexpr double degree = std::numbers::pi / 180.0;
const char* const yun = "G. Yun, K. Crabtree & R. A. Chipman, Appl. Opt. 50, 2855 (2011)";

void derived_complex(Sheet& sheet, std::string_view what, std::string_view re, std::string_view im,
                     Complex ours, More more) {
  sheet.derived(fmt::format("{}, real part", what), re, ours.real(), more);
  sheet.derived(fmt::format("{}, imaginary part", what), im, ours.imag(), more);
}

/// Folds of aluminium at 800 nm (n + iκ = 2.80 + 8.45i), each tilted about x and y, and where the axis goes.
Eigen::Matrix3cd folded(const std::vector<std::array<double, 2>>& tilts) {
  std::string text = "light: {wavelengths: [800], beam: {radius: 1}}\n"
                     "media: {metal: {index: 2.80, kappa: 8.45}}\ntrain:\n";
  for (std::size_t i = 0; i < tilts.size(); ++i)
    text += fmt::format(
        "- {{name: fold {}, does: reflect, tilt: [{:.17g}, {:.17g}, 0], backing: metal, gap: 10}}\n", i,
        tilts[i][0], tilts[i][1]);
  text += "- {name: end, does: detect}\n";
  const support::Ready train = ready(text);
  const trace::RayBlock launched = ray({0, 0, 0}, {0, 0, 1});
  return support::polarization_matrix(train.train, walk(train.train, launched), launched, tilts.size() - 1);
}

struct SingularValues {
  double largest, smallest;
  [[nodiscard]] double diattenuation() const {
    return (largest * largest - smallest * smallest) / (largest * largest + smallest * smallest);
  }
};

/// Of the transverse part; the third singular value, 1, belongs to the direction of the ray.
SingularValues transverse(Eigen::Matrix3cd p, const Eigen::Vector3d& k_in, const Eigen::Vector3d& k_out) {
  p -= (k_out * k_in.transpose()).cast<Complex>();
  const Eigen::Vector3d values = Eigen::JacobiSVD<Eigen::Matrix3cd>(p).singularValues();
  return {values[0], values[1]};
}

TEST(PublishedPolarizedRays, CrossedFoldsCompensate) {
  Sheet sheet{"PR-03", "Crossed 45° folds, aluminium at 800 nm",
              "W. S. T. Lam & R. A. Chipman, Appl. Opt. 54, 3236 (2015), abstract; exact closed form"};
  const Eigen::Matrix3cd p = folded({{0, -45}, {-45, 0}});
  derived_complex(sheet, "P[x,y]", "0.776301224", "0.375930003", p(0, 1), {.relative = 2e-9});
  derived_complex(sheet, "P[z,x]", "0.776301224", "0.375930003", p(2, 0), {.relative = 2e-9});
  sheet.exactly("P[y,z]", 1.0, p(1, 2));
  const SingularValues values = transverse(p, {0, 0, 1}, {0, 1, 0});
  sheet.derived("singular value", "0.862535192", values.largest, {.relative = 2e-9});
  sheet.exactly("diattenuation", 0.0, values.diattenuation());
  sheet.derived("throughput", "0.743966957", values.largest * values.smallest, {.relative = 2e-9});
}

TEST(PublishedPolarizedRays, PeriscopeAddsUp) {
  Sheet sheet{"PR-04", "Two parallel folds (periscope), aluminium at 800 nm", yun};
  const Eigen::Matrix3cd p = folded({{0, -45}, {0, -45}});
  derived_complex(sheet, "P[x,x] = r_p²", "0.677037883", "0.464479528", p(0, 0), {.relative = 2e-9});
  derived_complex(sheet, "P[y,y] = r_s²", "0.865472970", "0.268338553", p(1, 1), {.relative = 2e-9});
  sheet.derived("diattenuation", "0.098268062", transverse(p, {0, 0, 1}, {0, 0, 1}).diattenuation(),
                {.relative = 1e-8});
}

/// The tilts that turn a station's z axis onto a normal given in its arriving frame.
std::array<double, 2> tilt_of(Eigen::Vector3d normal) {
  if (normal[2] < 0.0)
    normal = -normal;
  return {std::atan2(-normal[1], normal[2]) / degree, std::asin(normal[0]) / degree};
}

TEST(PublishedPolarizedRays, HollowCornerCubeHasItsMatrix) {
  Sheet sheet{"PR-06", "Hollow corner cube, ray along (1,1,1)/√3, aluminium at 800 nm",
              "case of Yun et al., Appl. Opt. 50, 2855 (2011)"};
  // The cube's axes, seen from a bench whose z runs along its diagonal.
  Eigen::Matrix3d axes;
  axes.col(2) = Eigen::Vector3d(1, 1, 1).normalized();
  axes.col(0) = Eigen::Vector3d(1, -1, 0).normalized();
  axes.col(1) = Eigen::Vector3d(1, 1, -2).normalized();
  const Eigen::Matrix3d bench = axes;
  std::vector<std::array<double, 2>> tilts;
  for (int face = 0; face < 3; ++face) {
    const Eigen::Vector3d normal = Eigen::Vector3d::Unit(face);
    tilts.push_back(tilt_of(axes.transpose() * normal));
    for (const int column : {2, 0})
      axes.col(column) -= 2.0 * axes.col(column).dot(normal) * normal;
    axes.col(1) = axes.col(2).cross(axes.col(0));
  }
  const Eigen::Matrix3cd turned = bench.cast<Complex>() * folded(tilts) * bench.transpose().cast<Complex>();
  derived_complex(sheet, "P[x,x]", "0.055058653", "0.351707800", turned(0, 0), {.relative = 1e-7});
  derived_complex(sheet, "P[x,y]", "-0.529733471", "-0.182233136", turned(0, 1), {.relative = 1e-8});
  derived_complex(sheet, "P[x,z]", "-0.525325182", "-0.169474664", turned(0, 2), {.relative = 1e-8});
  derived_complex(sheet, "P[y,y]", "0.056715759", "0.351877936", turned(1, 1), {.relative = 1e-7});
  derived_complex(sheet, "P[z,x]", "-0.528076366", "-0.182063000", turned(2, 0), {.relative = 1e-8});
  const Eigen::Vector3d k = Eigen::Vector3d(1, 1, 1).normalized();
  const SingularValues values = transverse(turned, k, -k);
  sheet.derived("largest singular value", "0.793306997", values.largest, {.relative = 1e-8});
  sheet.derived("smallest singular value", "0.780058035", values.smallest, {.relative = 1e-8});
  sheet.derived("diattenuation", "0.016840367", values.diattenuation(), {.relative = 1e-7});
}

TEST(PublishedPolarizedRays, FresnelRhombMakesLinearLightCircular) {
  Sheet sheet{"PR-08", "Fresnel rhomb, n = 1.51, two total reflections at 54.623105°",
              "Born & Wolf, Principles of Optics, 7th ed., §1.5.4"};
  const support::Ready train =
      ready("light: {wavelengths: [589], medium: crown, beam: {radius: 1}}\n"
            "media: {crown: {index: 1.51}}\ntrain:\n"
            "- {name: first, does: reflect, tilt: [0, 54.623105, 0], backing: air, gap: 10}\n"
            "- {name: second, does: reflect, tilt: [0, 54.623105, 0], backing: air, gap: 10}\n"
            "- {name: end, does: detect}\n");
  const trace::RayBlock launched = ray({0, 0, 0}, {0, 0, 1});
  const support::Walk w = walk(train.train, launched);
  const Eigen::Matrix3cd p = support::polarization_matrix(train.train, w, launched, 1);
  const Eigen::Vector3cd field = p * Eigen::Vector3cd(std::sqrt(0.5), std::sqrt(0.5), 0.0);
  sheet.recalled("2 Im(Ex* Ey)", "1.000000", 2.0 * (std::conj(field[0]) * field[1]).imag());
  sheet.exactly("power", 1.0, field.squaredNorm());
}

TEST(PublishedPolarizedRays, KMirrorRotatesAndRetards) {
  Sheet sheet{"PR-09", "K-mirror 60°/30°/60°, aluminium at 800 nm", yun};
  const Eigen::Matrix3cd p = folded({{60, 0}, {-30, 0}, {60, 0}});
  derived_complex(sheet, "chain of r_p", "0.322804802", "0.622641707", p(1, 1), {.relative = 5e-9});
  derived_complex(sheet, "chain of r_s", "-0.809849419", "-0.339245541", p(0, 0), {.relative = 5e-9});
  const SingularValues values = transverse(p, {0, 0, 1}, {0, 0, 1});
  sheet.derived("largest singular value", "0.878033951", values.largest, {.relative = 2e-9});
  sheet.derived("smallest singular value", "0.701345590", values.smallest, {.relative = 2e-9});
  sheet.derived("diattenuation", "0.220978395", values.diattenuation(), {.relative = 1e-8});
}

TEST(PublishedPolarizedRays, RefractionDiattenuatesByTheDeviation) {
  Sheet sheet{"PR-10", "Refraction into n = 1.5: T_p/T_s = 1/cos²(θi − θt)",
              "A. Fresnel (1823); Born & Wolf, Principles of Optics, §1.5.3"};
  struct Case {
    double degrees;
    const char *t_s, *t_p, *diattenuation;
  };
  for (const Case& c : {Case{30, "0.942203894597", "0.974750853452", "0.016978470091"},
                        Case{45, "0.907986636954", "0.991533541021", "0.043983162188"},
                        Case{60, "0.823428511917", "0.998198062478", "0.095941480553"}}) {
    const support::Ready train = ready("light: {wavelengths: [589], beam: {radius: 1}}\n"
                                       "media: {glass: {index: 1.5}}\ntrain:\n"
                                       "- {name: face, into: glass, gap: 1}\n- {name: end, does: detect}\n");
    const support::Walk w =
        walk(train.train, ray({0, 0, 0}, {std::sin(c.degrees * degree), 0, std::cos(c.degrees * degree)}));
    const double t_s = std::pow(w.tapes[0].a_s[0][0], 2);
    const double t_p = std::pow(w.tapes[0].a_p[0][0], 2);
    sheet.derived(fmt::format("T_s, {} deg", c.degrees), c.t_s, t_s);
    sheet.derived(fmt::format("T_p, {} deg", c.degrees), c.t_p, t_p);
    sheet.derived(fmt::format("diattenuation, {} deg", c.degrees), c.diattenuation,
                  (t_p - t_s) / (t_p + t_s));
  }
}

TEST(PublishedPolarizedRays, SkewRayHasItsPolarizationMatrix) {
  Sheet sheet{"PR-11", "Polarization along the skew ray of RT-03, uncoated", yun};
  const support::Ready train = ready("light: {wavelengths: [589], beam: {radius: 1}}\n"
                                     "media: {glass: {index: 1.5}}\ntrain:\n"
                                     "- {name: S1, radius: 50, into: glass, gap: 15}\n"
                                     "- {name: S2, radius: -50, into: air, gap: 65.517241}\n"
                                     "- {name: image, does: detect}\n");
  const trace::RayBlock launched = ray({0, 20, -200}, {0.1, -0.1, std::sqrt(0.98)});
  const support::Walk w = walk(train.train, launched);
  // The matrix of the source acts on fields; ours on flux-normalised amplitudes.
  Eigen::Matrix3cd p = support::polarization_matrix(train.train, w, launched, 1);
  const auto direction = w.direction(1);
  const Eigen::Vector3d k_out(direction[0], direction[1], direction[2]);
  const Eigen::Vector3d k_in(launched.d[0][0], launched.d[1][0], launched.d[2][0]);
  const SingularValues values = transverse(p, k_in, k_out);
  const Eigen::Matrix3cd along = (k_out * k_in.transpose()).cast<Complex>();
  p = (p - along) / std::sqrt(0.865664867532) + along;
  const char* const rows[3][3] = {{"0.935605866", "0.041894982", "-0.471954069"},
                                  {"-0.035927827", "0.991613519", "0.023212904"},
                                  {"0.488539881", "-0.005490849", "0.881888265"}};
  for (int row = 0; row < 3; ++row)
    for (int column = 0; column < 3; ++column)
      sheet.derived(fmt::format("P[{},{}]", "xyz"[row], "xyz"[column]), rows[row][column],
                    p(row, column).real(), {.relative = 1e-9});
  sheet.derived("largest transmittance", "0.966502538", values.largest * values.largest, {.relative = 1e-9});
  sheet.derived("smallest transmittance", "0.852613810", values.smallest * values.smallest,
                {.relative = 1e-9});
  sheet.derived("diattenuation", "0.062606621", values.diattenuation(), {.relative = 2e-8});
}

TEST(PublishedPolarizedRays, RainbowsHaveTheirTransmittances) {
  Sheet sheet{"PR-13", "Rainbows in a drop of n = 4/3, at tan i = (k+1) tan r",
              "closed form, r_s = −k/(k+2)"};
  struct Case {
    int reflections;
    double r_s;
    const char *r_p, *path_s, *path_p;
  };
  for (const Case& c : {Case{1, 1.0 / 9.0, "0.003460207612", "0.087791495199", "0.003436302968"},
                        Case{2, 1.0 / 4.0, "0.065440778799", "0.035156250000", "0.003740335613"}}) {
    const double n = 4.0 / 3.0;
    const int k = c.reflections;
    const double cos_i = std::sqrt((n * n - 1.0) / (k * (k + 2.0)));
    const optics::Response in = optics::bare_boundary(1.0, n, cos_i);
    const double reflect_s = std::norm(in.r_s);
    const double reflect_p = std::norm(in.r_p);
    sheet.exactly(fmt::format("R_s, {} reflections", k), c.r_s, reflect_s);
    sheet.derived(fmt::format("R_p, {} reflections", k), c.r_p, reflect_p, {.relative = 1e-9});
    sheet.derived(fmt::format("s along the path, {} reflections", k), c.path_s,
                  std::pow(1.0 - reflect_s, 2) * std::pow(reflect_s, k));
    sheet.derived(fmt::format("p along the path, {} reflections", k), c.path_p,
                  std::pow(std::norm(in.t_p), 2) * std::pow(reflect_p, k), {.relative = 1e-9});
  }
}

TEST(PublishedPolarizedRays, RoughMirrorsScatter) {
  Sheet sheet{"GH-11", "Total integrated scatter 1 − exp(−(4πσ/λ)²)",
              "H. E. Bennett & J. O. Porteus, J. Opt. Soc. Am. 51, 123 (1961)"};
  const auto scattered = [](double sigma, double wavelength) {
    const support::Ready train =
        ready(fmt::format("light: {{wavelengths: [{}], beam: {{radius: 1}}}}\n"
                          "coatings: {{full: {{ideal: {{reflect: 1}}}}}}\ntrain:\n"
                          "- {{name: mirror, does: reflect, coating: full, roughness: {}, gap: 1}}\n"
                          "- {{name: end, does: detect}}\n",
                          wavelength, sigma));
    return walk(train.train, ray({0, 0, 0}, {0, 0, 1})).ledger.rows[0].scattered;
  };
  sheet.derived("1 nm at 632.8 nm", "3.942767e-4", scattered(1, 632.8));
  sheet.derived("2 nm at 632.8 nm", "1.576174e-3", scattered(2, 632.8));
  sheet.derived("5 nm at 550 nm", "1.296593e-2", scattered(5, 550));
}

} // namespace
} // namespace lightledger::published
