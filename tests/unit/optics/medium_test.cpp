#include <lightledger/optics/medium.hpp>

#include <gtest/gtest.h>

#include <cmath>
#include <numbers>

namespace lightledger::optics {
namespace {

Medium of(Dispersion dispersion, std::optional<InternalTransmittance> transmittance = {}, Range range = {}) {
  return {"test", std::move(dispersion), std::move(transmittance), range, "here"};
}

double n_at(const Medium& medium, double wavelength_nm) {
  return index_at(medium, wavelength_nm).value().n;
}

const IndexTable table{{{500.0, 1.50, 0.0}, {600.0, 1.40, 0.2}, {800.0, 1.60, 0.1}}};
const InternalTransmittance glass{10.0, {{400.0, 0.5}, {500.0, 0.8}, {700.0, 1.0}}};

TEST(Medium, OfConstantIndexIsTheSameEverywhere) {
  const Medium medium = of(ConstantIndex{1.49, 2e-8});
  EXPECT_EQ(n_at(medium, 1.0), 1.49);
  EXPECT_EQ(index_at(medium, 1e5)->kappa, 2e-8);
}

TEST(Medium, FollowsSellmeiersFormulaInMicrometres) {
  const Medium medium = of(Sellmeier{1.2, {0.5, 0.3}, {0.01, 4.0}});
  EXPECT_DOUBLE_EQ(n_at(medium, 1000.0), std::sqrt(1.2 + 0.5 / (1.0 - 0.01) + 0.3 / (1.0 - 4.0)));
}

TEST(Medium, FollowsCauchysFormulaInMicrometres) {
  const Medium medium = of(Cauchy{{1.875, 0.00628, 0.00058}});
  EXPECT_DOUBLE_EQ(n_at(medium, 500.0), 1.875 + 0.00628 * 4.0 + 0.00058 * 16.0);
}

TEST(Medium, GivesTheRowsOfItsTableExactly) {
  const Medium medium = of(table);
  for (const IndexTable::Row& row : table.rows) {
    EXPECT_EQ(index_at(medium, row.wavelength_nm)->n, row.n);
    EXPECT_EQ(index_at(medium, row.wavelength_nm)->kappa, row.kappa);
  }
}

TEST(Medium, IsLinearInWavelengthBetweenRows) {
  const Index index = index_at(of(table), 650.0).value();
  EXPECT_DOUBLE_EQ(index.n, 1.45);
  EXPECT_DOUBLE_EQ(index.kappa, 0.175);
}

TEST(Medium, KnowsATableOfOneRowAtThatWavelength) {
  const Medium medium = of(IndexTable{{{633.0, 1.5, 0.1}}});
  EXPECT_EQ(n_at(medium, 633.0), 1.5);
  EXPECT_FALSE(index_at(medium, 633.1));
}

TEST(Medium, AttenuatesByItsInternalTransmittance) {
  const Medium medium = of(ConstantIndex{1.5}, glass);
  const double kappa = index_at(medium, 500.0)->kappa;
  const double thickness_nm = 1e7;
  EXPECT_NEAR(std::exp(-4.0 * std::numbers::pi * kappa * thickness_nm / 500.0), 0.8, 1e-14);
}

TEST(Medium, IsLinearInTheLogarithmOfTransmittance) {
  const Medium medium = of(ConstantIndex{1.5}, glass);
  const double kappa = index_at(medium, 450.0)->kappa;
  EXPECT_NEAR(std::exp(-4.0 * std::numbers::pi * kappa * 1e7 / 450.0), std::sqrt(0.5 * 0.8), 1e-14);
}

TEST(Medium, OfFullTransmittanceHasNoKappa) {
  const double kappa = index_at(of(ConstantIndex{1.5}, glass), 700.0)->kappa;
  EXPECT_EQ(kappa, 0.0);
  EXPECT_FALSE(std::signbit(kappa));
}

TEST(Medium, IsKnownUpToBothEndsOfItsRange) {
  const Medium medium = of(ConstantIndex{1.5}, {}, {400.0, 700.0});
  EXPECT_TRUE(index_at(medium, 400.0));
  EXPECT_TRUE(index_at(medium, 700.0));
  EXPECT_FALSE(index_at(medium, std::nextafter(400.0, 0.0)));
  EXPECT_FALSE(index_at(medium, std::nextafter(700.0, 1e3)));
}

TEST(Medium, IsNotKnownBeyondItsRowsWhateverItsRangeSays) {
  const Medium medium = of(table, {}, {100.0, 2000.0});
  EXPECT_FALSE(index_at(medium, 499.0));
  EXPECT_FALSE(index_at(medium, 801.0));
}

TEST(Medium, HasNoIndexWhereItsFormulaGivesNone) {
  EXPECT_FALSE(index_at(of(Sellmeier{1.0, {1.0}, {0.25}}), 400.0)); // n² = 1 − 16/9
  EXPECT_FALSE(index_at(of(Sellmeier{1.0, {1.0}, {0.25}}), 500.0)); // on the resonance
  EXPECT_FALSE(index_at(of(Cauchy{{-1.0}}), 500.0));
  EXPECT_FALSE(index_at(of(Cauchy{{0.0}}), 500.0));
  EXPECT_FALSE(index_at(of(Cauchy{{1e308, 1e308}}), 1e-3));
}

TEST(Medium, HasNoIndexAtSenselessWavelengths) {
  const Medium medium = of(Sellmeier{1.0, {1.0}, {0.01}});
  EXPECT_FALSE(index_at(medium, 0.0));
  EXPECT_FALSE(index_at(medium, -500.0));
  EXPECT_FALSE(index_at(medium, std::nan("")));
}

TEST(NaturalRange, OfAFormulaIsUnbounded) {
  const Range range = natural_range(ConstantIndex{}, std::nullopt);
  EXPECT_EQ(range.from_nm, 0.0);
  EXPECT_TRUE(std::isinf(range.to_nm));
}

TEST(NaturalRange, OfATableEndsWithItsRows) {
  const Range range = natural_range(table, std::nullopt);
  EXPECT_EQ(range.from_nm, 500.0);
  EXPECT_EQ(range.to_nm, 800.0);
}

TEST(NaturalRange, IsWhereIndexAndTransmittanceAreBothKnown) {
  const Range range = natural_range(table, glass);
  EXPECT_EQ(range.from_nm, 500.0);
  EXPECT_EQ(range.to_nm, 700.0);
}

TEST(NaturalRange, OfTablesThatDoNotMeetHoldsNothing) {
  const Range range = natural_range(table, InternalTransmittance{1.0, {{100.0, 0.5}, {200.0, 0.6}}});
  EXPECT_FALSE(range.holds(150.0));
  EXPECT_FALSE(range.holds(600.0));
}

} // namespace
} // namespace lightledger::optics
