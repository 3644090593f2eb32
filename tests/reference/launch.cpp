#include "reference/launch.hpp"

#include <Eigen/Geometry>
#include <cmath>
#include <complex>
#include <numbers>

namespace lightledger::reference {

Ray launch(const assembly::Light& light, const assembly::Field& field,
           const std::array<double, 2>& disc_point) {
  const Vector start(disc_point[0], disc_point[1], 0.0);
  if (light.object_distance) {
    const double distance = *light.object_distance;
    const Vector object(field.at[0], field.at[1], -distance);
    const Vector away_from_object = start - object;
    return {start, std::copysign(1.0, distance) * away_from_object.normalized()};
  }
  const auto slope = [](double degrees) { return std::tan(degrees * std::numbers::pi / 180.0); };
  return {start, Vector(slope(field.at[0]), slope(field.at[1]), 1.0).normalized()};
}

Eigen::Matrix<double, 3, 2> double_pole_basis(const Vector& direction) {
  return Eigen::Quaterniond::FromTwoVectors(Vector::UnitZ(), direction).toRotationMatrix().leftCols<2>();
}

Eigen::Matrix2cd coherency_matrix(const optics::State& state) {
  const std::complex<double> cross(state.s2, -state.s3);
  Eigen::Matrix2cd matrix;
  matrix << 1.0 + state.s1, cross, std::conj(cross), 1.0 - state.s1;
  return 0.5 * matrix;
}

} // namespace lightledger::reference
