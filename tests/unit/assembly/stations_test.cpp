#include <lightledger/assembly/load.hpp>

#include <gtest/gtest.h>

#include <string>

namespace lightledger::assembly {
namespace {

Assembly train(const std::string& stations, const std::string& beam = "{radius: 5}") {
  const Loaded loaded = load_text("train.yaml", "coatings: {half: {ideal: {reflect: 0.5}}}\n"
                                                "light: {wavelengths: [532], beam: " +
                                                    beam + "}\ntrain:\n" + stations);
  EXPECT_EQ(loaded.report(), "");
  return loaded.assembly.value_or(Assembly{});
}

Surface only(const std::string& station) {
  const Assembly assembly = train("  - " + station + "\n  - {name: eye, does: detect}\n");
  return assembly.surfaces.empty() ? Surface{} : assembly.surfaces[0];
}

TEST(Elements, APolarizerPassesAllOfOneAxisUnlessSaid) {
  const auto effect = std::get<Polarizer>(only("{name: p, polarize: {axis: 1 rad}, gap: 1}").effect);
  EXPECT_DOUBLE_EQ(effect.axis_deg, 57.29577951308232);
  EXPECT_EQ(effect.pass, 1.0);
  EXPECT_EQ(effect.block, 0.0);
}

TEST(Elements, APolarizerReadsFractionsWithUnits) {
  const auto effect =
      std::get<Polarizer>(only("{name: p, polarize: {axis: 0, pass: 92 %, block: -40 dB}, gap: 1}").effect);
  EXPECT_EQ(effect.pass, 0.92);
  EXPECT_DOUBLE_EQ(effect.block, 1e-4);
}

TEST(Elements, ARetarderReadsWavesOrDegrees) {
  const auto waves =
      std::get<Retarder>(only("{name: q, retard: {axis: 45, waves: 0.25, at: 0.6 um}, gap: 1}").effect);
  EXPECT_EQ(waves.axis_deg, 45.0);
  EXPECT_EQ(waves.retardance_deg, 90.0);
  EXPECT_EQ(waves.at_nm, 600.0);
  const auto degrees =
      std::get<Retarder>(only("{name: q, retard: {axis: 45, degrees: -127}, gap: 1}").effect);
  EXPECT_EQ(degrees.retardance_deg, -127.0);
  EXPECT_FALSE(degrees.at_nm);
}

TEST(Elements, ARotatorIsActiveOrFaraday) {
  const auto active = std::get<Rotator>(only("{name: r, rotate: {angle: 30, kind: active}, gap: 1}").effect);
  EXPECT_EQ(active.angle_deg, 30.0);
  EXPECT_EQ(active.kind, Rotator::Kind::active);
  const auto faraday =
      std::get<Rotator>(only("{name: r, rotate: {angle: -45, kind: faraday}, gap: 1}").effect);
  EXPECT_EQ(faraday.kind, Rotator::Kind::faraday);
}

TEST(Elements, MayBeNamedByDoesAsWell) {
  const Assembly assembly = train("  - {name: q, does: retard, retard: {axis: 0, waves: 0.5}, gap: 1}\n"
                                  "  - {name: eye, does: detect}\n");
  EXPECT_STREQ(does(assembly, assembly.stations[0]), "retard");
  EXPECT_EQ(assembly.stations[0].intended, Act::pass);
}

TEST(Elements, ArePlanesInTheMediumOfTheLight) {
  const Assembly assembly = train("  - {name: front, into: water, gap: 1}\n"
                                  "  - {name: p, polarize: {axis: 0}, clear: {diameter: 8}, tilt: [1, 2, 3], "
                                  "shift: [4, 5], loss: 1 %, gap: 6,"
                                  " turn: [7, 8, 9]}\n"
                                  "  - {name: eye, does: detect}\n");
  const Surface& surface = assembly.surfaces[1];
  EXPECT_EQ(assembly.media[surface.before].name, "water");
  EXPECT_FALSE(surface.beyond);
  EXPECT_EQ(std::get<Clear::Disc>(surface.clear.opening).radius, 4.0);
  EXPECT_EQ(surface.tilt_deg[1], 2.0);
  EXPECT_EQ(surface.shift[1], 5.0);
  EXPECT_EQ(surface.loss, 0.01);
  EXPECT_EQ(std::get<double>(assembly.stations[1].gap), 6.0);
  EXPECT_EQ(assembly.stations[1].turn_deg[2], 9.0);
  EXPECT_EQ(assembly.media[assembly.surfaces[2].before].name, "water");
}

constexpr const char* mangin = "  - {name: front, radius: -80, into: fused-silica, gap: 3}\n"
                               "  - {name: rear, does: reflect, radius: -120, backing: Ag}\n"
                               "  - {again: front, into: air, gap: 40, turn: [0, 5, 0]}\n"
                               "  - {name: eye, does: detect}\n";

TEST(Again, IsAnotherVisitToTheSameSurface) {
  const Assembly assembly = train(mangin);
  ASSERT_EQ(assembly.surfaces.size(), 3U);
  ASSERT_EQ(assembly.stations.size(), 4U);
  const Station& again = assembly.stations[2];
  EXPECT_EQ(again.name, "front again");
  EXPECT_EQ(again.surface, assembly.stations[0].surface);
  EXPECT_EQ(again.intended, Act::pass);
  EXPECT_EQ(std::get<double>(again.gap), 40.0);
  EXPECT_EQ(again.turn_deg[1], 5.0);
  EXPECT_EQ(assembly.stations[3].surface, 2U);
  EXPECT_EQ(assembly.media[assembly.surfaces[2].before].name, "air");
}

TEST(Again, DecidesTheGapBeforeIt) {
  const Assembly assembly = train(mangin);
  EXPECT_TRUE(std::holds_alternative<UpToSurface>(assembly.stations[1].gap));
}

TEST(Again, MayNameAnEarlierVisit) {
  const Assembly assembly = train("  - {name: pane, into: water, gap: 3}\n"
                                  "  - {name: fold, does: reflect, backing: Ag}\n"
                                  "  - {again: pane, does: reflect, name: glint}\n"
                                  "  - {again: fold, does: reflect}\n"
                                  "  - {again: glint, into: air, gap: 1}\n"
                                  "  - {name: eye, does: detect}\n");
  ASSERT_EQ(assembly.stations.size(), 6U);
  EXPECT_EQ(assembly.stations[2].intended, Act::bounce);
  EXPECT_EQ(assembly.stations[4].name, "glint again");
  EXPECT_EQ(assembly.stations[4].surface, 0U);
}

TEST(Again, GoesThroughAMirrorIntoItsBacking) {
  const Assembly assembly = train("  - {name: splitter, does: reflect, coating: half, backing: air, gap: 5}\n"
                                  "  - {name: end, does: reflect, backing: Ag}\n"
                                  "  - {again: splitter, into: air, gap: 5}\n"
                                  "  - {name: eye, does: detect}\n");
  ASSERT_EQ(assembly.stations.size(), 4U);
  EXPECT_EQ(assembly.stations[2].surface, 0U);
  EXPECT_STREQ(does(assembly, assembly.stations[2]), "refract");
}

TEST(Again, HasAnAddressUnderTheNameThatItIsGiven) {
  const Loaded loaded =
      load_text("f", std::string("light: {wavelengths: [532], beam: {radius: 5}}\ntrain:\n") + mangin,
                {{"front again.gap", "41"}, {"front.gap", "4"}});
  ASSERT_EQ(loaded.report(), "");
  EXPECT_EQ(std::get<double>(loaded.assembly->stations[2].gap), 41.0);
  EXPECT_EQ(std::get<double>(loaded.assembly->stations[0].gap), 4.0);
}

TEST(FillStop, LeavesTheBeamToTheStop) {
  const Assembly assembly = train("  - {name: pupil, does: stop, clear: {ellipse: [4, 3]}, gap: 1}\n"
                                  "  - {name: open, does: stop, gap: 1}\n"
                                  "  - {name: eye, does: detect}\n",
                                  "fill_stop");
  EXPECT_TRUE(assembly.light.beam.fill_stop);
  EXPECT_FALSE(train("  - {name: eye, does: detect}\n").light.beam.fill_stop);
}

const std::string splitter =
    "  - {name: fold, does: reflect, tilt: [45, 0, 0], backing: fused-silica, coating: half, "
    "clear: {diameter: 20}, rear: {thickness: 0.5 in, wedge: [0, 30 arcmin]}, gap: 5}\n"
    "  - {name: eye, does: detect}\n";

TEST(Rear, IsASurfaceOfItsOwnThatNoStationVisits) {
  const Assembly assembly = train(splitter);
  ASSERT_EQ(assembly.surfaces.size(), 3U);
  ASSERT_EQ(assembly.stations.size(), 2U);
  const auto& rear = assembly.surfaces[assembly.stations[0].surface].rear;
  ASSERT_TRUE(rear);
  EXPECT_EQ(rear->surface, 1U);
  EXPECT_EQ(assembly.stations[1].surface, 2U);
  EXPECT_DOUBLE_EQ(rear->thickness, 12.7);
  EXPECT_EQ(rear->wedge_deg, (std::array<double, 2>{0.0, 0.5}));
}

TEST(Rear, LiesBetweenThePlateAndWhatIsBeforeIt) {
  const Assembly assembly = train(splitter);
  const Surface& face = assembly.surfaces.at(1);
  EXPECT_EQ(assembly.media[face.before].name, "fused-silica");
  ASSERT_TRUE(face.beyond);
  EXPECT_EQ(assembly.media[*face.beyond].name, "air");
  EXPECT_TRUE(std::holds_alternative<Plane>(face.shape));
  EXPECT_FALSE(face.coating);
}

TEST(Rear, HasTheClearAreaOfTheFront) {
  const Assembly assembly = train(splitter);
  ASSERT_TRUE(std::holds_alternative<Clear::Disc>(assembly.surfaces.at(1).clear.opening));
  EXPECT_EQ(std::get<Clear::Disc>(assembly.surfaces[1].clear.opening).radius, 10.0);
}

TEST(Rear, HasLayersThatStandOnThePlate) {
  const Loaded loaded =
      load_text("train.yaml", "coatings: {ar: {layers: [{medium: SiO2, thickness: 90}]}}\n"
                              "light: {wavelengths: [532], beam: {radius: 5}}\ntrain:\n"
                              "  - {name: fold, does: reflect, tilt: [45, 0, 0], backing: fused-silica, "
                              "rear: {thickness: 2, coating: ar}, gap: 5}\n"
                              "  - {name: eye, does: detect}\n");
  ASSERT_EQ(loaded.report(), "");
  ASSERT_TRUE(loaded.assembly->surfaces[1].coating);
  EXPECT_EQ(loaded.assembly->surfaces[1].coating->substrate, Side::before);
}

TEST(Rear, HasAnAddress) {
  const Loaded loaded = load_text("train.yaml",
                                  "coatings: {half: {ideal: {reflect: 0.5}}}\n"
                                  "light: {wavelengths: [532], beam: {radius: 5}}\ntrain:\n" +
                                      splitter,
                                  {{"fold.rear.thickness", "4"}, {"fold.rear.wedge[0]", "2"}});
  ASSERT_EQ(loaded.report(), "");
  const auto& rear = loaded.assembly->surfaces[0].rear;
  EXPECT_EQ(rear->thickness, 4.0);
  EXPECT_EQ(rear->wedge_deg, (std::array<double, 2>{2.0, 0.5}));
}

} // namespace
} // namespace lightledger::assembly
