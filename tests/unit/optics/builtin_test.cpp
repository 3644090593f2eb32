#include <lightledger/optics/medium.hpp>

#include <gtest/gtest.h>
#include <yaml-cpp/yaml.h>

#include <algorithm>

namespace lightledger::optics {
namespace {

/// media.yaml as it stands, read without the build's tables.
YAML::Node media_yaml() {
  return YAML::LoadFile(LIGHTLEDGER_SOURCE_DIR "/src/optics/media.yaml");
}

std::vector<double> numbers(const YAML::Node& node) {
  return node.as<std::vector<double>>();
}

void expect_same(const YAML::Node& written, const Sellmeier& built) {
  EXPECT_EQ(built.A, written["A"].as<double>(1.0));
  EXPECT_EQ(built.B, numbers(written["B"]));
  EXPECT_EQ(built.C_um2, numbers(written["C_um2"]));
}

void expect_same(const YAML::Node& written, const IndexTable& built) {
  ASSERT_EQ(built.rows.size(), written.size());
  for (std::size_t i = 0; i < built.rows.size(); ++i) {
    const auto [wavelength, n, kappa] = built.rows[i];
    EXPECT_EQ((std::vector{wavelength, n, kappa}), numbers(written[i]));
  }
}

void expect_same(const YAML::Node& written, const InternalTransmittance& built) {
  EXPECT_EQ(built.thickness_mm, written["thickness_mm"].as<double>());
  ASSERT_EQ(built.rows.size(), written["table"].size());
  for (std::size_t i = 0; i < built.rows.size(); ++i) {
    const auto [wavelength, transmittance] = built.rows[i];
    EXPECT_EQ((std::vector{wavelength, transmittance}), numbers(written["table"][i]));
  }
}

void expect_same_dispersion(const YAML::Node& written, const Dispersion& built) {
  if (written["sellmeier"])
    expect_same(written["sellmeier"], std::get<Sellmeier>(built));
  else if (written["cauchy"])
    EXPECT_EQ(std::get<Cauchy>(built).A, numbers(written["cauchy"]["A"]));
  else
    expect_same(written["table"], std::get<IndexTable>(built));
}

void expect_same(const YAML::Node& written, const Medium& built) {
  expect_same_dispersion(written, built.dispersion);
  ASSERT_EQ(built.transmittance.has_value(), static_cast<bool>(written["internal_transmittance"]));
  if (built.transmittance)
    expect_same(written["internal_transmittance"], *built.transmittance);
  const Range stated{written["range_nm"][0].as<double>(), written["range_nm"][1].as<double>()};
  const Range known = stated.overlap(natural_range(built.dispersion, built.transmittance));
  EXPECT_EQ(built.range.from_nm, known.from_nm);
  EXPECT_EQ(built.range.to_nm, known.to_nm);
  EXPECT_EQ(built.source, written["source"].as<std::string>());
}

TEST(BuiltinMedia, AreThoseOfMediaYamlToTheLastDigit) {
  const YAML::Node written = media_yaml();
  for (const auto& medium : written) {
    const auto name = medium.first.as<std::string>();
    SCOPED_TRACE(name);
    const std::optional<Medium> built = builtin_medium(name);
    ASSERT_TRUE(built);
    EXPECT_EQ(built->name, name);
    expect_same(medium.second, *built);
  }
}

TEST(BuiltinMedia, AreNamedInTheOrderOfMediaYamlAfterAirAndVacuum) {
  std::vector<std::string> expected{"air", "vacuum"};
  for (const auto& medium : media_yaml())
    expected.push_back(medium.first.as<std::string>());
  const std::vector<std::string_view>& names = builtin_media();
  EXPECT_TRUE(std::ranges::equal(names, expected));
}

TEST(BuiltinMedia, HaveOneNameEach) {
  std::vector<std::string_view> names = builtin_media();
  std::ranges::sort(names);
  EXPECT_EQ(std::ranges::adjacent_find(names), names.end());
}

TEST(BuiltinMedia, HaveAnIndexAtBothEndsOfTheirRangeAndASource) {
  for (const std::string_view name : builtin_media()) {
    const Medium medium = builtin_medium(name).value();
    if (medium.range.from_nm > 0.0) {
      EXPECT_TRUE(index_at(medium, medium.range.from_nm)) << name;
      EXPECT_TRUE(index_at(medium, medium.range.to_nm)) << name;
    }
    EXPECT_FALSE(medium.source.empty()) << name;
  }
}

TEST(BuiltinMedia, HaveRowsInAscendingOrder) {
  const auto descends = [](const IndexTable::Row& row, const IndexTable::Row& next) {
    return row.wavelength_nm >= next.wavelength_nm;
  };
  for (const std::string_view name : builtin_media()) {
    const Medium medium = builtin_medium(name).value();
    if (const auto* table = std::get_if<IndexTable>(&medium.dispersion)) {
      EXPECT_EQ(std::ranges::adjacent_find(table->rows, descends), table->rows.end()) << name;
    }
  }
}

TEST(BuiltinMedia, HoldAirAndVacuumAtIndexOne) {
  for (const std::string_view name : {"air", "vacuum"}) {
    const Index index = index_at(builtin_medium(name).value(), 532.0).value();
    EXPECT_EQ(index.n, 1.0);
    EXPECT_EQ(index.kappa, 0.0);
  }
}

TEST(BuiltinMedia, AreFoundByTheirExactNameOnly) {
  EXPECT_TRUE(builtin_medium("MgF2-film"));
  EXPECT_FALSE(builtin_medium("mgf2-film"));
  EXPECT_FALSE(builtin_medium(""));
  EXPECT_FALSE(builtin_medium("bare"));
}

} // namespace
} // namespace lightledger::optics
