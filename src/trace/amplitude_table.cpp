#include <lightledger/optics/boundary.hpp>
#include <lightledger/trace/tables.hpp>

#include <algorithm>
#include <array>
#include <cmath>
#include <numbers>
#include <vector>

namespace lightledger::trace {
namespace {

constexpr int nodes = AmplitudeTable::highest_degree + 1;
/// What the highest terms may add together and still be left out: the noise of a few nodes.
constexpr double below_rounding = 8e-15;
constexpr double verified = 1e-13;
/// Cosine beyond the critical angle's below which amplitudes bend too sharply.
constexpr double beside_critical = 0.03;

using Amplitudes = std::array<double, AmplitudeTable::rows>;

/// An operator's layers, asked by the cosine in the rarer medium.
class Stack {
public:
  explicit Stack(const PlanOp& op) : m_op(op) {
    for (std::uint32_t k = 0; k < op.layer_count; ++k)
      m_layers.push_back({{op.layers[k].n, op.layers[k].kappa}, op.layers[k].thickness_nm});
  }

  [[nodiscard]] bool by_exit() const { return m_op.n1 > m_op.n2 && !m_op.swallows; }

  [[nodiscard]] double variable(double cosine) const {
    if (!by_exit())
      return cosine;
    const double ratio = m_op.n1 / m_op.n2;
    return std::sqrt(std::max(1.0 - ratio * ratio * (1.0 - cosine) * (1.0 + cosine), 0.0));
  }

  [[nodiscard]] Amplitudes at(double variable) const {
    const double ratio = m_op.n2 / m_op.n1;
    const double cosine =
        by_exit() ? std::sqrt(1.0 - ratio * ratio * (1.0 - variable) * (1.0 + variable)) : variable;
    const optics::Response r =
        optics::layered_boundary(m_op.n1, m_layers, {m_op.n2, m_op.n2_kappa}, cosine, m_op.wavelength_nm);
    return {r.t_s.real(), r.t_s.imag(), r.t_p.real(), r.t_p.imag(),    r.r_s.real(),
            r.r_s.imag(), r.r_p.real(), r.r_p.imag(), r.absorptance_s, r.absorptance_p};
  }

private:
  const PlanOp& m_op;
  std::vector<optics::Layer> m_layers;
};

/// Coefficients of the Chebyshev series through the Chebyshev nodes of [−1, 1].
using Series = std::array<Amplitudes, nodes>;

Series chebyshev_series(const Stack& stack, double centre, double half_width) {
  Series values;
  for (int j = 0; j < nodes; ++j)
    values[static_cast<std::size_t>(j)] =
        stack.at(centre + half_width * std::cos(std::numbers::pi * (j + 0.5) / nodes));
  Series series{};
  for (int k = 0; k < nodes; ++k)
    for (int j = 0; j < nodes; ++j) {
      const double weight = (k == 0 ? 1.0 : 2.0) / nodes * std::cos(std::numbers::pi * k * (j + 0.5) / nodes);
      for (std::size_t row = 0; row < AmplitudeTable::rows; ++row)
        series[static_cast<std::size_t>(k)][row] += weight * values[static_cast<std::size_t>(j)][row];
    }
  return series;
}

/// The least degree above which the series adds nothing.
int sufficient_degree(const Series& series) {
  int degree = nodes - 1;
  double left_out = 0.0;
  while (degree > 1) {
    double size = 0.0;
    for (const double coefficient : series[static_cast<std::size_t>(degree)])
      size = std::max(size, std::abs(coefficient));
    left_out += size;
    if (left_out > below_rounding)
      break;
    --degree;
  }
  return degree;
}

/// Adds c T_k, the k-th Chebyshev polynomial, for all rows in powers of x.
void write_powers(const Series& series, AmplitudeTable& table) {
  std::array<double, nodes> before{};
  std::array<double, nodes> current{};
  before[0] = 1.0;  // T_0
  current[1] = 1.0; // T_1
  for (int k = 0; k <= table.degree; ++k) {
    const std::array<double, nodes>& powers = k == 0 ? before : current;
    for (int row = 0; row < AmplitudeTable::rows; ++row)
      for (int i = 0; i <= k; ++i)
        table.coefficients[row][i] += series[static_cast<std::size_t>(k)][static_cast<std::size_t>(row)] *
                                      powers[static_cast<std::size_t>(i)];
    if (k == 0)
      continue;
    std::array<double, nodes> next{};
    for (std::size_t i = 0; i < nodes; ++i)
      next[i] = (i > 0 ? 2.0 * current[i - 1] : 0.0) - before[i];
    before = current;
    current = next;
  }
}

double value(const AmplitudeTable& table, int row, double x) {
  double sum = 0.0;
  for (int k = table.degree; k >= 0; --k)
    sum = sum * x + table.coefficients[row][k];
  return sum;
}

bool holds(const AmplitudeTable& table, const Stack& stack) {
  const int places = 4 * (table.degree + 1);
  for (int j = 0; j <= places; ++j) {
    const double x = 2.0 * j / places - 1.0;
    const Amplitudes expected = stack.at(table.centre + x / table.scale);
    for (int row = 0; row < AmplitudeTable::rows; ++row)
      if (!(std::abs(value(table, row, x) - expected[static_cast<std::size_t>(row)]) < verified))
        return false;
  }
  return true;
}

} // namespace

std::optional<AmplitudeTable> tabulate(const PlanOp& op, Cosines range) {
  const Stack stack(op);
  if (stack.by_exit()) {
    const double ratio = op.n2 / op.n1;
    range.least = std::max(range.least, std::sqrt(1.0 - ratio * ratio) + beside_critical);
  }
  if (!(range.least < range.most))
    return std::nullopt;
  const double from = stack.variable(range.least);
  const double to = stack.variable(range.most);
  const double half_width = 0.5 * (to - from);
  AmplitudeTable table{};
  table.least = range.least;
  table.most = range.most;
  table.centre = 0.5 * (from + to);
  table.scale = 1.0 / half_width;
  const Series series = chebyshev_series(stack, table.centre, half_width);
  table.degree = sufficient_degree(series);
  write_powers(series, table);
  if (!holds(table, stack))
    return std::nullopt;
  return table;
}

} // namespace lightledger::trace
