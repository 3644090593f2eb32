#include "reference/disc.hpp"

#include <Eigen/Eigenvalues>
#include <cmath>
#include <numbers>
#include <numeric>
#include <stdexcept>

namespace lightledger::reference {
namespace {

/// Gaussian irradiance, then shares that add up to 1.
std::vector<DiscPoint> shared_out(std::vector<DiscPoint> points, const assembly::Beam& beam) {
  double sum = 0.0;
  for (DiscPoint& point : points) {
    const double r = std::hypot(point.at[0], point.at[1]);
    if (beam.gaussian)
      point.share *= std::exp(-2.0 * r * r / (*beam.gaussian * *beam.gaussian));
    point.at = {point.at[0] + beam.at[0], point.at[1] + beam.at[1]};
    sum += point.share;
  }
  for (DiscPoint& point : points)
    point.share /= sum;
  return points;
}

struct Pattern {
  const assembly::Beam& beam;

  std::vector<DiscPoint> operator()(const assembly::Rings& pattern) const {
    const double inner = beam.inner * beam.inner;
    const double outer = beam.radius * beam.radius;
    std::vector<DiscPoint> points;
    for (const Node& node : gauss_legendre(static_cast<int>(pattern.rings)))
      for (std::uint64_t spoke = 0; spoke < pattern.spokes; ++spoke) {
        const double r = std::sqrt(inner + node.at * (outer - inner));
        const double azimuth =
            2.0 * std::numbers::pi * (static_cast<double>(spoke) + 0.5) / static_cast<double>(pattern.spokes);
        points.push_back({{r * std::cos(azimuth), r * std::sin(azimuth)}, node.weight});
      }
    return points;
  }

  std::vector<DiscPoint> operator()(const assembly::Grid& pattern) const {
    const double cell = 2.0 * beam.radius / static_cast<double>(pattern.across);
    std::vector<DiscPoint> points;
    for (std::uint64_t row = 0; row < pattern.across; ++row)
      for (std::uint64_t column = 0; column < pattern.across; ++column) {
        const double x = (static_cast<double>(column) + 0.5) * cell - beam.radius;
        const double y = (static_cast<double>(row) + 0.5) * cell - beam.radius;
        const double r = std::hypot(x, y);
        if (r <= beam.radius && r >= beam.inner)
          points.push_back({{x, y}, 1.0});
      }
    return points;
  }

  std::vector<DiscPoint> operator()(const auto&) const {
    throw std::invalid_argument("only rings and grids have points of their own");
  }
};

} // namespace

std::vector<Node> gauss_legendre(int count) {
  Eigen::MatrixXd jacobi = Eigen::MatrixXd::Zero(count, count);
  for (int i = 1; i < count; ++i)
    jacobi(i, i - 1) = jacobi(i - 1, i) = i / std::sqrt(4.0 * i * i - 1.0);
  const Eigen::SelfAdjointEigenSolver<Eigen::MatrixXd> solver(jacobi);
  std::vector<Node> nodes;
  for (int i = 0; i < count; ++i) {
    const double first = solver.eigenvectors()(0, i);
    nodes.push_back({0.5 * (1.0 + solver.eigenvalues()(i)), first * first});
  }
  return nodes;
}

std::vector<DiscPoint> disc_points(const assembly::Beam& beam, const assembly::Sampling& pattern) {
  return shared_out(std::visit(Pattern{beam}, pattern), beam);
}

} // namespace lightledger::reference
