#include "drawn_rays.hpp"

#include <lightledger/trace/interact.hpp>

#include <algorithm>
#include <cmath>

namespace lightledger::analysis {
namespace {

using Eigen::Vector2d;
using Eigen::Vector3d;
using trace::RayBlock;
using trace::Train;

/// Places across the beam, relative to its radius, that show a field without crowding the picture; the
/// outermost lie just inside the edge, where rounding does not decide over them.
std::vector<double> places(std::size_t fields, double hole) {
  constexpr double edge = 0.998;
  const int a_side = fields == 1 ? 3 : fields <= 3 ? 2 : 1;
  const double inner = hole > 0.0 ? hole + (1.0 - edge) : 0.0;
  std::vector<double> found;
  for (int i = -a_side; i <= a_side; ++i) {
    if (i == 0 && hole > 0.0)
      continue;
    const int steps = hole > 0.0 ? a_side - 1 : a_side;
    const int step = hole > 0.0 ? std::abs(i) - 1 : std::abs(i);
    const double share = steps > 0 ? static_cast<double>(step) / steps : 0.5;
    found.push_back(std::copysign(inner + share * (edge - inner), i));
  }
  return found;
}

Vector3d row(const double (&values)[3][RayBlock::lanes]) {
  return {values[0][0], values[1][0], values[2][0]};
}

/// Follows single rays, for which the ledger's entry tells how they end.
class Follower {
public:
  Follower(const trace::Train& train, const trace::Path& path)
      : m_train(train), m_path(path), m_plan(train.plans.front()),
        m_coherency(optics::coherency(train.assembly->light.polarization)),
        m_reach(train.assembly->surfaces.size(), 0.0) {}

  DrawnRay follow(std::size_t field, const Vector2d& launch, double lead) {
    RayBlock block = launched(field, launch);
    DrawnRay ray{field, {start(block, lead)}, RayEnd::arrived};
    for (const trace::Path::Step& step : m_path.steps) {
      trace::Entry entry;
      trace::Tape tape;
      trace::StepOut out;
      out.entry = &entry;
      out.tape = &tape;
      out.bounces = step.act == trace::Act::bounce;
      (out.bounces ? out.bounce : out.pass) = &block;
      interact(m_plan.legs[step.leg], operator_of(step), m_coherency, block, out);
      if (entry.missed > 0.0)
        return ended(std::move(ray), RayEnd::missed);
      note_hit(surface_of(step.op), row(tape.hit), ray);
      if (entry.clipped > 0.0)
        return ended(std::move(ray), RayEnd::clipped);
      if (block.alive == 0)
        return ended(std::move(ray), RayEnd::turned_back);
    }
    return ray;
  }

  [[nodiscard]] const std::vector<double>& reach() const { return m_reach; }
  /// Where the last ray ended, in its surface's frame.
  [[nodiscard]] const Vector3d& hit() const { return m_hit; }

private:
  [[nodiscard]] RayBlock launched(std::size_t field, const Vector2d& launch) const {
    const assembly::Light& light = m_train.assembly->light;
    RayBlock block{};
    block.count = 1;
    block.alive = 1;
    block.w[0] = 1.0;
    block.p[0][0] = launch[0];
    block.p[1][0] = launch[1];
    trace::Source(light, light.fields[field]).aim(block, 0);
    return block;
  }

  /// The surface as it is, but for a detector off which the path bounces: its operator only takes light in,
  /// so it becomes a mirror. Where a ray runs does not depend on how much it carries.
  [[nodiscard]] trace::PlanOp operator_of(const trace::Path::Step& step) const {
    trace::PlanOp op = m_plan.ops[step.op];
    const bool detector = m_train.assembly->stations[step.visit].intended == trace::Act::detect;
    if (detector && step.act == trace::Act::bounce) {
      op.amplitude = trace::AmplitudeKind::ideal;
      op.reflect_s = op.reflect_p = 1.0;
      op.transmit_s = op.transmit_p = 0.0;
    }
    return op;
  }

  [[nodiscard]] Vector3d start(const RayBlock& block, double lead) const {
    const Vector3d direction = row(block.d);
    double before = lead;
    if (const auto distance = m_train.assembly->light.object_distance; distance && *distance > 0.0)
      before = std::min(lead, *distance / direction[2]);
    const trace::Frame& frame = m_train.bench.arriving.front();
    return frame.origin + frame.axes * (row(block.p) - before * direction);
  }

  void note_hit(assembly::SurfaceId surface, const Vector3d& hit, DrawnRay& ray) {
    m_hit = hit;
    const trace::Frame& frame = m_train.bench.surface[surface];
    ray.points.push_back(frame.origin + frame.axes * hit);
    m_reach[surface] = std::max(m_reach[surface], std::hypot(hit[0], hit[1]));
  }

  /// Each surface has two operators, one a side.
  static assembly::SurfaceId surface_of(trace::OpId op) { return op / 2; }

  static DrawnRay ended(DrawnRay ray, RayEnd end) {
    ray.end = end;
    return ray;
  }

  const trace::Train& m_train;
  const trace::Path& m_path;
  const trace::Plan& m_plan;
  optics::Coherency m_coherency;
  std::vector<double> m_reach;
  Vector3d m_hit = Vector3d::Zero();
};

Vector2d on_launch_plane(const trace::Footprint& footprint, View view, double place) {
  const std::array<double, 2>& half = view == View::y ? footprint.first : footprint.second;
  return {footprint.centre[0] + place * half[0], footprint.centre[1] + place * half[1]};
}

/// Points that cover the unit disc evenly outside a hole: equal areas, a golden angle apart (Vogel, Math.
/// Biosci. 44, 179 (1979)).
std::vector<Vector2d> disc_points(double hole) {
  constexpr int count = 36;
  constexpr double golden_angle = 2.399963229728653;
  std::vector<Vector2d> points;
  for (int i = 0; i < count; ++i) {
    const double area = (i + 0.5) / count;
    const double radius = std::sqrt(hole * hole + area * (1.0 - hole * hole));
    points.emplace_back(radius * std::cos(golden_angle * i), radius * std::sin(golden_angle * i));
  }
  return points;
}

double hole_of(const assembly::Beam& beam) {
  return beam.fill_stop ? 0.0 : beam.inner / beam.radius;
}

} // namespace

std::vector<Vector2d> spot(const Train& train, const trace::Path& path) {
  const assembly::Light& light = train.assembly->light;
  Follower follower(train, path);
  std::vector<Vector2d> hits;
  for (std::size_t field = 0; field < light.fields.size(); ++field)
    for (const Vector2d& place : disc_points(hole_of(light.beam))) {
      const trace::Footprint& footprint = train.footprints[field];
      const Vector2d launch(
          footprint.centre[0] + place[0] * footprint.first[0] + place[1] * footprint.second[0],
          footprint.centre[1] + place[0] * footprint.first[1] + place[1] * footprint.second[1]);
      if (follower.follow(field, launch, 0.0).end == RayEnd::arrived)
        hits.emplace_back(follower.hit().head<2>());
    }
  return hits;
}

Fan fan(const trace::Train& train, const trace::Path& path, View view, double lead) {
  const assembly::Light& light = train.assembly->light;
  const double hole = hole_of(light.beam);
  Follower follower(train, path);
  Fan fan;
  for (std::size_t field = 0; field < light.fields.size(); ++field)
    for (const double place : places(light.fields.size(), hole))
      fan.rays.push_back(follower.follow(field, on_launch_plane(train.footprints[field], view, place), lead));
  fan.reach = follower.reach();
  return fan;
}

} // namespace lightledger::analysis
