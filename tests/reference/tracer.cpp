#include "reference/tracer.hpp"

#include "reference/boundary.hpp"
#include "reference/clear.hpp"
#include "reference/element.hpp"
#include "reference/launch.hpp"
#include "reference/media.hpp"
#include "reference/shape.hpp"

#include <Eigen/Geometry>
#include <algorithm>
#include <cmath>
#include <numbers>

namespace lightledger::reference {
namespace {

using assembly::Act;
using assembly::Surface;

/// The plane of incidence: s = unit(k × N), any transverse vector where the ray meets the surface squarely;
/// the normal turned to the side to which the ray goes.
struct PlaneOfIncidence {
  Vector s, normal;
  Incidence angle;
};

PlaneOfIncidence plane_of_incidence(const Vector& k, const Vector& normal) {
  const Vector across = k.cross(normal);
  const double sine = across.norm();
  const Vector s = sine > 1e-12 ? Vector(across / sine) : k.unitOrthogonal();
  return {s, k.dot(normal) < 0.0 ? Vector(-normal) : normal, {std::abs(k.dot(normal)), sine}};
}

/// The orthogonal triple (s, p, k) of a ray, with p = k × s.
Eigen::Matrix3d triple(const Vector& s, const Vector& k) {
  Eigen::Matrix3d columns;
  columns << s, k.cross(s), k;
  return columns;
}

/// Snell's law on the part of k that lies in the surface, which is scaled by n/n'.
Vector refracted(const Vector& k, const Vector& normal, double n, double n_behind) {
  const Vector along = n / n_behind * (k - k.dot(normal) * normal);
  return along + std::sqrt(std::max(0.0, 1.0 - along.squaredNorm())) * normal;
}

Vector reflected(const Vector& k, const Vector& normal) {
  return k - 2.0 * k.dot(normal) * normal;
}

/// Bennett & Porteus, JOSA 51, 123 (1961): the share that leaves the specular beam, for rms phase differences
/// x.
double scattered_share(double x) {
  return -std::expm1(-x * x);
}

double roughness_phase(const Surface& surface, Act act, const Interface& interface, double cosine,
                       double cosine_behind, double wavelength_nm) {
  const double k_sigma = 2.0 * std::numbers::pi * surface.roughness_nm / wavelength_nm;
  if (act == Act::bounce)
    return 2.0 * k_sigma * interface.incident * cosine;
  return k_sigma * std::abs(interface.incident * cosine - interface.exit.n * cosine_behind);
}

/// One ray on its way.
class Walk {
public:
  Walk(const assembly::Assembly& assembly, double wavelength_nm, const Ray& ray)
      : m_assembly(assembly), m_wavelength_nm(wavelength_nm), m_ray(ray), m_medium(assembly.light.medium) {
    const auto basis = double_pole_basis(ray.direction);
    m_launched = basis * coherency_matrix(assembly.light.polarization) * basis.transpose();
  }

  /// Meets a surface; false where the ray ends.
  bool visit(const Encounter& encounter);

  RayRecord record;

private:
  [[nodiscard]] optics::Index medium() const { return index_of(m_assembly, m_medium, m_wavelength_nm); }
  [[nodiscard]] Eigen::Matrix3cd coherency() const { return m_throughput * m_P * m_launched * m_P.adjoint(); }
  [[nodiscard]] double power() const { return coherency().trace().real(); }

  bool arrive(const Surface& surface, const Frame& frame, Step& step);
  void travel(double distance, Step& step);
  void meet_interface(Act act, const Surface& surface, Step& step);
  void meet_element(const Element& element, Step& step);
  void divide(Act act, const PlaneOfIncidence& plane, const Interface& interface, Step& step) const;
  void go_on(Act act, const PlaneOfIncidence& plane, const Interface& interface);
  void thin_out(const Surface& surface, double scatter, Step& step);

