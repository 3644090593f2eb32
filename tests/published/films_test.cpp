#include "published/boundaries.hpp"
#include "published/record.hpp"

#include <fmt/format.h>
#include <gtest/gtest.h>

#include <algorithm>
#include <iterator>

namespace lightledger::published {
namespace {

TEST(PublishedFilms, QuarterWaveOfMagnesiumFluorideAgainstAngle) {
  Sheet sheet{
      "T01", "Quarter wave (at normal incidence) of n = 1.38 on glass of 1.52, reflectances",
      "W. J. Smith, Modern Optical Engineering, ch. 11, exercise 1 (its answer table; the text misprints the "
      "glass once as 1.58); single films on 1.5: Born & Wolf, Principles of Optics, 7th ed., §1.6.4"};
  struct Line {
    int angle;
    const char *s, *p, *mean;
    const char *exact_s, *exact_p, *exact_mean;
  };
  const Line lines[] = {
      {0, "1.26 %", "1.26 %", "1.26 %", "1.26007902146 %", "1.26007902146 %", "1.26007902146 %"},
      {20, "1.56 %", "1.01 %", "1.28 %", "1.55795616204 %", "1.00630380049 %", "1.28212998126 %"},
      {40, "3.11 %", "0.32 %", "1.71 %", "3.11021246275 %", "0.317011637009 %", "1.71361204988 %"},
      {50, "5.31 %", "0.03 %", "2.67 %", "5.31047546776 %", "0.0266165910157 %", "2.66854602939 %"},
      {51, "5.64 %", "0.02 %", "2.83 %", "5.63735159175 %", "0.0222007987232 %", "2.82977619524 %"},
      {52, "5.99 %", "0.03 %", "3.01 %", "5.99058536186 %", "0.0263195804363 %", "3.00845247115 %"},
      {53, "6.37 %", "0.04 %", "3.21 %", "6.37242512231 %", "0.0405026826271 %", "3.20646390247 %"}};
  const Layer film[] = {quarter_wave(1.38)};
  for (const Line& line : lines) {
    const Response at = stack(1.0, film, 1.52, line.angle);
    const double s = power(at.r_s);
    const double p = power(at.r_p);
    sheet.printed(fmt::format("R_s, {}°", line.angle), line.s, s, {.computed = line.exact_s})
        .printed(fmt::format("R_p, {}°", line.angle), line.p, p, {.computed = line.exact_p})
        .printed(fmt::format("mean, {}°", line.angle), line.mean, 0.5 * (s + p),
                 {.computed = line.exact_mean});
  }
  const Response at_70 = stack(1.0, film, 1.52, 70.0);
  sheet.derived("R_s, 70°", "20.7325202519 %", power(at_70.r_s))
      .derived("R_p, 70°", "5.04485193283 %", power(at_70.r_p));
}

TEST(PublishedFilms, QuarterWavesOnGlassAtNormalIncidence) {
  Sheet sheet{"T01b", "Quarter waves on glass of 1.5 at normal incidence",
              "Born & Wolf, Principles of Optics, 7th ed., §1.6.4"};
  const auto on_glass = [](double n) {
    const Layer film[] = {quarter_wave(n)};
    return stack(1.0, film, 1.5);
  };
  const double ideal = root_between(1.01, 1.49, [&](double n) { return on_glass(n).r_s.real(); });
  sheet.recalled("index of no reflection", "1.22", ideal, {.computed = "1.22474487139"})
      .exactly("r at that index", 0.0, on_glass(ideal).r_s)
      .recalled("R, n = 2.3", "0.31", power(on_glass(2.3).r_s), {.computed = "0.311557974237"})
      .derived("R, n = 1.38", "0.0141104586418", power(on_glass(1.38).r_s));
}

TEST(PublishedFilms, CharacteristicMatrixOfOneFilm) {
  Sheet sheet{
      "T02", "40 nm of zirconia, n = 2.10, on glass of 1.50 at 589.3 nm: matrix and amplitudes",
      "Pedrotti & Pedrotti, Introduction to Optics, 3rd ed., ch. 22, example (printed R of about 17.4 %)"};
  const Layer film[] = {{2.10, 40.0}};
  const Characteristic matrix{film, 589.3};
  const Response at = stack(1.0, film, 1.5, 0.0, 589.3);
  const Complex t = full_field(at.t_s, 1.0, 1.5, 0.0);
  sheet
      .derived("phase thickness, rad", "0.895617793659",
               std::arg(Complex{matrix.a.real(), -matrix.b.imag() * 2.10}))
      .derived("A = cos δ", "0.625036688828", matrix.a.real())
      .derived("D = cos δ", "0.625036688828", matrix.d.real())
      .derived("Im B = −sin δ/n", "-0.371712082768", matrix.b.imag())
      .derived("Im C = −n sin δ", "-1.63925028501", matrix.c.imag())
      .exactly("determinant", 1.0, matrix.determinant())
      .derived("Re r", "-0.394154447786", at.r_s.real())
      .derived("Im r", "0.138101598043", at.r_s.imag())
      .derived("Re t, full field", "0.430009730539", t.real())
      .derived("Im t, full field", "0.60454261905", t.imag())
      .recalled("R", "17.4 %", power(at.r_s), {.computed = "0.174429780092"})
      .derived("T", "0.825570219908", power(at.t_s))
      .exactly("R + T", 1.0, power(at.r_s) + power(at.t_s));
}

TEST(PublishedFilms, DoubleQuarterWaveKnowsItsOrder) {
  Sheet sheet{"T03", "Double quarter wave, air / 1.65 / 2.1 / glass of 1.52",
              "Pedrotti & Pedrotti, Introduction to Optics, 3rd ed., two-layer antireflection coating"};
  const Layer coat[] = {quarter_wave(1.65), quarter_wave(2.1)};
  const Layer interchanged[] = {quarter_wave(2.1), quarter_wave(1.65)};
  const auto with_ratio = [](double ratio) {
    const Layer layers[] = {quarter_wave(1.65), quarter_wave(1.65 * ratio)};
    return stack(1.0, layers, 1.52).r_s;
  };
  const double ideal = root_between(1.1, 1.4, [&](double ratio) { return with_ratio(ratio).real(); });
  const Layer three[] = {quarter_wave(1.38), {2.10, 0.5 / 2.10}, quarter_wave(1.70)};
  sheet.recalled("ratio of indices without reflection", "1.23", ideal, {.computed = "1.23288280059"})
      .exactly("r at that ratio", 0.0, with_ratio(ideal))
      .recalled("R", "0.1 %", power(stack(1.0, coat, 1.52).r_s), {.computed = "0.00101099627495"})
      .derived("R, layers interchanged", "0.178357621302", power(stack(1.0, interchanged, 1.52).r_s))
      .derived("R, quarter-half-quarter 1.38, 2.10, 1.70", "6.5677305348e-7",
               power(stack(1.0, three, 1.52).r_s))
      .derived("R, the same at 0.85 of the wavelength", "0.00268167074949",
               power(stack(1.0, three, 1.52, 0.0, 0.85).r_s));
}

TEST(PublishedFilms, SixPairsReflect) {
  Sheet sheet{"T05", "Quarter-wave stack air / (2.35, 1.46) six times / glass of 1.48",
              "Pedrotti & Pedrotti, Introduction to Optics, 3rd ed., high-reflectance stack"};
  const Layer high_first[] = {quarter_wave(2.35), quarter_wave(1.46)};
  const Layer low_first[] = {quarter_wave(1.46), quarter_wave(2.35)};
  const Response at = stack(1.0, repeated(6, high_first), 1.48);
  const double x = std::pow(1.46 / 2.35, 12) / 1.48;
  sheet.recalled("R", "99.1 %", power(at.r_s), {.computed = "0.991102262276"})
      .exactly("R − ((x − 1)/(x + 1))², x = (n0/ns)(nL/nH)^2N", 0.0,
               power(at.r_s) - std::pow((x - 1) / (x + 1), 2))
      .derived("T", "0.00889773772388", power(at.t_s))
      .derived("|phase of r|, degrees", "180", std::abs(phase_deg(at.r_s)))
      .derived("R, low index outermost", "0.980613431214",
               power(stack(1.0, repeated(6, low_first), 1.48).r_s));
}

TEST(PublishedFilms, WidthOfTheStopBand) {
  Sheet sheet{"T07", "Stop band of quarter waves 2.35 and 1.35, g = λ0/λ",
              "H. A. Macleod, Thin-Film Optical Filters, width of the high-reflectance zone, from memory; "
              "Born & Wolf, "
              "Principles of Optics, 7th ed., §1.6.5"};
  const Layer pair[] = {quarter_wave(2.35), quarter_wave(1.35)};
  const auto half_trace = [&](double g) { return Characteristic{pair, 1.0 / g}.half_trace().real(); };
  const double width = root_between(0.05, 0.4, [&](double dg) { return half_trace(1.0 + dg) + 1.0; });
  const auto reflectance = [&](int pairs, double g) {
    return power(stack(1.0, repeated(pairs, pair), 1.52, 0.0, 1.0 / g).r_s);
  };
  sheet.derived("Δg", "0.174226112609", width)
      .exactly("half trace at 1 − Δg", -1.0, half_trace(1.0 - width))
      .derived("half trace at 1", "-1.15760441292", half_trace(1.0))
      .exactly("half trace at 3 + Δg", -1.0, half_trace(3.0 + width), 1e-13)
      .derived("long edge for 1000 nm", "1210.98525307", 1000.0 / (1.0 - width))
      .derived("short edge for 1000 nm", "851.624733313", 1000.0 / (1.0 + width))
      .derived("R, 20 pairs on 1.52, g = 1", "0.999999999382", reflectance(20, 1.0))
      .derived("R, 8 pairs on 1.52, g = 1 + Δg", "0.96013916476", reflectance(8, 1.0 + width))
      .derived("R, 8 pairs, g = 2, as of the bare glass", "0.0425799949609", reflectance(8, 2.0));
}

/// Reflectance of N periods on an exit, from the matrix of one by Chebyshev polynomials of the half trace.
double periods_reflectance(const Characteristic& period, int count, double exit) {
  const Complex a = period.half_trace();
  Complex before = 0.0; // U_{N−2}
  Complex last = 1.0;   // U_{N−1}
  for (int i = 1; i < count; ++i)
    before = std::exchange(last, 2.0 * a * last - before);
  const Complex electric = last * (period.a + period.b * exit) - before;
  const Complex magnetic = last * (period.c + period.d * exit) - before * exit;
  return power((electric - magnetic) / (electric + magnetic));
}

TEST(PublishedFilms, LongStacksFollowChebyshevPolynomials) {
  Sheet sheet{"T08", "N pairs of quarter waves 2.35 and 1.35 on 1.52",
              "Born & Wolf, Principles of Optics, 7th ed., §1.6.5"};
  const Layer pair[] = {quarter_wave(2.35), quarter_wave(1.35)};
  const auto pairs = [&](int count, double g) {
    return stack(1.0, repeated(count, pair), 1.52, 0.0, 1.0 / g);
  };
  const double fifty = power(pairs(50, 0.8).r_s);
  const Characteristic period{pair, 1.0 / 0.8};
  sheet
      .exactly("R − R by Chebyshev polynomials, N = 50, g = 0.8", 0.0,
               fifty - periods_reflectance(period, 50, 1.52), 1e-12)
      .derived("R, N = 50, g = 0.8", "0.0078994307952", fifty, {.relative = 1e-9})
      .derived("R, N = 1000, g = 0.8", "0.785891474626", power(pairs(1000, 0.8).r_s), {.relative = 1e-9})
      .derived("T, N = 20, g = 1", "6.17806754548e-10", power(pairs(20, 1.0).t_s));
  const Response opaque = pairs(200, 1.0);
  sheet.exactly("R, N = 200, g = 1", 1.0, power(opaque.r_s))
      .exactly("T, N = 200, g = 1", 0.0, power(opaque.t_s), 1e-90);
}

TEST(PublishedFilms, FrustratedTotalReflection) {
  Sheet sheet{
      "T10", "Glass of 1.5 / air gap d / glass of 1.5 at 45°",
      "S. Zhu, A. W. Yu, D. Hawley & R. Roy, Am. J. Phys. 54, 601 (1986); I. N. Court & F. K. von Willisen, "
      "Appl. Opt. 3, 719 (1964)"};
  const auto gap = [](double d, double angle) {
    const Layer layers[] = {{1.0, d}};
    return stack(1.5, layers, 1.5, angle);
  };
  struct Line {
    double gap;
    const char *s, *p;
  };
  for (const Line& line :
       {Line{0.1, "0.877695295452", "0.948377315575"}, Line{0.25, "0.513210232433", "0.729652551983"},
        Line{0.5, "0.164213627088", "0.33465677014"}, Line{1.0, "0.0170471783922", "0.0425102754942"},
        Line{2.0, "0.000199231059034", "0.000509873042354"}}) {
    const Response at = gap(line.gap, 45.0);
    sheet.derived(fmt::format("T_s, d = {} λ", line.gap), line.s, power(at.t_s))
        .derived(fmt::format("T_p, d = {} λ", line.gap), line.p, power(at.t_p));
  }
  sheet.derived("T_s, 43°, d = λ/4", "0.545854999643", power(gap(0.25, 43.0).t_s))
      .exactly("T_s, d = 1000 λ (10^-1929)", 0.0, power(gap(1000.0, 45.0).t_s), 0.0);
}

/// T/(1 − R) of the silver film of T11 on an exit of admittance X − iZ, made of a lossless layer of index 2
/// on a lossless medium.
double potential_transmittance(Complex admittance) {
  constexpr double spacer = 2.0;
  const Complex reflection = (spacer - admittance) / (spacer + admittance);
  const double phase = 0.5 * (std::arg(reflection) + 2.0 * std::numbers::pi);
  const double exit = spacer * (1.0 - std::abs(reflection)) / (1.0 + std::abs(reflection));
  const Layer layers[] = {{{0.055, 3.32}, 70.0}, {spacer, 550.0 * phase / (2.0 * std::numbers::pi * spacer)}};
  const Response at = stack(1.0, layers, exit, 0.0, 550.0);
  return power(at.t_s) / (power(at.t_s) + at.absorptance_s);
}

/// The place of the greatest value, by steps in four directions that are halved when none leads up.
template <class Function>
Complex summit(Complex place, double step, Function f) {
  constexpr Complex directions[] = {{1, 0}, {-1, 0}, {0, 1}, {0, -1}};
  while (step > 1e-9) {
    const auto up = std::ranges::find_if(
        directions, [&](Complex direction) { return f(place + step * direction) > f(place); });
    if (up != std::end(directions))
      place += step * *up;
    else
      step *= 0.5;
  }
  return place;
}

TEST(PublishedFilms, PotentialTransmittanceOfSilver) {
  Sheet sheet{
      "T11", "70 nm of silver, 0.055 + 3.32i, at 550 nm: the exit admittance X − iZ of greatest T/(1 − R)",
      "H. A. Macleod, Thin-Film Optical Filters, induced-transmission filter; P. H. Berning & A. F. Turner, "
      "J. Opt. Soc. Am. 47, 230 (1957)"};
  const Complex best = summit({1.0, -2.0}, 0.1, potential_transmittance);
  const Layer silver[] = {{{0.055, 3.32}, 70.0}};
  const auto bare_film = [&](Complex exit) {
    const Response at = stack(1.0, silver, exit, 0.0, 550.0);
    return power(at.t_s) / (1.0 - power(at.r_s));
  };
  sheet.recalled("X", "0.4572", best.real(), {.computed = "0.457175872459", .relative = 1e-6})
      .recalled("Z", "3.4693", -best.imag(), {.computed = "3.46934175135", .relative = 1e-6})
      .recalled("greatest T/(1 − R)", "80.50 %", potential_transmittance(best),
                {.computed = "0.805006789224"})
      .derived("T/(1 − R) on n = 1.52", "0.301827955721", bare_film(1.52))
      .derived("T/(1 − R) with the wrong sign, X + iZ", "0.0378493653195",
               bare_film({0.457175872459, 3.46934175135}));
}

TEST(PublishedFilms, AiryFormulaOfAPlate) {
  Sheet sheet{"T14", "Plane-parallel plates: Airy's formula",
              "Born & Wolf, Principles of Optics, 7th ed., §7.6; E. Hecht, Optics, §9.6"};
  const auto plate = [](double n, double thickness, double angle) {
    const Layer layers[] = {{n, thickness}};
    return stack(1.0, layers, 1.0, angle);
  };
  const double mirror = (1.0 + std::sqrt(0.9)) / (1.0 - std::sqrt(0.9)); // the index that reflects 0.9
  const double F = 1.0 / power(plate(mirror, 0.25 / mirror, 0.0).t_s) - 1.0;
  double mean = 0.0;
  constexpr int phases = 64;
  for (int i = 0; i < phases; ++i)
    mean += power(plate(1.5, 0.5 * i / (1.5 * phases), 0.0).t_s) / phases;
  const Response quarter = plate(1.5, 0.25 / 1.5, 0.0);
  const Response oblique = plate(1.5, 1.0, 45.0);
  sheet.recalled("F = 4R/(1 − R)², R = 0.9", "360", F, {.computed = "360.0"})
      .recalled("finesse π√F/2", "30", 0.5 * std::numbers::pi * std::sqrt(F), {.computed = "29.8037647974"})
      .derived("least T, n = 1.5", "0.852071005917", power(quarter.t_s))
      .derived("greatest R, n = 1.5", "0.147928994083", power(quarter.r_s))
      .exactly("T of a half wave", 1.0, power(plate(1.5, 0.5 / 1.5, 0.0).t_s))
      .derived("T_s, n = 1.5, 45°, d = λ", "0.73573243058", power(oblique.t_s))
      .derived("T_p, n = 1.5, 45°, d = λ", "0.973032159964", power(oblique.t_p))
      .derived("T over all phases = 2n/(n² + 1)", "0.923076923077", mean);
}

TEST(PublishedFilms, ResonanceShiftsToShorterWavelengths) {
  Sheet sheet{"T15", "Half-wave plate of 1.5 in air: λ/λ0 = √(1 − sin²θ/n²) of no reflection",
              "Born & Wolf, Principles of Optics, 7th ed., §7.6; H. A. Macleod, Thin-Film Optical Filters"};
  const Layer plate[] = {{1.5, 0.5 / 1.5}};
  struct Line {
    double angle;
    const char* shift;
  };
  for (const Line& line :
       {Line{30.0, "0.942809041582"}, Line{45.0, "0.881917103688"}, Line{60.0, "0.816496580928"}}) {
    const auto reflection = [&](double wavelength) { return stack(1.0, plate, 1.0, line.angle, wavelength); };
    // On the way through the resonance r turns by half a turn: its imaginary part changes sign.
    const double resonance =
        root_between(0.75, 0.99, [&](double wavelength) { return reflection(wavelength).r_s.imag(); });
    sheet.derived(fmt::format("λ/λ0, {}°", line.angle), line.shift, resonance)
        .exactly(fmt::format("r_s there, {}°", line.angle), 0.0, reflection(resonance).r_s)
        .exactly(fmt::format("r_p there, {}°", line.angle), 0.0, reflection(resonance).r_p);
  }
}

TEST(PublishedFilms, ThinMetalAbsorbsHalfAtBest) {
  Sheet sheet{"T17", "Free-standing film of n = κ = 1000, (2πd/λ) 2nκ = 2",
              "W. Woltersdorff, Z. Phys. 91, 230 (1934); L. N. Hadley & D. M. Dennison, J. Opt. Soc. Am. 37, "
              "451 (1947)"};
  const Layer film[] = {{{1000.0, 1000.0}, 1e-6 / (2.0 * std::numbers::pi)}};
  const Response at = stack(1.0, film, 1.0);
  // The film has a phase of 1e-3 (1 + i): the limit of no thickness is reached to its square.
  sheet.exactly("R", 0.25, power(at.r_s), 1e-6)
      .exactly("T", 0.25, power(at.t_s), 1e-6)
      .exactly("A", 0.5, at.absorptance_s, 1e-6)
      .exactly("R + T + A", 1.0, power(at.r_s) + power(at.t_s) + at.absorptance_s);
}

} // namespace
} // namespace lightledger::published
