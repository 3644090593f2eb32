#include <lightledger/assembly/load.hpp>

#include <gtest/gtest.h>

#include <ctime>
#include <random>
#include <string>

namespace lightledger::assembly {
namespace {

constexpr const char* light = "light: {wavelengths: [532], beam: {radius: 5}}\n";

std::string repeated(std::string_view text, std::size_t count) {
  std::string result;
  for (std::size_t i = 0; i < count; ++i)
    result += text;
  return result;
}

/// Processor seconds, so that other work on the machine does not count; generous, for builds that check
/// themselves.
constexpr double allowed_seconds = 10.0;

Loaded load_quickly(std::string text) {
  const std::clock_t start = std::clock();
  Loaded loaded = load_text("hostile.yaml", std::move(text));
  const std::string report = loaded.report();
  EXPECT_LT(static_cast<double>(std::clock() - start) / CLOCKS_PER_SEC, allowed_seconds);
  EXPECT_LT(report.size(), 40'000U);
  EXPECT_EQ(loaded.faults.none(), loaded.assembly.has_value());
  return loaded;
}

std::string last_line(const Loaded& loaded) {
  const std::string report = loaded.report();
  return report.substr(report.rfind('\n', report.size() - 2) + 1);
}

TEST(Hostile, HundredThousandBadStationsAreCounted) {
  const Loaded loaded =
      load_quickly(light + ("train:\n" + repeated("  - {into: air, thickness: 1}\n", 100'000)));
  EXPECT_EQ(last_line(loaded), "the first 20 of 200001 faults are shown; nothing was written\n");
}

TEST(Hostile, HundredThousandStationsThatAreNoneAreCounted) {
  const Loaded loaded = load_quickly(light + ("train:\n" + repeated("  - x\n", 100'000)));
  EXPECT_EQ(last_line(loaded), "the first 20 of 100000 faults are shown; nothing was written\n");
}

TEST(Hostile, HundredThousandUnknownKeysAreCounted) {
  std::string text = light;
  for (int i = 0; i < 100'000; ++i)
    text += "key" + std::to_string(i) + ": 1\n";
  EXPECT_EQ(load_quickly(std::move(text)).faults.count(), 100'001U);
}

TEST(Hostile, HundredThousandEqualKeysAreCounted) {
  const Loaded loaded = load_quickly(repeated("light: 1\n", 100'000));
  EXPECT_GE(loaded.faults.count(), 99'999U);
}

TEST(Hostile, DeepNestingIsOneFault) {
  for (const char* opening : {"[", "{a: ", "- ", "{[", "? ", "[{"}) {
    const Loaded loaded = load_quickly(repeated(opening, 100'000));
    EXPECT_EQ(loaded.faults.count(), 1U) << opening;
    EXPECT_EQ(loaded.faults.kept()[0].message, "lists and mappings stand more than 64 deep in each other")
        << opening;
  }
}

TEST(Hostile, LongScalarsAreNoTrouble) {
  const std::string million(1'000'000, 'x');
  for (const std::string& text :
       {"title: " + million, "title: '" + million + "'", "title: |\n  " + million, million, million + ": 1",
        "title: " + repeated("x ", 500'000), "# " + million})
    EXPECT_FALSE(load_quickly(text).faults.none());
}

TEST(Hostile, ANameOfAMillionCharactersIsCutInTheReport) {
  const std::string million(1'000'000, 'x');
  const Loaded loaded = load_quickly(
      light + ("train:\n  - {name: " + million + ", into: " + million + ", gap: " + million + "}\n"));
  EXPECT_EQ(loaded.faults.count(), 3U);
  EXPECT_LT(loaded.report().size(), 2'000U);
}

TEST(Hostile, AFaultyGroupIsNotRepeated) {
  const Loaded loaded = load_quickly(
      light +
      std::string("coatings: {a: {layers: [{repeat: 4294967296, layers: [{medium: no, thickness: 9}]}]}}\n"
                  "train: [{name: eye, does: detect}]\n"));
  EXPECT_EQ(loaded.faults.count(), 1U);
}

/// A number that nothing in an instrument has; each broke the budget of a file that was otherwise sound.
struct Senseless {
  const char *address, *value, *message;
};
class HostileNumber : public testing::TestWithParam<Senseless> {};

TEST_P(HostileNumber, IsAFault) {
  const std::string file = "light: {wavelengths: [532], beam: {radius: 5, inner: 2, gaussian: 4}}\n"
                           "media: {resin: {index: 1.5}, oil: {cauchy: {A: [1.5]}}}\n"
                           "train:\n"
                           "  - {name: lens, into: resin, radius: 40, gap: 3}\n"
                           "  - {name: film, into: oil, gap: 3}\n"
                           "  - {name: rear, into: air, gap: 3}\n"
                           "  - {name: plate, retard: {axis: 0, waves: 0.5}, gap: 3}\n"
                           "  - {name: eye, does: detect}\n";
  ASSERT_EQ(load_text("sound.yaml", file).report(), "");
  const Loaded loaded = load_text("hostile.yaml", file, {{GetParam().address, GetParam().value}});
  ASSERT_EQ(loaded.faults.count(), 1U) << loaded.report();
  EXPECT_EQ(loaded.faults.kept()[0].message, GetParam().message);
}

INSTANTIATE_TEST_SUITE_P(
    Finds, HostileNumber,
    testing::Values(Senseless{"lens.radius", "-5e-324", "'radius' is less than a picometre"},
                    Senseless{"media.resin.index", "1e8", "resin has the index 1e+08 + 0i at 532 nm"},
                    Senseless{"media.oil.cauchy.A", "[1e-8]", "oil has the index 1e-08 + 0i at 532 nm"},
                    Senseless{"light.beam.gaussian", "0.1",
                              "'inner' leaves no light: it is more than 18 times 'gaussian'"},
                    Senseless{"light.beam.radius", "500",
                              "'radius' is more than 100 times 'gaussian'; hardly a ray would carry light"},
                    Senseless{"plate.retard.waves", "1e308", "'waves' is more than any plate retards"}));

TEST(Hostile, ManyWavelengthsFromFewWordsAreRefused) {
  const Loaded loaded =
      load_quickly("light: {wavelengths: {from: 400, to: 700, count: 4294967296}, beam: {radius: 5}}\n"
                   "train: [{name: eye, does: detect}]\n");
  EXPECT_EQ(loaded.faults.kept()[0].message, "'count' is 4294967296, not a whole number from 1 to 10000");
}

constexpr const char* sound = R"(title: Fog-bank "lidar" receiver
light:
  wavelengths: [532, {at: 0.633 um, weight: 2}]
  polarization: {linear: 30}
  fields: [[0, 0], {at: [0, 0.4], name: edge}]
  beam: {gaussian: 6, radius: 12.5}
  rays: {pattern: rings, rings: 8, spokes: 24}
media: {resin: {index: 1.49, kappa: 2.0e-8}, oil: {cauchy: {A: [1.4, 0.003]}, range_nm: [400, 700]}}
coatings:
  ar: {layers: [{repeat: 2, layers: [{medium: Al2O3, waves: 0.25, at: 532}, {medium: resin, thickness: 90}]}]}
  neutral: {ideal: {reflect: {s: 0.1, p: 5 %}}}
train:
  - &window {name: window, into: fused-silica, coating: ar, clear: {diameter: 28}, gap: 4}
  - {name: plate, retard: {axis: 45, waves: 0.25, at: 532}, gap: 0}
  - {name: lens, radius: -41.2, conic: -0.4, asphere: {A4: 1.0e-6}, into: air, gap: focus}
  - {name: fold, does: reflect, tilt: [45, 0, 0], backing: Al, coating: neutral, clear: {width: 40, height: 30}}
  - {again: window, into: fused-silica, gap: 3}
  - {name: sensor, does: detect, clear: {width: 8, height: 6}, pixels: [800, 600]}
requirements: [{quantity: delivered, at_least: 80 %}]
)";

/// Cuts, doubles, replaces and inserts pieces of a sound file, with characters that mean something in YAML.
std::string mutated(std::mt19937_64& random) {
  constexpr std::string_view letters = "{}[]:,-?&*!|>'\"%@`#\n\t \\~<\x00\x04\x80\xff"
                                       "0e.";
  const auto below = [&random](std::size_t count) { return static_cast<std::size_t>(random() % count); };
  std::string text = sound;
  for (std::size_t edits = 1 + below(3); edits > 0 && !text.empty(); --edits) {
    const std::size_t at = below(text.size());
    switch (below(5)) {
    case 0:
      text.resize(at);
      break;
    case 1:
      text[at] = letters[below(letters.size())];
      break;
    case 2:
      text.insert(at, 1, letters[below(letters.size())]);
      break;
    case 3:
      text.erase(at, below(12));
      break;
    default:
      text.insert(below(text.size()), text.substr(at, below(40)));
    }
  }
  return text;
}

TEST(Hostile, EveryMutationOfASoundFileIsAnAssemblyOrFaults) {
  ASSERT_EQ(load_text("sound.yaml", sound).report(), "");
  std::mt19937_64 random(3);
  int sound_ones = 0;
  for (int i = 0; i < 4000; ++i) {
    const Loaded loaded = load_text("mutated.yaml", mutated(random));
    ASSERT_NE(loaded.assembly.has_value(), loaded.faults.count() > 0);
    ASSERT_LT(loaded.report().size(), 40'000U);
    sound_ones += loaded.assembly ? 1 : 0;
  }
  EXPECT_GT(sound_ones, 40); // some edits hit a name or a comment, or the test has lost its teeth
}

} // namespace
} // namespace lightledger::assembly
