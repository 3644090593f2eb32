#include "analysis/proper_walk.hpp"
#include "properties/fast.hpp"
#include "properties/rotated.hpp"

#include <lightledger/analysis/polarization.hpp>

#include <gtest/gtest.h>
#include <rapidcheck/gtest.h>

#include <Eigen/Geometry>
#include <algorithm>
#include <cmath>

/// What the train does to polarization, against the textbook tracer's 3×3 matrices, and what must hold of any
/// train.
namespace lightledger::properties {
namespace {

using Complex = std::complex<double>;
using analysis::DetectorFigures;
using analysis::Polarization;
using optics::PauliVector;
using reference::RayRecord;
using reference::Vector;

constexpr double agreement = 1e-11;

/// The smallest rotation from one unit vector to another (Rodrigues 1840).
Eigen::Matrix3d smallest_rotation(const Vector& from, const Vector& to) {
  const Vector axis = from.cross(to);
  Eigen::Matrix3d cross;
  cross << 0.0, -axis[2], axis[1], axis[2], 0.0, -axis[0], -axis[1], axis[0], 0.0;
  return Eigen::Matrix3d::Identity() + cross + cross * cross / (1.0 + from.dot(to));
}

/// The geometric transport of one station by contract §2.
Eigen::Matrix3d transport(const assembly::Assembly& assembly, std::size_t station, const Vector& k,
                          const Vector& k_behind) {
  const assembly::Station& visit = assembly.stations[station];
  if (visit.intended == assembly::Act::bounce) {
    const Vector normal = (k_behind - k).normalized();
    return Eigen::Matrix3d::Identity() - 2.0 * normal * normal.transpose();
  }
  if (std::holds_alternative<assembly::Interface>(assembly.surfaces[visit.surface].effect))
    return smallest_rotation(k, k_behind);
  return Eigen::Matrix3d::Identity();
}

/// Q⁻¹P of a ray that arrives, in the double-pole basis of its launch.
PauliVector textbook_proper(const Both& both, const reference::Ray& ray, const RayRecord& record) {
  Eigen::Matrix3d q = Eigen::Matrix3d::Identity();
  Vector k = ray.direction;
  for (std::size_t i = 0; i < record.steps.size(); ++i) {
    q = transport(*both.assembly, i, k, record.steps[i].direction) * q;
    k = record.steps[i].direction;
  }
  const Eigen::Matrix<Complex, 3, 2> basis = reference::double_pole_basis(ray.direction).cast<Complex>();
  const Eigen::Matrix2cd proper =
      basis.transpose() * q.transpose().cast<Complex>() * record.steps.back().P * basis;
  return optics::pauli({proper(0, 0), proper(0, 1), proper(1, 0), proper(1, 1)});
}

/// P in the double-pole basis about the axis that arrives at the detector.
PauliVector textbook_arriving(const Both& both, const reference::Ray& ray, const RayRecord& record) {
  const Eigen::Matrix3d& axes = both.bench.stations.back().arriving.axes;
  const Eigen::Matrix<double, 3, 2> exit =
      axes * reference::double_pole_basis(axes.transpose() * record.steps.back().direction);
  const Eigen::Matrix2cd jones = exit.transpose().cast<Complex>() * record.steps.back().P *
                                 reference::double_pole_basis(ray.direction).cast<Complex>();
  return optics::pauli({jones(0, 0), jones(0, 1), jones(1, 0), jones(1, 1)});
}

double distance(const PauliVector& a, const PauliVector& b) {
  double squares = 0.0;
  for (std::size_t j = 0; j < 4; ++j)
    squares += std::norm(a[j] - b[j]);
  return std::sqrt(squares);
}

bool arrives(const Both& both, const RayRecord& record) {
  return record.comparable() && record.steps.size() == both.assembly->stations.size() &&
         record.steps.back().inside;
}

PauliVector first_lane(const analysis::PauliLanes& k) {
  PauliVector first;
  for (std::size_t j = 0; j < 4; ++j)
    first[j] = {k.re[j][0], k.im[j][0]};
  return first;
}

RC_GTEST_PROP(ProperJones, AgreesWithTheTextbookRayByRay, ()) {
  const std::uint64_t seed = reference::any_seed();
  const Both both = prepare(reference::random_assembly(seed));
  reference::Dice dice(seed + 1);
  for (const reference::Ray& ray : reference::random_rays(both.assembly->light, dice, 24)) {
    const RayRecord record =
        reference::trace(both.bench, *both.assembly, both.assembly->light.wavelengths.front().nm, ray);
    if (!arrives(both, record))
      continue;
    trace::RayBlock block = block_of({ray});
    analysis::ProperRays rays;
    rays.follow(both.train, analysis::Optics(both.train.plans.front()), block);
    RC_ASSERT(rays.arrived == 1);
    PauliVector k{1.0, 0.0, 0.0, 0.0};
    for (const analysis::PauliLanes& did : rays.did)
      k = optics::product(first_lane(did), k);
    RC_ASSERT(distance(k, textbook_proper(both, ray, record)) < agreement);
  }
}

/// Nothing that the figures do not know: the light's own pattern, at one wavelength and field.
assembly::Assembly plain(std::uint64_t seed) {
  assembly::Assembly assembly = reference::random_assembly(seed);
  assembly.light.sampling = assembly::Rings{3, 8};
  return assembly;
}

std::optional<Polarization> polarization_of(const assembly::Assembly& assembly, int threads = 1) {
  return analysis::polarization(assembly, {.threads = threads}).polarization;
}

/// The sum of the textbook's Mueller matrices over a pattern of rays; none where one of them is doubtful.
std::optional<optics::Mueller> textbook_mueller(const Both& both) {
  const assembly::Light& light = both.assembly->light;
  double all = 0.0;
  for (const auto& wavelength : light.wavelengths)
    for (const auto& field : light.fields)
      all += wavelength.weight * field.weight;
  optics::PauliCoherency sum;
  for (const auto& wavelength : light.wavelengths)
    for (std::size_t f = 0; f < light.fields.size(); ++f)
      for (const reference::DiscPoint& point : launch_points(both, f)) {
        const reference::Ray ray = reference::launch(light, light.fields[f], point.at);
        const RayRecord record = reference::trace(both.bench, *both.assembly, wavelength.nm, ray);
        if (!record.comparable())
          return std::nullopt;
        if (!arrives(both, record))
          continue;
        // P knows nothing of scatter, loss and bulk; the power delivered does.
        const PauliVector k = textbook_arriving(both, ray, record);
        const double power = optics::through(optics::mueller(k), optics::stokes(light.polarization))[0];
        const double kept = power > 0.0 ? record.delivered / power : 0.0;
        sum += optics::coherency_of(k, kept * point.share * wavelength.weight * light.fields[f].weight / all);
      }
  return optics::mueller(sum);
}

RC_GTEST_PROP(DetectorMueller, AgreesWithTheTextbook, ()) {
  const assembly::Assembly assembly = plain(reference::any_seed());
  const Both both = prepare(assembly);
  const auto expected = textbook_mueller(both);
  RC_PRE(expected.has_value());
  const auto found = polarization_of(assembly);
  RC_ASSERT(found.has_value());
  for (std::size_t row = 0; row < 4; ++row)
    for (std::size_t column = 0; column < 4; ++column)
      RC_ASSERT(std::abs(found->detector.mueller[row][column] - (*expected)[row][column]) < agreement);
}

RC_GTEST_PROP(DetectorMueller, IsPhysicallyRealizable, ()) {
  const auto found = polarization_of(plain(reference::any_seed()));
  RC_ASSERT(found.has_value());
  const optics::Mueller& m = found->detector.mueller;
  RC_ASSERT(optics::coherency_eigenvalues(m)[0] >= -1e-14 * m[0][0]);
  if (found->chief)
    RC_ASSERT(optics::coherency_eigenvalues(found->chief->mueller)[2] <= 1e-13);
}

/// Both are none, or they are near each other.
bool alike(std::optional<double> one, std::optional<double> other, double tolerance) {
  return one.has_value() == other.has_value() && (!one || std::abs(*one - *other) < tolerance);
}

RC_GTEST_PROP(DetectorFigures, AreUnchangedWhenTheBenchIsRotated, ()) {
  const std::uint64_t seed = reference::any_seed();
  const assembly::Assembly assembly = plain(seed);
  const Both both = prepare(assembly);
  RC_PRE(textbook(both).left_out == 0);
  const auto here = polarization_of(assembly);
  const auto there = polarization_of(rotated(assembly, 45.0 * reference::Dice(seed + 1).whole(1, 7)));
  RC_ASSERT(here && there);
  const DetectorFigures& a = here->detector;
  const DetectorFigures& b = there->detector;
  RC_PRE(a.mueller[0][0] > 1e-6);
  RC_ASSERT(alike(a.dop, b.dop, 1e-9));
  RC_ASSERT(alike(a.diattenuation, b.diattenuation, 1e-9));
  RC_ASSERT(alike(a.polarizance, b.polarizance, 1e-9));
  RC_ASSERT(alike(a.depolarization_index, b.depolarization_index, 1e-9));
  RC_ASSERT(alike(a.cross_leakage, b.cross_leakage, 1e-9));
  RC_ASSERT(alike(a.coherent_share, b.coherent_share, 1e-9));
}

RC_GTEST_PROP(DetectorFigures, AreTheSameBitsForAnyNumberOfThreads, ()) {
  assembly::Assembly assembly = reference::random_assembly(reference::any_seed());
  assembly.light.sampling = assembly::Scattered{512};
  const auto one = polarization_of(assembly, 1);
  const auto three = polarization_of(assembly, 3);
  RC_ASSERT(one && three);
  RC_ASSERT(one->detector.mueller == three->detector.mueller);
  RC_ASSERT(one->detector.cross_leakage == three->detector.cross_leakage);
  RC_ASSERT(one->error.mueller == three->error.mueller);
  for (std::size_t i = 0; i < one->attribution.size(); ++i)
    RC_ASSERT(one->attribution[i].value.diattenuation == three->attribution[i].value.diattenuation);
}

} // namespace
} // namespace lightledger::properties
