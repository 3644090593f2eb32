#include <lightledger/optics/mueller.hpp>

#include <Eigen/Dense>
#include <algorithm>
#include <cmath>
#include <numbers>

namespace lightledger::optics {
namespace {

constexpr double degrees = 180.0 / std::numbers::pi;
/// Polarization below this share of a beam's power is rounding, and has no direction.
constexpr double no_direction = 1e-13;
constexpr double singular = 1e-12;

/// Place of an element above the diagonal in PauliCoherency::upper.
constexpr std::size_t place(std::size_t row, std::size_t column) {
  return row == 0 ? column - 1 : row + column;
}

double length(double x, double y, double z) {
  return std::hypot(x, y, z);
}

Eigen::Matrix3d retarding_part(const Mueller& m) {
  Eigen::Matrix3d part;
  for (int row = 0; row < 3; ++row)
    for (int column = 0; column < 3; ++column)
      part(row, column) = m[row + 1][column + 1] / m[0][0];
  return part;
}

/// The lower right of M M_D⁻¹/M00, M_D the diattenuator with the vector D (Lu & Chipman 1996, eqs 17, 18).
Eigen::Matrix3d behind_diattenuator(const Mueller& m, const Eigen::Vector3d& d) {
  const Eigen::Vector3d p(m[1][0] / m[0][0], m[2][0] / m[0][0], m[3][0] / m[0][0]);
  const double rest_squared = 1.0 - d.squaredNorm();
  const double rest = std::sqrt(rest_squared);
  // M_D⁻¹ = [[1, −Dᵀ], [−D, ·]]/(1 − D²) with √(1 − D²) I + DDᵀ/(1 + √(1 − D²)) in the lower right.
  const Eigen::Matrix3d inverse = rest * Eigen::Matrix3d::Identity() + d * d.transpose() / (1.0 + rest);
  return (retarding_part(m) * inverse - p * d.transpose()) / rest_squared;
}

} // namespace

PauliCoherency& PauliCoherency::operator+=(const PauliCoherency& other) {
  for (std::size_t i = 0; i < diagonal.size(); ++i)
    diagonal[i] += other.diagonal[i];
  for (std::size_t i = 0; i < upper.size(); ++i)
    upper[i] += other.upper[i];
  return *this;
}

PauliCoherency& PauliCoherency::operator*=(double factor) {
  for (double& value : diagonal)
    value *= factor;
  for (Complex& value : upper)
    value *= factor;
  return *this;
}

Complex PauliCoherency::at(std::size_t row, std::size_t column) const {
  if (row == column)
    return diagonal[row];
  return row < column ? upper[place(row, column)] : std::conj(upper[place(column, row)]);
}

PauliCoherency coherency_of(const PauliVector& k, double weight) {
  PauliCoherency t;
  for (std::size_t row = 0; row < 4; ++row) {
    t.diagonal[row] = weight * std::norm(k[row]);
    for (std::size_t column = row + 1; column < 4; ++column)
      t.upper[place(row, column)] = weight * k[row] * std::conj(k[column]);
  }
  return t;
}

Mueller mueller(const PauliCoherency& t) {
  const auto& d = t.diagonal;
  Mueller m{};
  m[0][0] = d[0] + d[1] + d[2] + d[3];
  for (std::size_t j = 1; j < 4; ++j) {
    const std::size_t next = j % 3 + 1;
    const std::size_t last = next % 3 + 1;
    const double along = 2.0 * t.at(0, j).real();
    const double across = -2.0 * t.at(next, last).imag();
    m[0][j] = along - across;
    m[j][0] = along + across;
    m[j][j] = d[0] + d[j] - d[next] - d[last];
    const double symmetric = 2.0 * t.at(j, next).real();
    const double turned = 2.0 * t.at(0, last).imag();
    m[j][next] = symmetric - turned;
    m[next][j] = symmetric + turned;
  }
  return m;
}

Mueller mueller(const PauliVector& k) {
  return mueller(coherency_of(k));
}

Stokes through(const Mueller& m, const Stokes& in) {
  Stokes out{};
  for (std::size_t row = 0; row < 4; ++row)
    for (std::size_t column = 0; column < 4; ++column)
      out[row] += m[row][column] * in[column];
  return out;
}

Stokes stokes(State state, double power) {
  return {power, power * state.s1, power * state.s2, power * state.s3};
}

std::optional<double> degree_of_polarization(const Stokes& s) {
  if (!(s[0] > 0.0))
    return std::nullopt;
  return std::min(length(s[1], s[2], s[3]) / s[0], 1.0);
}

std::optional<double> degree_of_linear_polarization(const Stokes& s) {
  if (!(s[0] > 0.0))
    return std::nullopt;
  return std::min(std::hypot(s[1], s[2]) / s[0], 1.0);
}

std::optional<double> azimuth_deg(const Stokes& s) {
  if (!(std::hypot(s[1], s[2]) > no_direction * s[0]))
    return std::nullopt;
  return azimuth_of(s[1], s[2]);
}

std::optional<double> ellipticity_deg(const Stokes& s) {
  if (!(length(s[1], s[2], s[3]) > no_direction * s[0]))
    return std::nullopt;
  return 0.5 * degrees * std::atan2(s[3], std::hypot(s[1], s[2]));
}

std::optional<double> diattenuation(const Mueller& m) {
  if (!(m[0][0] > 0.0))
    return std::nullopt;
  return std::min(length(m[0][1], m[0][2], m[0][3]) / m[0][0], 1.0);
}

std::optional<double> polarizance(const Mueller& m) {
  if (!(m[0][0] > 0.0))
    return std::nullopt;
  return std::min(length(m[1][0], m[2][0], m[3][0]) / m[0][0], 1.0);
}

std::optional<double> depolarization_index(const Mueller& m) {
  if (!(m[0][0] > 0.0))
    return std::nullopt;
  double squares = 0.0;
  for (std::size_t row = 0; row < 4; ++row)
    for (std::size_t column = 0; column < 4; ++column)
      squares += row + column == 0 ? 0.0 : m[row][column] * m[row][column];
  return std::min(std::sqrt(squares / 3.0) / m[0][0], 1.0);
}

// The elements of T from those of M: the relations of mueller(PauliCoherency), solved.
std::array<double, 4> coherency_eigenvalues(const Mueller& m) {
  Eigen::Matrix4cd t = Eigen::Matrix4cd::Zero();
  t(0, 0) = 0.25 * (m[0][0] + m[1][1] + m[2][2] + m[3][3]);
  for (std::size_t j = 1; j < 4; ++j) {
    const std::size_t next = j % 3 + 1;
    const std::size_t last = next % 3 + 1;
    const auto at = [](std::size_t i) { return static_cast<Eigen::Index>(i); };
    t(at(j), at(j)) = 0.25 * (m[0][0] + m[j][j] - m[next][next] - m[last][last]);
    t(0, at(j)) = 0.25 * Complex(m[0][j] + m[j][0], m[last][next] - m[next][last]);
    t(at(next), at(last)) = 0.25 * Complex(m[next][last] + m[last][next], m[0][j] - m[j][0]);
    t(at(j), 0) = std::conj(t(0, at(j)));
    t(at(last), at(next)) = std::conj(t(at(next), at(last)));
  }
  const Eigen::SelfAdjointEigenSolver<Eigen::Matrix4cd> solver(t, Eigen::EigenvaluesOnly);
  const Eigen::Vector4d& values = solver.eigenvalues();
  return {values[0], values[1], values[2], values[3]};
}

std::optional<Decomposition> decompose(const Mueller& m) {
  if (!(m[0][0] > 0.0))
    return std::nullopt;
  const Eigen::Vector3d d(m[0][1] / m[0][0], m[0][2] / m[0][0], m[0][3] / m[0][0]);
  if (!(1.0 - d.squaredNorm() > singular))
    return std::nullopt;
  const Eigen::JacobiSVD<Eigen::Matrix3d> svd(behind_diattenuator(m, d),
                                              Eigen::ComputeFullU | Eigen::ComputeFullV);
  const Eigen::Vector3d values = svd.singularValues();
  if (!(values[1] > singular))
    return std::nullopt;
  // m' = m_Δ m_R with a rotation m_R: its orthogonal polar factor, the sign going into m_Δ.
  Eigen::Matrix3d rotation = svd.matrixU() * svd.matrixV().transpose();
  if (rotation.determinant() < 0.0)
    rotation = -rotation;
  const Eigen::Vector3d twist(rotation(2, 1) - rotation(1, 2), rotation(0, 2) - rotation(2, 0),
                              rotation(1, 0) - rotation(0, 1));
  const double size = twist.norm();
  // A retarder turns the Poincaré sphere by δ about its fast state.
  const Eigen::Vector3d axis = size > 0.0 ? Eigen::Vector3d(twist / size) : Eigen::Vector3d::Zero();
  return Decomposition{degrees * std::atan2(0.5 * size, 0.5 * (rotation.trace() - 1.0)),
                       {axis[0], axis[1], axis[2]},
                       1.0 - values.sum() / 3.0};
}

} // namespace lightledger::optics
