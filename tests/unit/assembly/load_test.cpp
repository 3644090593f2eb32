#include <lightledger/assembly/load.hpp>

#include <gtest/gtest.h>

#include <cmath>
#include <cstdio>
#include <filesystem>
#include <fstream>
#include <limits>
#include <string>

namespace lightledger::assembly {
namespace {

constexpr const char* receiver = R"(title: Fog-bank lidar receiver
light:
  wavelengths: [{at: 532, weight: 2}, 0.633 um]
  polarization: {linear: 30}
  object: {distance: 1.2 m}
  fields: [[0, 0], {at: [0, 4], weight: 3, name: edge}]
  beam: {gaussian: 6, radius: 12.5, inner: 3, at: [1, 2]}
  rays: {pattern: rings, rings: 8, spokes: 24}
  medium: water
media:
  resin: {index: 1.49, kappa: 2.0e-8}
  oil: {sellmeier: {A: 1.1, B: [0.9, 0.2], C_um2: [0.01, 100]}, range_nm: [400, 700], source: invented}
  ink: {table: [[400, 1.4, 0.1], [700, 1.5, 0.2]]}
  gel: {cauchy: {A: [1.4, 0.003]}, internal_transmittance: {thickness_mm: 10, table: [[450, 0.9], [800, 99 %]]}}
coatings:
  hard_ar:
    layers:
      - {medium: Al2O3, waves: 0.25, at: 532}
      - {medium: resin, thickness: 0.1 um}
  mirror: {layers: [{repeat: 2, layers: [{medium: TiO2, waves: 0.25, at: 532}, {repeat: 2, layers: [{medium: SiO2, thickness: 90}]}]}]}
  neutral: {ideal: {reflect: {s: 0.1, p: 5 %}, transmit: -3 dB}}
train:
  - {name: window, into: fused-silica, coating: {use: hard_ar, substrate: after}, clear: {diameter: 1 in}, gap: 4}
  - {name: lens, radius: -41.2, conic: -0.4, asphere: {A4: 1.0e-6, A20: 1e-30}, into: air, roughness: 2, loss: 1 %, gap: focus}
  - {name: fold, does: reflect, tilt: [45, 12 mrad, 0], turn: [0, 90, 0], shift: [1, -2], backing: Al, coating: mirror,
     clear: {width: 40, height: 30, hole: {diameter: 6}, at: [0, 1]}, gap: 20}
  - {name: stop, does: stop, clear: {ellipse: [10, 8]}, gap: 0}
  - {name: beam splitter, radius: 100, conic: 0, into: resin, coating: neutral, clear: {hole: {radius: 2}}, gap: 1}
  - {name: sensor, does: detect, clear: {width: 8, height: 6}, pixels: [800, 600], reflectance: 0.05}
requirements:
  - {quantity: delivered, at_least: 80 %}
  - {quantity: budget.stations.fold.incidence_deg.max, at_most: 50}
)";

const Assembly& loaded_receiver() {
  static const Loaded loaded = load_text("receiver.yaml", receiver);
  EXPECT_EQ(loaded.report(), "");
  return *loaded.assembly;
}

const Surface& surface(std::size_t station) {
  return loaded_receiver().surfaces[loaded_receiver().stations[station].surface];
}

std::string medium(MediumId id) {
  return loaded_receiver().media[id].name;
}

TEST(Load, ReadsTheLight) {
  const Light& light = loaded_receiver().light;
  ASSERT_EQ(light.wavelengths.size(), 2U);
  EXPECT_EQ(light.wavelengths[0].nm, 532.0);
  EXPECT_EQ(light.wavelengths[0].weight, 2.0);
  EXPECT_EQ(light.wavelengths[1].nm, 633.0);
  EXPECT_EQ(light.wavelengths[1].weight, 1.0);
  EXPECT_DOUBLE_EQ(light.polarization.s1, 0.5);
  EXPECT_DOUBLE_EQ(light.polarization.s2, std::sqrt(0.75));
  EXPECT_EQ(light.object_distance, 1200.0);
  EXPECT_EQ(medium(light.medium), "water");
}

TEST(Load, ReadsFieldsBeamAndRays) {
  const Light& light = loaded_receiver().light;
  ASSERT_EQ(light.fields.size(), 2U);
  EXPECT_FALSE(light.fields[0].name);
  EXPECT_EQ(light.fields[1].name, "edge");
  EXPECT_EQ(light.fields[1].at[1], 4.0);
  EXPECT_EQ(light.fields[1].weight, 3.0);
  EXPECT_EQ(light.beam.radius, 12.5);
  EXPECT_EQ(light.beam.gaussian, 6.0);
  EXPECT_EQ(light.beam.inner, 3.0);
  EXPECT_EQ(light.beam.at[1], 2.0);
  EXPECT_EQ(std::get<Rings>(light.sampling).rings, 8U);
  EXPECT_EQ(std::get<Rings>(light.sampling).spokes, 24U);
}

TEST(Load, ReadsEveryFormOfMedium) {
  const auto& media = loaded_receiver().media;
  EXPECT_EQ(media[0].name, "resin");
  EXPECT_EQ(std::get<optics::ConstantIndex>(media[0].dispersion).kappa, 2e-8);
  EXPECT_EQ(std::get<optics::Sellmeier>(media[1].dispersion).A, 1.1);
  EXPECT_EQ(std::get<optics::Sellmeier>(media[1].dispersion).C_um2[1], 100.0);
  EXPECT_EQ(media[1].range.from_nm, 400.0);
  EXPECT_EQ(media[1].source, "invented");
  EXPECT_EQ(std::get<optics::IndexTable>(media[2].dispersion).rows[1].kappa, 0.2);
  EXPECT_EQ(media[2].range.to_nm, 700.0);
  EXPECT_EQ(std::get<optics::Cauchy>(media[3].dispersion).A[1], 0.003);
  EXPECT_EQ(media[3].transmittance->rows[1].transmittance, 0.99);
  EXPECT_EQ(media[3].range.from_nm, 450.0);
}

TEST(Load, WritesRepeatedLayersOut) {
  const auto& films = std::get<Layers>(loaded_receiver().coatings[1].kind).films;
  ASSERT_EQ(films.size(), 6U);
  EXPECT_EQ(medium(films[0].medium), "TiO2");
  EXPECT_EQ(std::get<Film::Waves>(films[0].thickness).waves, 0.25);
  EXPECT_EQ(std::get<double>(films[2].thickness), 90.0);
  EXPECT_EQ(medium(films[3].medium), "TiO2");
  EXPECT_EQ(films[5].address, "coatings.mirror.layers[0].layers[1].layers[0]");
}

TEST(Load, GivesLayersAnAddressThatLeadsBack) {
  const Assembly& assembly = loaded_receiver();
  const auto& film = std::get<Layers>(assembly.coatings[0].kind).films[1];
  EXPECT_EQ(std::get<double>(film.thickness), 100.0);
  EXPECT_EQ(assembly.document->locate(film.address).line, 19);
}

TEST(Load, ReadsAnIdealCoating) {
  const Ideal& ideal = std::get<Ideal>(loaded_receiver().coatings[2].kind);
  EXPECT_EQ(ideal.s.reflect, 0.1);
  EXPECT_EQ(ideal.p.reflect, 0.05);
  EXPECT_DOUBLE_EQ(ideal.s.transmit, std::pow(10.0, -0.3));
}

TEST(Load, FollowsTheMediumAlongTheTrain) {
  EXPECT_EQ(medium(surface(0).before), "water");
  EXPECT_EQ(medium(*surface(0).beyond), "fused-silica");
  EXPECT_EQ(medium(surface(1).before), "fused-silica");
  EXPECT_EQ(medium(surface(2).before), "air");
  EXPECT_EQ(medium(*surface(2).beyond), "Al");
  EXPECT_EQ(medium(surface(3).before), "air");
  EXPECT_FALSE(surface(3).beyond);
  EXPECT_EQ(medium(surface(5).before), "resin");
}

TEST(Load, ReadsShapes) {
  EXPECT_TRUE(std::holds_alternative<Plane>(surface(0).shape));
  const Asphere& asphere = std::get<Asphere>(surface(1).shape);
  EXPECT_EQ(asphere.radius, -41.2);
  EXPECT_EQ(asphere.conic, -0.4);
  EXPECT_EQ(asphere.terms[1], 1e-6);
  EXPECT_EQ(asphere.terms[17], 1e-30);
  EXPECT_EQ(std::get<Sphere>(surface(4).shape).radius, 100.0);
}

TEST(Load, ReadsClearAreasAsHalfLengths) {
  EXPECT_DOUBLE_EQ(std::get<Clear::Disc>(surface(0).clear.opening).radius, 12.7);
  EXPECT_EQ(std::get<Clear::Rectangle>(surface(2).clear.opening).half_width, 20.0);
  EXPECT_EQ(surface(2).clear.hole_radius, 3.0);
  EXPECT_EQ(surface(2).clear.at[1], 1.0);
  EXPECT_EQ(std::get<Clear::Ellipse>(surface(3).clear.opening).semi_y, 4.0);
  EXPECT_TRUE(std::holds_alternative<Clear::Unlimited>(surface(4).clear.opening));
  EXPECT_EQ(surface(4).clear.hole_radius, 2.0);
}

TEST(Load, ReadsPlaceAndFinishOfAStation) {
  const Station& fold = loaded_receiver().stations[2];
  EXPECT_EQ(fold.intended, Act::bounce);
  EXPECT_EQ(fold.turn_deg[1], 90.0);
  EXPECT_DOUBLE_EQ(surface(2).tilt_deg[1], 0.012 * 180.0 / 3.14159265358979323846);
  EXPECT_EQ(surface(2).shift[1], -2.0);
  EXPECT_TRUE(std::holds_alternative<Focus>(loaded_receiver().stations[1].gap));
  EXPECT_EQ(std::get<double>(fold.gap), 20.0);
  EXPECT_EQ(surface(1).roughness_nm, 2.0);
  EXPECT_EQ(surface(1).loss, 0.01);
}

TEST(Load, ReadsTheDetector) {
  const Sensor& sensor = std::get<Sensor>(surface(5).effect);
  EXPECT_EQ((*sensor.pixels)[0], 800U);
  EXPECT_EQ(sensor.reflectance, 0.05);
  EXPECT_EQ(loaded_receiver().stations[5].intended, Act::detect);
}

TEST(Load, PutsLayersOnTheSideThatIsNoGas) {
  EXPECT_EQ(surface(0).coating->substrate, Side::beyond);
  EXPECT_EQ(surface(2).coating->substrate, Side::beyond);
  const Loaded loaded = load_text("f", R"(
coatings: {ar: {layers: [{medium: SiO2, thickness: 90}]}}
light: {wavelengths: [532], beam: {radius: 5}}
train:
  - {name: front, into: fused-silica, coating: ar, gap: 1}
  - {name: rear, into: air, coating: ar, gap: 1}
  - {name: inner, into: vacuum, coating: {use: ar, substrate: before}, gap: 1}
  - {name: eye, does: detect}
)");
  ASSERT_EQ(loaded.report(), "");
  EXPECT_EQ(loaded.assembly->surfaces[0].coating->substrate, Side::beyond);
  EXPECT_EQ(loaded.assembly->surfaces[1].coating->substrate, Side::before);
  EXPECT_EQ(loaded.assembly->surfaces[2].coating->substrate, Side::before);
}

TEST(Load, ReadsRequirements) {
  const auto& requirements = loaded_receiver().requirements;
  ASSERT_EQ(requirements.size(), 2U);
  EXPECT_EQ(requirements[0].quantity, "delivered");
  EXPECT_EQ(requirements[0].sense, Sense::at_least);
  EXPECT_EQ(requirements[0].limit, 0.8);
  EXPECT_EQ(requirements[1].sense, Sense::at_most);
  EXPECT_EQ(requirements[1].limit, 50.0);
}

TEST(Load, FillsInWhatMayBeLeftOut) {
  const Loaded loaded = load(std::filesystem::path(LIGHTLEDGER_SOURCE_DIR) / "systems/minimal.yaml");
  ASSERT_EQ(loaded.report(), "");
  const Light& light = loaded.assembly->light;
  EXPECT_EQ(light.polarization.s1, 0.0);
  EXPECT_FALSE(light.object_distance);
  ASSERT_EQ(light.fields.size(), 1U);
  EXPECT_EQ(light.fields[0].at[0], 0.0);
  EXPECT_EQ(std::get<ToAccuracy>(light.sampling).standard_error, 1e-4);
  EXPECT_EQ(loaded.assembly->media[light.medium].name, "air");
  EXPECT_EQ(loaded.assembly->stations.size(), 3U);
}

TEST(Load, SpreadsWavelengthsEvenlyWithBothEnds) {
  const Loaded loaded = load_text("f", receiver, {{"light.wavelengths", "{from: 480, to: 660, count: 9}"}});
  ASSERT_EQ(loaded.report(), "");
  const auto& wavelengths = loaded.assembly->light.wavelengths;
  ASSERT_EQ(wavelengths.size(), 9U);
  EXPECT_EQ(wavelengths.front().nm, 480.0);
  EXPECT_DOUBLE_EQ(wavelengths[1].nm, 502.5);
  EXPECT_EQ(wavelengths.back().nm, 660.0);
}

struct Polarization {
  const char* text;
  double s1, s2, s3;
};

class LoadPolarization : public testing::TestWithParam<Polarization> {};

TEST_P(LoadPolarization, IsAStateOfUnitPower) {
  const auto& [text, s1, s2, s3] = GetParam();
  const Loaded loaded = load_text("f", receiver, {{"light.polarization", text}});
  ASSERT_EQ(loaded.report(), "");
  EXPECT_NEAR(loaded.assembly->light.polarization.s1, s1, 1e-15);
  EXPECT_NEAR(loaded.assembly->light.polarization.s2, s2, 1e-15);
  EXPECT_NEAR(loaded.assembly->light.polarization.s3, s3, 1e-15);
}

INSTANTIATE_TEST_SUITE_P(Forms, LoadPolarization,
                         testing::Values(Polarization{"unpolarized", 0, 0, 0},
                                         Polarization{"{linear: 45}", 0, 1, 0},
                                         Polarization{"{circular: right}", 0, 0, 1},
                                         Polarization{"{circular: left}", 0, 0, -1},
                                         Polarization{"{ellipse: {azimuth: 0, ellipticity: -22.5}}",
                                                      std::sqrt(0.5), 0, -std::sqrt(0.5)},
                                         Polarization{"{stokes: [2, 0, 0.5, -1]}", 0, 0.25, -0.5},
                                         Polarization{"{stokes: [1e308, 1e308, 0, 0]}", 1, 0, 0}));

struct Sample {
  const char* text;
  double millimetres;
};

class LoadQuantity : public testing::TestWithParam<Sample> {};

TEST_P(LoadQuantity, IsConvertedToTheUnitOfItsPlace) {
  const Loaded loaded = load_text("f", receiver, {{"fold.gap", GetParam().text}});
  ASSERT_EQ(loaded.report(), "");
  EXPECT_DOUBLE_EQ(std::get<double>(loaded.assembly->stations[2].gap), GetParam().millimetres);
}

INSTANTIATE_TEST_SUITE_P(Lengths, LoadQuantity,
                         testing::Values(Sample{"1e-6", 1e-6}, Sample{"+.5", 0.5}, Sample{"5.", 5.0},
                                         Sample{"0x1F", 31}, Sample{"0o17", 15}, Sample{"010", 10},
                                         Sample{"0.5 in", 12.7}, Sample{"'0.5 in'", 12.7}, Sample{"3mm", 3},
                                         Sample{"2 cm", 20}, Sample{"0.1 m", 100}, Sample{"5 um", 0.005},
                                         Sample{"532 nm", 532e-6}, Sample{"1e-400", 0},
                                         Sample{"4.9e-324", 4.9e-324}));

TEST(LoadQuantity, KnowsAnglesInAllUnits) {
  const Loaded loaded =
      load_text("f", receiver,
                {{"fold.tilt", "[180 deg, 60 arcmin, 3600 arcsec]"}, {"fold.turn", "[1 rad, 1000 mrad, 0]"}});
  ASSERT_EQ(loaded.report(), "");
  EXPECT_EQ(loaded.assembly->surfaces[2].tilt_deg, (std::array<double, 3>{180, 1, 1}));
  EXPECT_DOUBLE_EQ(loaded.assembly->stations[2].turn_deg[0], 57.295779513082321);
  EXPECT_DOUBLE_EQ(loaded.assembly->stations[2].turn_deg[1], 57.295779513082321);
}

TEST(Load, AppliesChangesInTheirOrder) {
  const Loaded loaded = load_text("f", receiver, {{"fold.tilt", "[44, 0, 0]"}, {"fold.tilt[1]", "2"}});
  ASSERT_EQ(loaded.report(), "");
  EXPECT_EQ(loaded.assembly->surfaces[2].tilt_deg, (std::array<double, 3>{44, 2, 0}));
}

TEST(Load, ReportsAFaultInAChangeAtTheChange) {
  EXPECT_EQ(load_text("f", receiver, {{"fold.tilt", "[44, 0, 3 mm]"}}).report(),
            "--set  'tilt' is a length in mm; wanted is an angle\n    fold.tilt=[44, 0, 3 mm]\n"
            "                      ^\n"
            "    accepted: an angle: a number in degrees, or one with a unit (deg rad mrad arcmin arcsec)\n");
}

TEST(Load, ChecksARangeOnlyWhereAMediumIsUsed) {
  const Loaded loaded = load_text("f", receiver, {{"light.wavelengths", "[690, 760]"}});
  EXPECT_EQ(loaded.report(), ""); // oil and ink end at 700 nm, but nothing is made of them
}

TEST(Load, LetsAnUnusedCoatingBeOutOfRange) {
  const Loaded loaded =
      load_text("f", receiver, {{"coatings.unused", "{layers: [{medium: oil, waves: 1, at: 9000}]}"}});
  EXPECT_EQ(loaded.report(), "");
}

TEST(Load, ConcludesNothingFromAFault) {
  const Loaded loaded = load_text("f", R"(
coatings: {ar: {layers: [{medium: SiO2, thickness: 90}]}, bad: {layers: [{medium: nothing, thickness: 90}]}}
light: {wavelengths: [532], beam: {radius: 5}}
train:
  - {name: front, into: fused-silca, coating: ar, gap: 1}
  - {name: rear, into: air, coating: ar, gap: 1}
  - {name: mirror, does: reflect, coating: bad, gap: 1}
  - {name: eye, does: detect}
)");
  ASSERT_EQ(loaded.faults.count(), 2U);
  EXPECT_EQ(loaded.faults.kept()[0].message, "no medium is called 'nothing'");
  EXPECT_EQ(loaded.faults.kept()[1].message, "no medium is called 'fused-silca'");
}

TEST(Load, SaysWhyAFileCannotBeHad) {
  const std::filesystem::path folder = testing::TempDir();
  EXPECT_EQ(load(folder).report(), folder.string() + "  this is a folder\n    accepted: a YAML file\n");
  EXPECT_EQ(load("no/such.yaml").report(), "no/such.yaml  there is no such file\n");
  EXPECT_EQ(load("/proc/self/mem").report(),
            "/proc/self/mem  the file cannot be read\n    accepted: a file that you may read\n");
}

TEST(Load, RefusesWhatIsFarTooLarge) {
  EXPECT_EQ(load("/dev/zero").report(),
            "/dev/zero  the file is larger than 10 MB\n    accepted: an assembly, which is far smaller\n");
}

} // namespace
} // namespace lightledger::assembly
