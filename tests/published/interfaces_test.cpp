#include "published/boundaries.hpp"
#include "published/record.hpp"

#include <fmt/format.h>
#include <gtest/gtest.h>

#include <algorithm>

namespace lightledger::published {
namespace {

constexpr double glass = 1.5;
constexpr double water = 4.0 / 3.0;

double critical_deg(double n) {
  return std::asin(1.0 / n) * degrees;
}

/// Where p light is not reflected.
double brewster_deg(double n1, double n2) {
  const double last = n2 < n1 ? critical_deg(n1 / n2) : 90.0;
  return root_between(0.0, last, [&](double angle) { return bare(n1, n2, angle).r_p.real(); });
}

double contrast(double one, double other) {
  return (one - other) / (one + other);
}

TEST(PublishedInterfaces, NormalIncidenceOnGlassAndBack) {
  Sheet sheet{
      "F01", "Normal incidence, air to glass of n = 1.5 and back",
      "E. Hecht, Optics, §4.6.2–4.6.3; Born & Wolf, Principles of Optics, 7th ed., §1.5.3. Zinc sulphide and "
      "germanium: D. C. Harris, Materials for Infrared Windows and Domes (1999), ch. 6; their indices, 2.2 "
      "and 4.0, from memory"};
  const Response in = bare(1.0, glass, 0.0);
  const Response out = bare(glass, 1.0, 0.0);
  sheet.recalled("r_s", "-0.2", in.r_s.real(), {.computed = "-0.2"})
      .recalled("r_p", "0.2", in.r_p.real(), {.computed = "0.2"})
      .recalled("t_s, full field", "0.8", full_field(in.t_s, 1.0, glass, 0.0).real(), {.computed = "0.8"})
      .recalled("t_p, full field", "0.8", full_field(in.t_p, 1.0, glass, 0.0).real(), {.computed = "0.8"})
      .recalled("R", "0.04", power(in.r_s), {.computed = "0.04"})
      .recalled("T", "0.96", power(in.t_s), {.computed = "0.96"})
      .recalled("r_s from inside", "0.2", out.r_s.real(), {.computed = "0.2"})
      .recalled("r_p from inside", "-0.2", out.r_p.real(), {.computed = "-0.2"})
      .recalled("t from inside, full field", "1.2", full_field(out.t_s, glass, 1.0, 0.0).real(),
                {.computed = "1.2"})
      .printed("R of n = 2.2", "14 %", power(bare(1.0, 2.2, 0.0).r_s), {.computed = "0.140625"})
      .printed("R of n = 4", "36 %", power(bare(1.0, 4.0, 0.0).r_s), {.computed = "0.36"});
}

TEST(PublishedInterfaces, BrewsterAndCriticalAngles) {
  const std::string source =
      "n = 1.5: E. Hecht, Optics, §4.6; n = 1.52: Born & Wolf, Principles of Optics, 7th ed., "
      "§1.5.3; n = 2.42: Pedrotti & Pedrotti, Introduction to Optics, exercise on diamond";
  Sheet sheet{"F02", "Brewster's and critical angles in degrees", source};
  const auto critical = [](double n) {
    return root_between(0.0, 90.0,
                        [&](double angle) { return power(bare(n, 1.0, angle).t_s) > 0.0 ? -1.0 : 1.0; });
  };
  const double brewster = brewster_deg(1.0, glass);
  const Response there = bare(1.0, glass, brewster);
  sheet.recalled("Brewster, 1.5", "56.3", brewster, {.computed = "56.309932474"})
      .recalled("Brewster from inside, 1.5", "33.7", brewster_deg(glass, 1.0), {.computed = "33.690067526"})
      .recalled("critical, 1.5", "41.8", critical(glass), {.computed = "41.8103148958"})
      .recalled("Brewster, 1.52", "56 deg 40'", brewster_deg(1.0, 1.52), {.computed = "56.6592926535"})
      .printed("Brewster, 2.42", "67.55", brewster_deg(1.0, 2.42), {.computed = "67.548453544"})
      .printed("critical, 2.42", "24.41", critical(2.42), {.computed = "24.407468918"})
      .exactly("r_p at Brewster's angle", 0.0, there.r_p)
      .derived("t_p there = n1/n2, full field", "0.666666666667",
               full_field(there.t_p, 1.0, glass, brewster).real());
}

TEST(PublishedInterfaces, NaturalLightOnGlassAndWater) {
  Sheet sheet{"F03", "Natural light at Brewster's angle and at 45°, n = 1.5 and 4/3",
              "I. E. Irodov, Problems in General Physics, problems 5.159–5.162 and 5.165"};
  const Response brewster = bare(1.0, glass, brewster_deg(1.0, glass));
  const double water_brewster = brewster_deg(1.0, water);
  const double reflected = 0.5 * power(bare(1.0, water, water_brewster).r_s);
  const double widening = full_field(1.0, 1.0, water, water_brewster).real(); // √(n1 c1/(n2 c2))
  const Response at_45 = bare(1.0, glass, 45.0);
  sheet.recalled("R, glass, Brewster", "0.074", 0.5 * power(brewster.r_s), {.computed = "0.0739644970414"})
      .recalled("R_s, glass, Brewster", "0.15", power(brewster.r_s), {.computed = "0.147928994083"})
      .recalled("degree of polarization refracted", "0.080",
                contrast(power(brewster.t_p), power(brewster.t_s)), {.computed = "0.0798722044728"})
      .recalled("R, water, Brewster", "0.039", reflected, {.computed = "0.0392"})
      .recalled("irradiance of the refracted beam, water", "0.721",
                (1.0 - reflected) * widening * widening * water, {.computed = "0.7206"})
      .recalled("degree of polarization reflected, 45°", "0.83", contrast(power(at_45.r_s), power(at_45.r_p)),
                {.computed = "0.831479419283"})
      .recalled("degree of polarization refracted, 45°", "0.044",
                contrast(power(at_45.t_p), power(at_45.t_s)), {.computed = "0.0439831621876"})
      .derived("R_s, 45°", "0.0920133630455", power(at_45.r_s))
      .derived("R_p, 45°", "0.00846645897895", power(at_45.r_p))
      .exactly("R_p − R_s², 45° (Abelès)", 0.0, power(at_45.r_p) - power(at_45.r_s) * power(at_45.r_s));
}

TEST(PublishedInterfaces, PileOfPlatesAtBrewstersAngle) {
  Sheet sheet{
      "F04", "Degree of polarization behind N plates of n = 1.5 at Brewster's angle, no repeated reflections",
      "I. E. Irodov, Problems in General Physics, problem 5.172; ten surfaces: problem 5.163, from memory"};
  const Response surface = bare(1.0, glass, brewster_deg(1.0, glass));
  const auto behind = [&](int plates) {
    return contrast(std::pow(power(surface.t_p), 2 * plates), std::pow(power(surface.t_s), 2 * plates));
  };
  const double a = 2.0 * glass / (1.0 + glass * glass);
  sheet.printed("N = 1", "0.16", behind(1), {.computed = "0.158731768667"})
      .printed("N = 2", "0.31", behind(2), {.computed = "0.309661379092"})
      .derived("N = 5", "0.664275462018", behind(5))
      .printed("N = 10", "0.92", behind(10), {.computed = "0.92179702646"})
      .exactly("T_s − (2n/(1 + n²))²", 0.0, power(surface.t_s) - a * a)
      .recalled("loss of ten surfaces at normal incidence", "0.34",
                1.0 - std::pow(power(bare(1.0, glass, 0.0).t_s), 10), {.computed = "0.335167364008"});
}

TEST(PublishedInterfaces, FresnelRhomb) {
  Sheet sheet{"F06", "Fresnel's rhomb, n = 1.51: phase difference δ = −arg(r_p/r_s) in degrees",
              "Born & Wolf, Principles of Optics, 7th ed., §1.5.4, eqs. (60)–(62); A. Fresnel (1823)"};
  constexpr double n = 1.51;
  const auto delta = [](double angle) { return -phase_difference_deg(bare(n, 1.0, angle)); };
  // At the maximum the slope vanishes; a symmetric difference of this step is exact to 1e-8.
  const double top =
      root_between(48.7, 54.6, [&](double angle) { return delta(angle - 1e-4) - delta(angle + 1e-4); });
  const auto above_45 = [&](double angle) { return delta(angle) - 45.0; };
  const double sine_squared = std::pow(sine(50.0), 2);
  const double formula =
      2.0 * degrees * std::atan(cosine(50.0) * std::sqrt(sine_squared - 1.0 / (n * n)) / sine_squared);
  const double n90 = 1.0 + std::numbers::sqrt2;
  const double angle90 = std::asin(std::sqrt(2.0 / (n90 * n90 + 1.0))) * degrees;
  sheet.recalled("angle of the maximum", "51 deg 20'", top, {.computed = "51.3391000198", .relative = 1e-6})
      .recalled("maximum", "45 deg 56'", delta(top), {.computed = "45.941666807", .within = 0.01}) // 56.5'

      .recalled("first angle of 45°", "48 deg 37'", root_between(45.0, 50.0, above_45),
                {.computed = "48.6243591603"})
      .recalled("second angle of 45°", "54 deg 37'", root_between(52.0, 60.0, above_45),
                {.computed = "54.6231054412"})
      .derived("arg(r_p/r_s) at 54° 37'", "-45.0033752912", -delta(54.0 + 37.0 / 60.0))
      .exactly("δ − 2 atan(cosθ √(sin²θ − 1/n²)/sin²θ), 50°", 0.0, delta(50.0) - formula, 1e-12)
      .derived("arg(r_p/r_s), n = 1 + √2 at its maximum", "-90",
               phase_difference_deg(bare(n90, 1.0, angle90)))
      .derived("that angle", "32.7650997396", angle90);
}

TEST(PublishedInterfaces, PhasesOfTotalReflection) {
  Sheet sheet{"F08", "Total reflection, n = 1.5 to 1: phases in degrees, amplitudes at the interface",
              "Born & Wolf, Principles of Optics, 7th ed., §1.5.4, eq. (58)"};
  const Response at_45 = bare(glass, 1.0, 45.0);
  const Response critical = bare(glass, 1.0, critical_deg(glass));
  const Response grazing = bare(glass, 1.0, 90.0);
  // Tangential fields are continuous: t_s = 1 + r_s, n2 t_p = n1 (1 + r_p).
  sheet.exactly("|r_s|, 45°", 1.0, std::abs(at_45.r_s))
      .exactly("|r_p|, 45°", 1.0, std::abs(at_45.r_p))
      .derived("arg r_s, 45°", "-36.8698976458", phase_deg(at_45.r_s))
      .derived("arg r_p, 45°", "-73.7397952917", phase_deg(at_45.r_p))
      .derived("arg(r_p/r_s), 45°", "-36.8698976458", phase_difference_deg(at_45))
      .derived("arg(r_p/r_s), 55°", "-44.2801978485", phase_difference_deg(bare(glass, 1.0, 55.0)))
      .exactly("r_s at the critical angle", 1.0, critical.r_s, 1e-7)
      .exactly("r_p at the critical angle", 1.0, critical.r_p, 1e-7)
      .exactly("full-field t_s at the critical angle", 2.0, 1.0 + critical.r_s, 1e-7)
      .exactly("full-field t_p at the critical angle", 3.0, glass * (1.0 + critical.r_p), 2e-7)
      .derived("full-field |t_s|², 45°", "3.6", power(1.0 + at_45.r_s))
      .derived("full-field |t_p|², 45°", "5.76", power(glass * (1.0 + at_45.r_p)))
      .exactly("T_s, 45°", 0.0, power(at_45.t_s), 0.0)
      .exactly("T_p, 45°", 0.0, power(at_45.t_p), 0.0)
      .exactly("r_s at grazing incidence", -1.0, grazing.r_s)
      .exactly("r_p at grazing incidence", -1.0, grazing.r_p);
}

TEST(PublishedInterfaces, AzzamsRelationOfTheTwoReflections) {
  Sheet sheet{"F09", "r_p = r_s (r_s − cos 2θ)/(1 − r_s cos 2θ) for any pair of media",
              "R. M. A. Azzam, J. Opt. Soc. Am. 69, 1007 (1979)"};
  const auto excess = [](const Response& at, double angle) {
    const double c = cosine(2.0 * angle);
    return at.r_p - at.r_s * (at.r_s - c) / (1.0 - at.r_s * c);
  };
  const std::pair<const char*, Complex> media[] = {
      {"glass 1.5", glass}, {"gold 0.21 + 3.272i", {0.21, 3.272}}, {"silicon 3.85 + 0.02i", {3.85, 0.02}}};
  for (const auto& [name, index] : media) {
    for (const double angle : {10.0, 45.0, 80.0})
      sheet.exactly(fmt::format("difference of the sides, {}, {}°", name, angle), 0.0,
                    excess(bare(1.0, index, angle), angle));
    const Response at_45 = bare(1.0, index, 45.0);
    sheet.exactly(fmt::format("|r_p − r_s²|, {}, 45°", name), 0.0, at_45.r_p - at_45.r_s * at_45.r_s);
  }
  const Response total = bare(glass, 1.0, 45.0);
  sheet.exactly("|r_p − r_s²|, total reflection 1.5 to 1, 45°", 0.0, total.r_p - total.r_s * total.r_s);
}

TEST(PublishedInterfaces, NormalReflectanceOfMetals) {
  Sheet sheet{
      "F11", "Normal reflectance of metals, sodium light",
      "Born & Wolf, Principles of Optics, 7th ed., table 14.1, after Handbuch der Physik 20, 240 (1928); "
      "aluminium at 2.000 eV: CRC Handbook of Chemistry and Physics, Weaver & Frederikse"};
  struct Metal {
    const char* name;
    Complex index;
    const char* recalled;
    const char* computed;
  };
  const Metal metals[] = {{"Ag", {0.20, 3.44}, "0.94", "0.939729990357"},
                          {"Au", {0.47, 2.83}, "0.82", "0.815138940785"},
                          {"Al", {1.44, 5.23}, "0.83", "0.827060783931"},
                          {"Na", {0.044, 2.42}, "0.97", "0.97466290142"},
                          {"Cu", {0.62, 2.57}, "0.73", "0.731290563748"},
                          {"Pt", {2.63, 3.54}, "0.59", "0.590796818173"},
                          {"Ni", {1.58, 3.42}, "0.66", "0.655638376705"},
                          {"Cd", {1.13, 5.01}, "0.85", "0.847487937376"},
                          {"Al, 2.000 eV", {1.304, 7.479}, "0.9148", "0.914832274525"}};
  for (const Metal& metal : metals)
    sheet.recalled(fmt::format("R, {}, {:.4g} + {:.4g}i", metal.name, metal.index.real(), metal.index.imag()),
                   metal.recalled, power(bare(1.0, metal.index, 0.0).r_s), {.computed = metal.computed});
}

TEST(PublishedInterfaces, PrincipalAnglesOfMetals) {
  Sheet sheet{"F12", "Principal angle and principal azimuth of metals in degrees, where arg(r_p/r_s) = −90°",
              "P. Drude, The Theory of Optics (1902), table of the optical constants of metals; Drude "
              "derived n and κ "
              "from the angles to first order, hence 0.1°"};
  struct Metal {
    const char* name;
    Complex index;
    const char *angle, *exact_angle, *azimuth, *exact_azimuth;
  };
  const Metal metals[] = {{"Au", {0.366, 2.82}, "72 deg 18'", "72.3480442504", "41 deg 39'", "41.6728478595"},
                          {"Pt", {2.06, 4.26}, "78 deg 30'", "78.4535621093", "32 deg 35'", "32.5652320196"},
                          {"Hg", {1.73, 4.96}, "79 deg 34'", "79.537454493", "35 deg 43'", "35.6896629241"},
                          {"Al", {1.44, 5.23}, "79 deg 55'", "79.8550248234", "37 deg 35'", "37.537731074"}};
  for (const Metal& metal : metals) {
    const auto ratio = [&](double angle) {
      const Response at = bare(1.0, metal.index, angle);
      return at.r_p / at.r_s;
    };
    const double principal = root_between(0.0, 90.0, [&](double angle) { return ratio(angle).real(); });
    sheet
        .recalled(fmt::format("{}, {:.4g} + {:.4g}i: principal angle", metal.name, metal.index.real(),
                              metal.index.imag()),
                  metal.angle, principal, {.computed = metal.exact_angle, .within = 0.1})
        .recalled(fmt::format("{}: principal azimuth", metal.name), metal.azimuth,
                  std::atan(std::abs(ratio(principal))) * degrees,
                  {.computed = metal.exact_azimuth, .within = 0.1})
        .derived(fmt::format("{}: arg(r_p/r_s) there", metal.name), "-90", phase_deg(ratio(principal)));
  }
}

TEST(PublishedInterfaces, SlopesNearGrazingIncidence) {
  Sheet sheet{
      "F14", "Near grazing incidence, n = 1.5, ψ = 90° − θ",
      "E. Hecht, Optics, problem on r_s near 90° (slope √(n² − 1)/2); the limit of Fresnel's formulas for p"};
  constexpr double psi = 1e-8;
  const Response nearly = optics::bare_boundary(1.0, glass, std::sin(psi));
  const Response grazing = bare(1.0, glass, 89.9);
  // 1 + r is the transmitted amplitude: full-field t_s, and n t_p for p.
  const double per_flux =
      std::sqrt(std::sin(psi) / optics::normal_component(1.0, glass, std::sin(psi)).real());
  sheet.derived("(1 + r_s)/ψ, ψ = 1e-8", "1.788854366", nearly.t_s.real() * per_flux / psi)
      .derived("(1 + r_p)/ψ, ψ = 1e-8", "4.0249222785", glass * nearly.t_p.real() * per_flux / psi,
               {.relative = 1e-7})
      .derived("1 − R_s, 89.9°", "0.00622481909045", power(grazing.t_s))
      .derived("1 − R_p, 89.9°", "0.0139514270707", power(grazing.t_p))
      .derived("R_s, 89.9°", "0.99377518091", power(grazing.r_s))
      .derived("R_p, 89.9°", "0.986048572929", power(grazing.r_p));
}

TEST(PublishedInterfaces, EnergyAndContinuityAtSixtyDegrees) {
  Sheet sheet{
      "F16", "Amplitudes and energy, n = 1.5, 60°",
      "Born & Wolf, Principles of Optics, 7th ed., §1.5.3, eqs. (38), (41); E. Hecht, Optics, §4.6.3"};
  const Response at = bare(1.0, glass, 60.0);
  const double t_s = full_field(at.t_s, 1.0, glass, 60.0).real();
  const double t_p = full_field(at.t_p, 1.0, glass, 60.0).real();
  sheet.derived("r_s", "-0.420204102887", at.r_s.real())
      .derived("r_p", "-0.0424492346407", at.r_p.real())
      .derived("t_s, full field", "0.579795897113", t_s)
      .derived("t_p, full field", "0.638367176906", t_p)
      .exactly("R_s + T_s", 1.0, power(at.r_s) + power(at.t_s))
      .exactly("R_p + T_p", 1.0, power(at.r_p) + power(at.t_p))
      .exactly("t_s − r_s", 1.0, t_s - at.r_s)
      .exactly("n t_p − r_p", 1.0, glass * t_p - at.r_p);
}

TEST(PublishedInterfaces, AluminiumFoldMirror) {
  Sheet sheet{"F18", "Aluminium fold mirror at 45°, 1.44 + 5.23i",
              "Index: Born & Wolf, Principles of Optics, 7th ed., table 14.1; quantities of a diattenuating "
              "retarder: "
              "Chipman, Lam & Young, Polarized Light and Optical Systems (2018)"};
  const Response at = bare(1.0, {1.44, 5.23}, 45.0);
  const double R_s = power(at.r_s);
  const double R_p = power(at.r_p);
  const double phase = phase_difference_deg(at);
  const double geometric = 2.0 * std::sqrt(R_s * R_p) / (R_s + R_p);
  sheet.derived("R_s", "0.875257416765", R_s)
      .derived("R_p", "0.766075545602", R_p)
      .derived("(R_s − R_p)/(R_s + R_p)", "0.0665202452312", contrast(R_s, R_p))
      .derived("arg(r_p/r_s), degrees", "-165.74409287", phase)
      .derived("2√(R_s R_p)/(R_s + R_p) cos arg", "-0.967058809404", geometric * cosine(phase))
      .derived("2√(R_s R_p)/(R_s + R_p) sin arg", "-0.245707786057", geometric * sine(phase))
      .derived("R_s R_p, of a crossed pair in any polarization", "0.670513303091", R_s * R_p);
}

TEST(PublishedInterfaces, AbelesIdentityAt45Degrees) {
  Sheet sheet{"PR-01", "r_p = r_s² at 45° for any n + iκ; aluminium at 800 nm is 2.80 + 8.45i",
              "F. Abelès (1950); R. M. A. Azzam, J. Opt. Soc. Am. 69, 590 (1979)"};
  const Response metal = bare(1.0, Complex{2.80, 8.45}, 45.0);
  const Response dielectric = bare(1.0, glass, 45.0);
  const Response silver = bare(1.0, {0.20, 3.44}, 45.0);
  sheet.derived("Re r_s, aluminium", "-0.941166971009", metal.r_s.real())
      .derived("Im r_s, aluminium", "-0.142556294880", metal.r_s.imag())
      .derived("Re r_p, aluminium", "0.865472970109", metal.r_p.real())
      .derived("Im r_p, aluminium", "0.268338552502", metal.r_p.imag())
      .derived("R_s, aluminium", "0.906117564529", power(metal.r_s))
      .derived("R_p, aluminium", "0.821049040748", power(metal.r_p))
      .exactly("r_p − r_s², aluminium", 0.0, metal.r_p - metal.r_s * metal.r_s)
      .derived("r_s, n = 1.5", "-0.303337045290", dielectric.r_s.real())
      .derived("r_p, n = 1.5", "0.092013363046", dielectric.r_p.real())
      .derived("R_s, 0.20 + 3.44i", "0.957852101658", power(silver.r_s))
      .derived("R_p, 0.20 + 3.44i", "0.917480648650", power(silver.r_p));
}

} // namespace
} // namespace lightledger::published
