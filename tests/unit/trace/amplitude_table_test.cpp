#include <lightledger/optics/boundary.hpp>
#include <lightledger/trace/tables.hpp>

#include <gtest/gtest.h>

#include <array>
#include <cmath>
#include <span>
#include <vector>

namespace lightledger::trace {
namespace {

constexpr std::array four_layers = {PlanLayer{1.38, 0.0, 96.4}, PlanLayer{2.1, 0.0, 126.7},
                                    PlanLayer{1.46, 0.0, 109.3}, PlanLayer{1.38, 0.0, 96.4}};
constexpr std::array absorbing = {PlanLayer{1.45, 1e-3, 120.0}, PlanLayer{2.3, 0.02, 60.0}};

PlanOp operator_of(std::span<const PlanLayer> layers, double n1, double n2) {
  PlanOp op{};
  op.amplitude = AmplitudeKind::stack;
  op.layers = layers.data();
  op.layer_count = static_cast<std::uint32_t>(layers.size());
  op.n1 = n1;
  op.n2 = n2;
  op.wavelength_nm = 532.0;
  return op;
}

double value(const AmplitudeTable& table, AmplitudeTable::Row row, double x) {
  double sum = 0.0;
  for (int k = table.degree; k >= 0; --k)
    sum = sum * x + table.coefficients[row][k];
  return sum;
}

/// The largest difference of an amplitude or absorptance at places between those of the fit.
double worst(const PlanOp& op, const AmplitudeTable& table) {
  std::vector<optics::Layer> layers;
  for (std::uint32_t k = 0; k < op.layer_count; ++k)
    layers.push_back({{op.layers[k].n, op.layers[k].kappa}, op.layers[k].thickness_nm});
  double difference = 0.0;
  for (double c1 = table.least; c1 <= table.most; c1 += 0.00137) {
    const double c2 = std::sqrt(1.0 - std::pow(op.n1 / op.n2, 2) * (1.0 - c1 * c1));
    const double x = ((op.n1 <= op.n2 ? c1 : c2) - table.centre) * table.scale;
    const optics::Response expected =
        optics::layered_boundary(op.n1, layers, {op.n2, op.n2_kappa}, c1, op.wavelength_nm);
    difference =
        std::max({difference, std::abs(value(table, AmplitudeTable::t_s_re, x) - expected.t_s.real()),
                  std::abs(value(table, AmplitudeTable::t_p_im, x) - expected.t_p.imag()),
                  std::abs(value(table, AmplitudeTable::r_s_im, x) - expected.r_s.imag()),
                  std::abs(value(table, AmplitudeTable::r_p_re, x) - expected.r_p.real()),
                  std::abs(value(table, AmplitudeTable::a_s, x) - expected.absorptance_s),
                  std::abs(value(table, AmplitudeTable::a_p, x) - expected.absorptance_p)});
  }
  return difference;
}

TEST(Table, GivesTheAmplitudesOfItsLayers) {
  const PlanOp op = operator_of(four_layers, 1.0, 1.52);
  const auto table = tabulate(op, {0.9, 1.0});
  ASSERT_TRUE(table.has_value());
  EXPECT_LT(worst(op, *table), 1e-13);
  EXPECT_LE(table->degree, 12);
}

TEST(Table, GivesThemFromTheDenserSideInTheCosineBeyond) {
  const PlanOp op = operator_of(four_layers, 1.52, 1.0);
  const auto table = tabulate(op, {0.9, 1.0});
  ASSERT_TRUE(table.has_value());
  EXPECT_LT(worst(op, *table), 1e-13);
}

TEST(Table, GivesAbsorptancesToo) {
  const PlanOp op = operator_of(absorbing, 1.0, 1.52);
  const auto table = tabulate(op, {0.7, 1.0});
  ASSERT_TRUE(table.has_value());
  EXPECT_LT(worst(op, *table), 1e-13);
}

TEST(Table, KeepsAwayFromTheCriticalAngle) {
  const auto table = tabulate(operator_of(four_layers, 1.52, 1.0), {0.2, 1.0});
  ASSERT_TRUE(table.has_value());
  EXPECT_GT(table->least, std::sqrt(1.0 - 1.0 / (1.52 * 1.52)));
}

TEST(Table, IsNotMadeBeyondTheCriticalAngle) {
  EXPECT_FALSE(tabulate(operator_of(four_layers, 1.52, 1.0), {0.2, 0.5}).has_value());
}

/// A resonator: its transmission falls from 1 to nearly nothing within a fraction of a degree.
TEST(Table, IsNotMadeOfANarrowFilter) {
  std::vector<PlanLayer> layers;
  for (int pair = 0; pair < 8; ++pair) {
    layers.push_back({2.3, 0.0, 532.0 / 4.0 / 2.3});
    layers.push_back({1.46, 0.0, 532.0 / 4.0 / 1.46});
  }
  layers.push_back({2.3, 0.0, 20.0 * 532.0 / 2.0 / 2.3});
  for (int pair = 0; pair < 8; ++pair) {
    layers.push_back({1.46, 0.0, 532.0 / 4.0 / 1.46});
    layers.push_back({2.3, 0.0, 532.0 / 4.0 / 2.3});
  }
  EXPECT_FALSE(tabulate(operator_of(layers, 1.0, 1.52), {0.8, 1.0}).has_value());
}

} // namespace
} // namespace lightledger::trace
