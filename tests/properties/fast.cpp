#include "properties/fast.hpp"

#include "reference/disc.hpp"
#include "reference/launch.hpp"
#include "support/walk.hpp"

#include <Eigen/Geometry>
#include <algorithm>
#include <cmath>
#include <numeric>
#include <stdexcept>

namespace lightledger::properties {
namespace {

using reference::Vector;
using trace::RayBlock;

Vector first(const double (&components)[3][RayBlock::lanes]) {
  return {components[0][0], components[1][0], components[2][0]};
}

void put(double (&components)[3][RayBlock::lanes], int lane, const Vector& vector) {
  for (int axis = 0; axis < 3; ++axis)
    components[axis][lane] = vector[axis];
}

Eigen::Matrix3d triple(const Vector& u, const Vector& k) {
  Eigen::Matrix3d columns;
  columns << u, k.cross(u), k;
  return columns;
}

template <typename List>
double total_weight(const List& list) {
  double sum = 0.0;
  for (const auto& item : list)
    sum += item.weight;
  return sum;
}

} // namespace

std::vector<reference::DiscPoint> launch_points(const Both& both, std::size_t field) {
  const assembly::Light& light = both.assembly->light;
  if (!light.beam.fill_stop)
    return reference::disc_points(light.beam, light.sampling);
  const auto& [centre, first, second] = both.train.footprints.at(field);
  std::vector<reference::DiscPoint> points = reference::disc_points(assembly::Beam{}, light.sampling);
  for (auto& [at, share] : points)
    at = {centre[0] + at[0] * first[0] + at[1] * second[0], centre[1] + at[0] * first[1] + at[1] * second[1]};
  return points;
}

Both prepare(const assembly::Assembly& assembly) {
  auto own = std::make_unique<assembly::Assembly>(assembly);
  assembly::Faults faults;
  auto train = trace::prepare(*own, faults);
  if (!train)
    throw std::runtime_error(faults.kept().front().message);
  reference::Bench bench = reference::lay_out(*own);
  return {std::move(own), std::move(bench), std::move(*train)};
}

RayBlock block_of(const std::vector<reference::Ray>& rays) {
  RayBlock block{};
  for (const reference::Ray& ray : rays) {
    const int lane = block.count++;
    put(block.p, lane, ray.point);
    put(block.d, lane, ray.direction);
    put(block.u, lane, reference::double_pole_basis(ray.direction).col(0));
    block.J[0][lane] = block.J[6][lane] = 1.0;
    block.w[lane] = 1.0;
    block.alive |= std::uint64_t{1} << lane;
  }
  return block;
}

Run run(const trace::Train& train, const RayBlock& launched, std::size_t wavelength, const Meddle& meddle) {
  const trace::Plan& plan = train.plans.at(wavelength);
  const optics::Coherency coherency = optics::coherency(train.assembly->light.polarization);
  Run result{trace::Ledger(train.assembly->stations.size()), {}, 0};
  result.ledger.launched = std::accumulate(launched.w, launched.w + launched.count, 0.0);
  RayBlock block = launched;
  support::follow(trace::intended_path(*train.assembly, train.routes).steps, plan, coherency, block,
                  [&](const trace::Path::Step& step, const trace::Entry& entry, const trace::Tape&) {
                    result.ledger.enter(step.visit, entry);
                    if (meddle)
                      meddle(step.visit, block);
                    result.behind.push_back(block);
                    ++result.reached;
                  });
  return result;
}

reference::PolarizationMatrix polarization_matrix(const trace::Train& train, const RayBlock& launched,
                                                  const RayBlock& behind, std::size_t station) {
  const Eigen::Matrix3d& axes = train.bench.surface[train.assembly->stations[station].surface].axes;
  Eigen::Matrix3cd jones = Eigen::Matrix3cd::Identity();
  for (int row = 0; row < 2; ++row)
    for (int column = 0; column < 2; ++column)
      jones(row, column) = {behind.J[4 * row + 2 * column][0], behind.J[4 * row + 2 * column + 1][0]};
  const Eigen::Matrix3cd exit =
      (axes * triple(first(behind.u), first(behind.d))).cast<std::complex<double>>();
  const Eigen::Matrix3cd entrance = triple(first(launched.u), first(launched.d)).cast<std::complex<double>>();
  return exit * jones * entrance.transpose();
}

Textbook textbook(const Both& both) {
  const assembly::Light& light = both.assembly->light;
  const double all = total_weight(light.wavelengths) * total_weight(light.fields);
  Textbook result;
  for (const assembly::Wavelength& wavelength : light.wavelengths)
    for (std::size_t f = 0; f < light.fields.size(); ++f)
      for (const reference::DiscPoint& point : launch_points(both, f)) {
        const assembly::Field& field = light.fields[f];
        const auto record = reference::trace(both.bench, *both.assembly, wavelength.nm,
                                             reference::launch(light, field, point.at));
        result.ledger.enter(record, wavelength.weight * field.weight / all * point.share);
        result.left_out += record.comparable() ? 0 : 1;
      }
  result.ledger.stations.resize(both.assembly->stations.size());
  return result;
}

void use_fixed_pattern(assembly::Assembly& assembly) {
  if (std::holds_alternative<assembly::Scattered>(assembly.light.sampling))
    assembly.light.sampling = assembly::Rings{3, 8};
}

bool alike(const trace::Ledger& one, const trace::Ledger& other, double tolerance) {
  const auto near = [&](double a, double b) { return std::abs(a - b) <= tolerance; };
  return one.rows.size() == other.rows.size() &&
         std::equal(one.rows.begin(), one.rows.end(), other.rows.begin(),
                    [&](const trace::Entry& a, const trace::Entry& b) {
                      return near(a.incident, b.incident) && near(a.missed, b.missed) &&
                             near(a.clipped, b.clipped) && near(a.onward, b.onward) &&
                             near(a.aside, b.aside) && near(a.absorbed, b.absorbed) &&
                             near(a.scattered, b.scattered) && near(a.extra, b.extra) && near(a.bulk, b.bulk);
                    });
}

} // namespace lightledger::properties
