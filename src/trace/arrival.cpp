#include "arrival.hpp"

#include <algorithm>
#include <cmath>

namespace lightledger::trace {
namespace {

struct Vector {
  double x, y, z;
};

double dot(const Vector& a, const Vector& b) {
  return a.x * b.x + a.y * b.y + a.z * b.z;
}

Vector turned(const double (&rotation)[3][3], const double (&v)[3][RayBlock::lanes], int i) {
  const auto component = [&](const double(&row)[3]) {
    return row[0] * v[0][i] + row[1] * v[1][i] + row[2] * v[2][i];
  };
  return {component(rotation[0]), component(rotation[1]), component(rotation[2])};
}

/// The axis x carried by the smallest rotation of the axis z onto d; any transverse vector for light that
/// runs straight against z.
Vector double_pole(const Vector& d) {
  constexpr double opposite = 1e-15;
  if (1.0 + d.z < opposite)
    return {1.0, 0.0, 0.0};
  const double pull = d.x / (1.0 + d.z);
  return {1.0 - pull * d.x, -pull * d.y, -d.x};
}

/// A row of J with the coherency matrix of the launched light: (row Φ), real and imaginary parts by column.
struct Row {
  double x_re, x_im, y_re, y_im;
};

Row times(const Row& row, const optics::Coherency& phi) {
  const double re = phi.xy.real();
  const double im = phi.xy.imag();
  return {
      row.x_re * phi.xx + row.y_re * re + row.y_im * im, row.x_im * phi.xx + row.y_im * re - row.y_re * im,
      row.x_re * re - row.x_im * im + row.y_re * phi.yy, row.x_re * im + row.x_im * re + row.y_im * phi.yy};
}

/// Σ over columns of a · conj(b).
struct Product {
  double re, im;
};

Product inner(const Row& a, const Row& b) {
  return {a.x_re * b.x_re + a.x_im * b.x_im + a.y_re * b.y_re + a.y_im * b.y_im,
          a.x_im * b.x_re - a.x_re * b.x_im + a.y_im * b.y_re - a.y_re * b.y_im};
}

Row row(const Arrival& arrival, int first, int i) {
  return {arrival.field[first][i], arrival.field[first + 1][i], arrival.field[first + 2][i],
          arrival.field[first + 3][i]};
}

} // namespace

ArrivalReader::ArrivalReader(const Train& train)
    : m_coherency(optics::coherency(train.assembly->light.polarization)) {
  const Frame& surface = train.bench.surface[train.assembly->stations.back().surface];
  const Eigen::Matrix3d turn = train.bench.arriving.back().axes.transpose() * surface.axes;
  for (int r = 0; r < 3; ++r)
    for (int c = 0; c < 3; ++c)
      m_to_axis[r][c] = turn(r, c);
}

void ArrivalReader::read(const RayBlock& rays, Arrival& arrival) const {
  arrival.alive = rays.alive;
  arrival.count = rays.count;
  for (int i = 0; i < rays.count; ++i) {
    if (((rays.alive >> i) & 1U) == 0)
      continue;
    const Vector d = turned(m_to_axis, rays.d, i);
    const Vector u = turned(m_to_axis, rays.u, i);
    const Vector pole = double_pole(d);
    const Vector across = {d.y * pole.z - d.z * pole.y, d.z * pole.x - d.x * pole.z,
                           d.x * pole.y - d.y * pole.x};
    const double c = dot(pole, u); // u = c · pole + s · across, v = −s · pole + c · across
    const double s = dot(across, u);
    const double amplitude = std::sqrt(rays.w[i]);
    for (int k = 0; k < 4; ++k) {
      arrival.field[k][i] = amplitude * (c * rays.J[k][i] - s * rays.J[4 + k][i]);
      arrival.field[4 + k][i] = amplitude * (s * rays.J[k][i] + c * rays.J[4 + k][i]);
    }
    const Row x = row(arrival, 0, i);
    const Row y = row(arrival, 4, i);
    const Row x_phi = times(x, m_coherency);
    const Product cross = inner(x_phi, y);
    arrival.xx[i] = inner(x_phi, x).re;
    arrival.yy[i] = inner(times(y, m_coherency), y).re;
    arrival.xy[0][i] = cross.re;
    arrival.xy[1][i] = cross.im;
    arrival.x[i] = rays.p[0][i];
    arrival.y[i] = rays.p[1][i];
    arrival.opl[i] = rays.opl[i];
  }
}

PathSums ArrivalReader::sums(const Arrival& arrival, const Arrival& image, const LaneMap& in_image) const {
  PathSums sums;
  double first_x = 0.0;
  double first_y = 0.0;
  const auto lit = [&](int i) { return ((arrival.alive >> i) & 1U) != 0; };
  for (int i = 0; i < arrival.count; ++i) {
    if (!lit(i))
      continue;
    const double power = arrival.xx[i] + arrival.yy[i];
    sums.power += power;
    first_x += power * arrival.x[i];
    first_y += power * arrival.y[i];
    sums.s1 += arrival.xx[i] - arrival.yy[i];
    sums.s2 += 2.0 * arrival.xy[0][i];
    sums.s3 -= 2.0 * arrival.xy[1][i];
    const int k = in_image[static_cast<std::size_t>(i)];
    if (((image.alive >> k) & 1U) == 0)
      continue;
    const double image_power = image.xx[k] + image.yy[k];
    const Product x = inner(times(row(arrival, 0, i), m_coherency), row(image, 0, k));
    const Product y = inner(times(row(arrival, 4, i), m_coherency), row(image, 4, k));
    sums.shared += power;
    sums.excess += power * (arrival.opl[i] - image.opl[k]);
    sums.interference += 2.0 * std::hypot(x.re + y.re, x.im + y.im);
    sums.intensity += power + image_power;
  }
  if (!(sums.power > 0.0))
    return sums;
  sums.x = first_x / sums.power;
  sums.y = first_y / sums.power;
  for (int i = 0; i < arrival.count; ++i)
    if (lit(i)) {
      const double dx = arrival.x[i] - sums.x;
      const double dy = arrival.y[i] - sums.y;
      sums.spread += (arrival.xx[i] + arrival.yy[i]) * (dx * dx + dy * dy);
    }
  return sums;
}

} // namespace lightledger::trace
