#include <lightledger/analysis/medium_table.hpp>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lightledger::analysis {
namespace {

using testing::HasSubstr;

TEST(MediumTable, ListsAllBuiltInMediaAirFirst) {
  const auto media = medium_table(std::nullopt, {}).media;
  ASSERT_TRUE(media);
  EXPECT_EQ(media->size(), optics::builtin_media().size());
  EXPECT_EQ(media->at(0).name, "air");
  EXPECT_EQ(media->at(0).index_587, 1.0);
  EXPECT_TRUE(media->at(0).rows.empty());
}

// Malitson (1965) gives n = 1.45846 for fused silica at the helium d line.
TEST(MediumTable, GivesTheIndexAtTheHeliumLine) {
  const auto media = medium_table("fused-silica", {}).media;
  ASSERT_TRUE(media);
  ASSERT_EQ(media->size(), 1U);
  EXPECT_NEAR(media->front().index_587.value_or(0.0), 1.45846, 5e-6);
  EXPECT_EQ(media->front().range.from_nm, 210.0);
}

TEST(MediumTable, HasNoIndexAtTheHeliumLineWhereThatIsOutsideTheRange) {
  const auto media = medium_table("Ge", {}).media;
  ASSERT_TRUE(media);
  EXPECT_EQ(media->front().index_587, std::nullopt);
}

TEST(MediumTable, HasARowAWavelength) {
  const auto media = medium_table("fused-silica", {400.0, 700.0}).media;
  ASSERT_TRUE(media);
  ASSERT_EQ(media->front().rows.size(), 2U);
  EXPECT_EQ(media->front().rows[1].wavelength_nm, 700.0);
  EXPECT_NEAR(media->front().rows[1].index->n, 1.45529, 5e-6);
}

TEST(MediumTable, RefusesANamedMediumOutsideItsRange) {
  const auto result = medium_table("fused-silica", {400.0, 100.0});
  EXPECT_FALSE(result.media);
  EXPECT_THAT(assembly::describe(result.faults, "lightledger", ""),
              HasSubstr("fused-silica is known from 210 to 3710 nm, not at 100 nm"));
}

TEST(MediumTable, LeavesTheIndexEmptyOutsideTheRangeInTheListOfAll) {
  const auto media = medium_table(std::nullopt, {100.0}).media;
  ASSERT_TRUE(media);
  const auto silica = std::ranges::find(*media, "fused-silica", &MediumEntry::name);
  ASSERT_EQ(silica->rows.size(), 1U);
  EXPECT_FALSE(silica->rows[0].index);
}

TEST(MediumTable, RefusesAnUnknownNameWithTheNearest) {
  const auto result = medium_table("fused-silca", {});
  EXPECT_THAT(assembly::describe(result.faults, "lightledger", ""),
              HasSubstr("did you mean 'fused-silica'?"));
}

} // namespace
} // namespace lightledger::analysis
