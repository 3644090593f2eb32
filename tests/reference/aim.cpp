#include "reference/aim.hpp"

#include "reference/launch.hpp"

namespace lightledger::reference {

using Eigen::Matrix2d;
using Eigen::Vector2d;

assembly::Assembly opened(assembly::Assembly assembly) {
  for (assembly::Surface& surface : assembly.surfaces)
    surface.clear = {};
  return assembly;
}

std::optional<Vector2d> launch_point(const assembly::Assembly& opened, const Bench& bench,
                                     const assembly::Field& field, const Aim& aim, Vector2d guess) {
  const auto meets_at = [&](const Vector2d& start) -> std::optional<Vector2d> {
    const Ray ray = launch(opened.light, field, {start.x(), start.y()});
    const RayRecord record = trace(bench, opened, opened.light.wavelengths.front().nm, ray);
    if (record.steps.size() <= aim.station || !record.steps[aim.station].hit)
      return std::nullopt;
    return record.steps[aim.station].local_point.head<2>();
  };
  const Vector2d target(aim.target[0], aim.target[1]);
  constexpr double beside = 1e-4;
  for (int round = 0; round < 20; ++round) {
    const auto hit = meets_at(guess);
    if (!hit || (*hit - target).norm() < 1e-12)
      return hit ? std::optional(guess) : std::nullopt;
    Matrix2d slopes;
    for (int axis = 0; axis < 2; ++axis) {
      const Vector2d step = beside * Vector2d::Unit(axis);
      const auto ahead = meets_at(guess + step);
      const auto behind = meets_at(guess - step);
      if (!ahead || !behind)
        return std::nullopt;
      slopes.col(axis) = (*ahead - *behind) / (2.0 * beside);
    }
    guess -= slopes.inverse() * (*hit - target);
  }
  return std::nullopt;
}

} // namespace lightledger::reference