  const assembly::Assembly& m_assembly;
  double m_wavelength_nm;
  Ray m_ray;
  assembly::MediumId m_medium;
  Eigen::Matrix3cd m_launched = Eigen::Matrix3cd::Zero(); ///< ⟨E E†⟩ at launch
  PolarizationMatrix m_P = PolarizationMatrix::Identity();
  double m_throughput = 1.0; ///< of scatter, loss and bulk
  double m_optical_path = 0.0;
  bool m_ended = false;
  Vector m_normal = Vector::Zero(); ///< of the surface met last
};

/// Along the ray to the surface. The way from the launch to the first one, and ways back, absorb nothing.
void Walk::travel(double distance, Step& step) {
  const optics::Index index = medium();
  m_optical_path += index.n * distance;
  if (record.steps.empty() || distance <= 0.0)
    return;
  constexpr double nm_per_mm = 1e6;
  const double absorbance = 4.0 * std::numbers::pi * index.kappa / m_wavelength_nm * nm_per_mm * distance;
  Step& previous = record.steps.back();
  previous.bulk = -std::expm1(-absorbance) * step.incident;
  m_throughput *= std::exp(-absorbance);
  step.incident = power();
}

/// False where the ray misses the surface or falls outside its clear area.
bool Walk::arrive(const Surface& surface, const Frame& frame, Step& step) {
  const Meeting meeting = meet(surface.shape, frame, m_ray);
  record.doubtful |= meeting.doubtful;
  record.steep |= meeting.steep;
  if (!meeting.hit) {
    step.missed = step.incident;
    return false;
  }
  travel(meeting.hit->distance, step);
  step.hit = true;
  step.optical_path = m_optical_path;
  step.point = meeting.hit->point;
  step.local_point = frame.local(step.point);
  m_ray.point = step.point;
  m_normal = meeting.hit->normal;
  const auto [cosine, sine] = plane_of_incidence(m_ray.direction, m_normal).angle;
  step.cos_incidence = cosine;
  step.incidence_deg = std::atan2(sine, cosine) * 180.0 / std::numbers::pi;

  const Passage passage = through(surface.clear, step.local_point);
  record.doubtful |= passage.doubtful;
  step.inside = passage.open;
  if (!passage.open)
    step.clipped = step.incident;
  return passage.open;
}

/// P = O_out · diag(a_s, a_p, 1) · O_inᵀ of the intended action (Yun, Crabtree & Chipman 2011).
void Walk::go_on(Act act, const PlaneOfIncidence& plane, const Interface& interface) {
  const Vector k = m_ray.direction;
  const bool bounces = act == Act::bounce;
  m_ray.direction =
      bounces ? reflected(k, plane.normal) : refracted(k, plane.normal, interface.incident, interface.exit.n);
  m_ray.direction.normalize();
  const Complex a_s = bounces ? interface.boundary.s.r : interface.boundary.s.t;
  const Complex a_p = bounces ? interface.boundary.p.r : interface.boundary.p.t;
  const Eigen::Vector3cd amplitudes(a_s, a_p, 1.0);
  m_P = triple(plane.s, m_ray.direction).cast<Complex>() * amplitudes.asDiagonal() *
        triple(plane.s, k).transpose().cast<Complex>() * m_P;
}

/// Scatter, then loss, of the onward beam.
void Walk::thin_out(const Surface& surface, double scatter, Step& step) {
  const double onward = power();
  step.scattered = scatter * onward;
  step.extra = surface.loss * (onward - step.scattered);
  m_throughput *= (1.0 - scatter) * (1.0 - surface.loss);
  step.onward = power();
}

/// What leaves the intended way at an interface: reflected by a lens, leaked through a mirror, or absorbed,
/// also in an opaque backing.
void Walk::divide(Act act, const PlaneOfIncidence& plane, const Interface& interface, Step& step) const {
  const Eigen::Matrix3cd arriving = coherency();
  const auto power_along = [&](const Vector& axis) {
    return (axis.transpose() * arriving * axis).value().real();
  };
  const double in_s = power_along(plane.s);
  const double in_p = power_along(m_ray.direction.cross(plane.s));
  const auto& [s, p] = interface.boundary;
  const double reflected = s.reflected * in_s + p.reflected * in_p;
  const double transmitted = s.transmitted * in_s + p.transmitted * in_p;
  const bool opaque = optics::opaque(interface.exit);
  step.absorbed = s.absorbed * in_s + p.absorbed * in_p + (opaque ? transmitted : 0.0);
  if (act == Act::pass)
    step.aside = reflected;
  else
    step.aside = opaque ? 0.0 : transmitted;
}

void Walk::meet_interface(Act act, const Surface& surface, Step& step) {
  const PlaneOfIncidence plane = plane_of_incidence(m_ray.direction, m_normal);
  const Interface interface = interface_at(m_assembly, surface, plane.angle, m_wavelength_nm);
  record.doubtful |= interface.doubtful;
  divide(act, plane, interface, step);
  m_ended = act == Act::pass && interface.total_reflection;
  if (m_ended)
    return;
  const auto& [s, p] = interface.boundary;
  step.pass_s = act == Act::bounce ? s.reflected : s.transmitted;
  step.pass_p = act == Act::bounce ? p.reflected : p.transmitted;
  go_on(act, plane, interface);
  const double cosine_behind = std::abs(m_ray.direction.dot(plane.normal));
  const double x =
      roughness_phase(surface, act, interface, plane.angle.cosine, cosine_behind, m_wavelength_nm);
  thin_out(surface, scattered_share(x), step);
}

void Walk::meet_element(const Element& element, Step& step) {
  step.absorbed = (element.absorption.cast<Complex>() * coherency()).trace().real();
  m_P = element.field * m_P;
}

bool Walk::visit(const Encounter& encounter) {
  const auto& [id, frame, from, act] = encounter;
  const Surface surface = seen_from(from, m_assembly.surfaces.at(id));
  Step step;
  step.incident = power();
  const bool arrived = arrive(surface, frame, step);
  if (arrived && std::holds_alternative<assembly::Interface>(surface.effect))
    meet_interface(act, surface, step);
  else if (arrived) {
    const bool on_the_way_back = from == assembly::Side::beyond;
    if (const auto acts =
            element(surface.effect, frame.axes, m_ray.direction, on_the_way_back, m_wavelength_nm))
      meet_element(*acts, step);
    thin_out(surface, 0.0, step);
  }
  if (act == Act::pass)
    m_medium = surface.beyond.value_or(surface.before);
  step.direction = m_ray.direction;
  step.P = m_P;
  record.steps.push_back(step);
  return arrived && !m_ended;
}

} // namespace

RayRecord follow(const std::vector<Encounter>& path, const assembly::Assembly& assembly, double wavelength_nm,
                 const Ray& ray) {
  Walk walk(assembly, wavelength_nm, ray);
  for (const Encounter& encounter : path) {
    if (!walk.visit(encounter))
      break;
    if (encounter.act == Act::detect)
      walk.record.delivered = walk.record.steps.back().onward;
  }
  return walk.record;
}

RayRecord trace(const Bench& bench, const assembly::Assembly& assembly, double wavelength_nm,
                const Ray& ray) {
  std::vector<Encounter> path;
  for (std::size_t i = 0; i < assembly.stations.size(); ++i) {
    const Place& place = bench.stations.at(i);
    path.push_back({assembly.stations[i].surface, place.surface, place.from, assembly.stations[i].intended});
  }
  return follow(path, assembly, wavelength_nm, ray);
}

} // namespace lightledger::reference
