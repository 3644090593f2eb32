#include "bench/textbook.hpp"

#include <Eigen/Geometry>
#include <cmath>
#include <numbers>

namespace lightledger::bench {
namespace {

using Eigen::Matrix2cd;
using Eigen::Matrix3cd;
using Eigen::Vector3d;

struct Transmission {
  Complex s, p;
};

/// Born & Wolf, Principles of Optics, 7th ed., §1.5.2, flux-normalised.
Transmission fresnel(double n1, double n2, double c1, double c2) {
  const double flux = std::sqrt(n2 * c2 / (n1 * c1));
  return {flux * 2.0 * n1 * c1 / (n1 * c1 + n2 * c2), flux * 2.0 * n1 * c1 / (n2 * c1 + n1 * c2)};
}

/// Born & Wolf, §1.6.2, for one polarization; admittances at both ends.
Complex through(const std::vector<TextbookFilm>& films, double sin1, double n1, double wavelength_nm, bool p,
                Complex admittance1, Complex admittance2) {
  Matrix2cd m = Matrix2cd::Identity();
  for (const TextbookFilm& film : films) {
    const Complex cosine = std::sqrt(1.0 - std::pow(n1 * sin1 / film.index, 2));
    const Complex phase = 2.0 * std::numbers::pi / wavelength_nm * film.index * film.thickness_nm * cosine;
    const Complex admittance = p ? film.index / cosine : film.index * cosine;
    const Complex i(0.0, 1.0);
    Matrix2cd layer;
    layer << std::cos(phase), -i * std::sin(phase) / admittance, -i * admittance * std::sin(phase),
        std::cos(phase);
    m = m * layer;
  }
  const Complex electric = m(0, 0) + m(0, 1) * admittance2;
  const Complex magnetic = m(1, 0) + m(1, 1) * admittance2;
  return 2.0 * std::sqrt(admittance1 * admittance2) / (admittance1 * electric + magnetic);
}

Transmission transmission(const TextbookFace& face, double c1, double c2, double wavelength_nm) {
  if (face.films.empty())
    return fresnel(face.before, face.beyond, c1, c2);
  const double sin1 = std::sqrt(1.0 - c1 * c1);
  return {through(face.films, sin1, face.before, wavelength_nm, false, face.before * c1, face.beyond * c2),
          through(face.films, sin1, face.before, wavelength_nm, true, face.before / c1, face.beyond / c2)};
}

void meet(const TextbookFace& face, double wavelength_nm, TextbookRay& ray) {
  const Vector3d from = ray.point - Vector3d(0.0, 0.0, face.gap_before);
  const Vector3d& k = ray.direction;
  const double c = face.curvature;
  const double b = c * from.dot(k) - k.z();
  const double rest = c * from.squaredNorm() - 2.0 * from.z();
  const double t = rest / (-b + std::sqrt(b * b - c * rest));
  ray.point = from + t * k;
  ray.optical_path += face.before * t;
  const Vector3d normal = (Vector3d(0.0, 0.0, 1.0) - c * ray.point).normalized();
  const double c1 = k.dot(normal);
  const double mu = face.before / face.beyond;
  const double c2 = std::sqrt(1.0 - mu * mu * (1.0 - c1 * c1));
  const Vector3d next = (mu * k + (c2 - mu * c1) * normal).normalized();
  const Vector3d s = k.cross(normal).normalized();
  const Transmission t_sp = transmission(face, c1, c2, wavelength_nm);
  Matrix3cd in;
  in << s.transpose(), k.cross(s).transpose(), k.transpose();
  Matrix3cd out;
  out << s, next.cross(s), next;
  Matrix3cd amplitudes = Matrix3cd::Identity();
  amplitudes(0, 0) = t_sp.s;
  amplitudes(1, 1) = t_sp.p;
  ray.polarization = out * amplitudes * in * ray.polarization;
  ray.direction = next;
}

} // namespace

void trace(const std::vector<TextbookFace>& faces, double wavelength_nm, TextbookRay& ray) {
  for (const TextbookFace& face : faces)
    meet(face, wavelength_nm, ray);
}

} // namespace lightledger::bench
