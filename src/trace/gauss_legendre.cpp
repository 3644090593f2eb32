#include "gauss_legendre.hpp"

#include <cmath>
#include <numbers>

namespace lightledger::trace {
namespace {

struct Legendre {
  double value, derivative;
};

/// P_n and its derivative by Bonnet's recursion, inside (−1, 1).
Legendre legendre(int n, double x) {
  double before = 1.0;
  double here = x;
  for (int k = 2; k <= n; ++k) {
    const double next = ((2.0 * k - 1.0) * x * here - (k - 1.0) * before) / k;
    before = here;
    here = next;
  }
  return {here, n * (before - x * here) / (1.0 - x * x)};
}

} // namespace

std::vector<QuadratureNode> gauss_legendre(int count) {
  constexpr int newton_rounds = 6;
  std::vector<QuadratureNode> rule(static_cast<std::size_t>(count));
  for (int i = 0; i < (count + 1) / 2; ++i) {
    double x = std::cos(std::numbers::pi * (i + 0.75) / (count + 0.5));
    Legendre p = legendre(count, x);
    for (int round = 0; round < newton_rounds; ++round) {
      x -= p.value / p.derivative;
      p = legendre(count, x);
    }
    if (2 * i + 1 == count)
      x = 0.0;
    const double weight = 2.0 / ((1.0 - x * x) * p.derivative * p.derivative);
    rule[static_cast<std::size_t>(i)] = {-x, weight};
    rule[static_cast<std::size_t>(count - 1 - i)] = {x, weight};
  }
  return rule;
}

} // namespace lightledger::trace
