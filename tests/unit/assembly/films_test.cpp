#include <lightledger/assembly/films.hpp>
#include <lightledger/assembly/load.hpp>

#include <gtest/gtest.h>

namespace lightledger::assembly {
namespace {

Assembly with_coating() {
  const Loaded loaded = load_text("f", R"(
media: {resin: {index: 1.6, kappa: 1e-5}, narrow: {index: 2, range_nm: [500, 600]}}
coatings:
  pair: {layers: [{medium: resin, waves: 0.25, at: 640}, {medium: narrow, thickness: 80}]}
  far: {layers: [{medium: resin, thickness: 5}, {medium: narrow, waves: 0.25, at: 700}]}
light: {wavelengths: [532], beam: {radius: 5}}
train: [{name: eye, does: detect}]
)");
  EXPECT_EQ(loaded.report(), "");
  return *loaded.assembly;
}

const Layers& layers(const Assembly& assembly, std::string_view name) {
  return std::get<Layers>(assembly.coatings[*coating_named(assembly, name)].kind);
}

TEST(Films, BecomeIndicesAndThicknessesFromTheSubstrateOutward) {
  const Assembly assembly = with_coating();
  const auto films = optical_layers(assembly, layers(assembly, "pair"), 532.0);
  ASSERT_EQ(films.size(), 2U);
  EXPECT_EQ(films[0].index, optics::Complex(1.6, 1e-5));
  EXPECT_DOUBLE_EQ(films[0].thickness_nm, 0.25 * 640.0 / 1.6);
  EXPECT_EQ(films[1].index, optics::Complex(2.0, 0.0));
  EXPECT_EQ(films[1].thickness_nm, 80.0);
}

TEST(Films, SayWhichLayerIsNotKnown) {
  const Assembly assembly = with_coating();
  EXPECT_FALSE(unknown_layer(assembly, layers(assembly, "pair"), 532.0));
  const auto beyond = unknown_layer(assembly, layers(assembly, "pair"), 650.0);
  ASSERT_TRUE(beyond);
  EXPECT_EQ(beyond->message, "narrow is known from 500 to 600 nm, not at 650 nm");
  EXPECT_EQ(beyond->mark.line, 4);
  EXPECT_EQ(unknown_layer(assembly, layers(assembly, "far"), 532.0)->message,
            "narrow is known from 500 to 600 nm, not at 700 nm");
}

TEST(Films, FindMediaOfTheFileBeforeBuiltInOnes) {
  const Assembly assembly = with_coating();
  EXPECT_EQ(std::get<optics::ConstantIndex>(medium_named(assembly, "resin")->dispersion).n, 1.6);
  EXPECT_EQ(medium_named(assembly, "fused-silica")->name, "fused-silica");
  EXPECT_FALSE(medium_named(assembly, "Resin"));
  EXPECT_FALSE(coating_named(assembly, "bare"));
}

TEST(KnownRange, ReadsAsTheBeginningOfASentence) {
  const Assembly assembly = with_coating();
  EXPECT_EQ(known_range(*medium_named(assembly, "narrow")), "narrow is known from 500 to 600 nm");
  EXPECT_EQ(known_range({"oil", optics::Cauchy{{1.5}}, {}, {}, {}}), "oil is known where its formula holds");
}

} // namespace
} // namespace lightledger::assembly
