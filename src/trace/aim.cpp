#include <lightledger/assembly/document.hpp>
#include <lightledger/trace/aim.hpp>
#include <lightledger/trace/interact.hpp>

#include <fmt/format.h>

#include <Eigen/Core>
#include <Eigen/LU>
#include <algorithm>
#include <cmath>
#include <string>

namespace lightledger::trace {
namespace {

using assembly::Assembly;
using assembly::Clear;
using assembly::Field;
using Eigen::Matrix2d;
using Eigen::Vector2d;

constexpr double aimed = 1e-10;     ///< mm in the stop
constexpr double probe = 1e-5;      ///< mm between the rays that measure a slope
constexpr double least_step = 1e-3; ///< of the way from an easy aim to the one wanted
constexpr int newton_cap = 30;

/// The half lengths of a stop's opening along its own x and y; none where it has no outline.
std::optional<Vector2d> half_lengths(const Clear& clear) {
  if (const auto* disc = std::get_if<Clear::Disc>(&clear.opening))
    return Vector2d(disc->radius, disc->radius);
  if (const auto* rectangle = std::get_if<Clear::Rectangle>(&clear.opening))
    return Vector2d(rectangle->half_width, rectangle->half_height);
  if (const auto* ellipse = std::get_if<Clear::Ellipse>(&clear.opening))
    return Vector2d(ellipse->semi_x, ellipse->semi_y);
  return std::nullopt;
}

/// Real rays from the launch plane to the stop, with all apertures open.
class Aimer {
public:
  Aimer(const Assembly& assembly, const Path& path, const Plan& plan, std::size_t stop)
      : m_assembly(assembly), m_clear(clear_of(stop)) {
    for (std::size_t i = 0; i <= stop; ++i) {
      const Path::Step& step = path.steps[i];
      PlanOp op = plan.ops[step.op];
      op.clear = ClearKind::unlimited;
      op.hole = 0.0;
      m_steps.push_back({plan.legs[step.leg], op, step.act == Act::bounce});
    }
  }

  /// The launch ellipse of a field, or none; then failure() tells why.
  std::optional<Footprint> footprint(const Field& field) {
    const auto half = half_lengths(m_clear);
    const auto centre = aim_at(field, stop_centre());
    if (!half || !centre)
      return std::nullopt;
    const Source source(m_assembly.light, field);
    const auto right = aim_outward(source, *centre, {(*half)[0], 0.0});
    const auto left = aim_outward(source, *centre, {-(*half)[0], 0.0});
    const auto up = aim_outward(source, *centre, {0.0, (*half)[1]});
    const auto down = aim_outward(source, *centre, {0.0, -(*half)[1]});
    if (!right || !left || !up || !down)
      return std::nullopt;
    const Vector2d middle = 0.25 * (*right + *left + *up + *down);
    const Vector2d first = 0.5 * (*right - *left);
    const Vector2d second = 0.5 * (*up - *down);
    return Footprint{{middle[0], middle[1]}, {first[0], first[1]}, {second[0], second[1]}};
  }

  /// The launch point from which a field's ray meets the stop at a point of it. From the axial field, whose
  /// ray runs near the axis, out to the field wanted.
  std::optional<Vector2d> aim_at(const Field& field, const Vector2d& target) {
    const auto share_of = [&](double share) {
      return Source(m_assembly.light, Field{{share * field.at[0], share * field.at[1]}, 1.0, {}});
    };
    const auto axial = newton(share_of(0.0), target, Vector2d::Zero());
    if (!axial)
      return std::nullopt;
    return follow(
        *axial, [&](double share, const Vector2d& start) { return newton(share_of(share), target, start); });
  }

  [[nodiscard]] const std::string& failure() const { return m_failure; }

private:
  struct Step {
    PlanLeg leg;
    PlanOp op;
    bool bounces;
  };

  [[nodiscard]] const Clear& clear_of(std::size_t station) const {
    return m_assembly.surfaces[m_assembly.stations[station].surface].clear;
  }

  [[nodiscard]] Vector2d stop_centre() const { return {m_clear.at[0], m_clear.at[1]}; }

  /// Where the ray from a launch point meets the stop, in the stop's x, y.
  std::optional<Vector2d> meet(const Source& source, const Vector2d& launch) {
    RayBlock block{};
    block.count = 1;
    block.alive = 1;
    block.w[0] = 1.0;
    block.p[0][0] = launch[0];
    block.p[1][0] = launch[1];
    source.aim(block, 0);
    for (std::size_t i = 0; i < m_steps.size(); ++i) {
      const Step& step = m_steps[i];
      Entry entry;
      StepOut out;
      out.entry = &entry;
      out.bounces = step.bounces;
      (step.bounces ? out.bounce : out.pass) = &block;
      interact(step.leg, step.op, optics::Coherency{}, block, out);
      if (block.alive == 0) {
        m_failure = fmt::format("{} '{}'", entry.missed > 0.0 ? "they miss" : "they are totally reflected at",
                                m_assembly.stations[i].name);
        return std::nullopt;
      }
    }
    return Vector2d(block.p[0][0], block.p[1][0]);
  }

  std::optional<Matrix2d> slopes(const Source& source, const Vector2d& launch, const Vector2d& hit) {
    Matrix2d slopes;
    for (int axis = 0; axis < 2; ++axis) {
      const auto beside = meet(source, launch + probe * Vector2d::Unit(axis));
      if (!beside)
        return std::nullopt;
      slopes.col(axis) = (*beside - hit) / probe;
    }
    return slopes;
  }

  /// Newton's method from a launch point near the one wanted; steps that lead off the surfaces are halved.
  std::optional<Vector2d> newton(const Source& source, const Vector2d& target, Vector2d launch) {
    auto hit = meet(source, launch);
    for (int round = 0; hit && round < newton_cap; ++round) {
      const Vector2d error = *hit - target;
      if (error.norm() <= aimed)
        return launch;
      const auto matrix = slopes(source, launch, *hit);
      if (!matrix || std::abs(matrix->determinant()) < 1e-12)
        break;
      Vector2d step = matrix->inverse() * error;
      std::optional<Vector2d> nearer;
      for (int halving = 0; halving < 12 && !nearer; ++halving, step *= 0.5) {
        const auto next = meet(source, launch - step);
        if (next && (*next - target).norm() < error.norm()) {
          nearer = next;
          launch -= step;
        }
      }
      hit = nearer;
    }
    if (m_failure.empty())
      m_failure = "they do not settle on it";
    return std::nullopt;
  }

  /// Goes from an aim that is known to one that is wanted in steps as small as it takes. `solve(share,
  /// start)` aims at a share of the way.
  template <typename Solve>
  static std::optional<Vector2d> follow(Vector2d launch, Solve solve) {
    double done = 0.0;
    double step = 1.0;
    while (done < 1.0) {
      const double next = std::min(done + step, 1.0);
      if (const auto found = solve(next, launch)) {
        launch = *found;
        done = next;
        step *= 2.0;
      } else if ((step *= 0.5) < least_step) {
        return std::nullopt;
      }
    }
    return launch;
  }

  std::optional<Vector2d> aim_outward(const Source& source, const Vector2d& centre, const Vector2d& edge) {
    return follow(centre, [&](double share, const Vector2d& start) {
      return newton(source, stop_centre() + share * edge, start);
    });
  }

  const Assembly& m_assembly;
  Clear m_clear;
  std::vector<Step> m_steps;
  std::string m_failure;
};

std::optional<std::size_t> first_stop(const Assembly& assembly) {
  const auto& stations = assembly.stations;
  const auto found = std::find_if(stations.begin(), stations.end(), [&](const assembly::Station& station) {
    return std::holds_alternative<assembly::Opening>(assembly.surfaces[station.surface].effect);
  });
  if (found == stations.end())
    return std::nullopt;
  return static_cast<std::size_t>(found - stations.begin());
}

Footprint disc(const assembly::Beam& beam) {
  return {beam.at, {beam.radius, 0.0}, {0.0, beam.radius}};
}

std::string name_of(const Field& field, std::size_t number) {
  return field.name ? fmt::format("field '{}'", *field.name) : fmt::format("field {}", number + 1);
}

} // namespace

std::optional<std::vector<Footprint>> footprints(const Assembly& assembly, const Path& path, const Plan& plan,
                                                 assembly::Faults& faults) {
  const auto& fields = assembly.light.fields;
  if (!assembly.light.beam.fill_stop)
    return std::vector<Footprint>(fields.size(), disc(assembly.light.beam));
  const auto fault = [&](std::string message) {
    const assembly::Mark mark =
        assembly.document ? assembly.document->locate("light.beam") : assembly::Mark{};
    faults.add({mark, std::move(message), "", ""});
  };
  const auto stop = first_stop(assembly);
  if (!stop) {
    fault("the beam is to fill the first stop, but the train has no stop");
    return std::nullopt;
  }
  std::vector<Footprint> all;
  for (std::size_t i = 0; i < fields.size(); ++i) {
    Aimer aimer(assembly, path, plan, *stop);
    const auto found = aimer.footprint(fields[i]);
    if (found)
      all.push_back(*found);
    else
      fault(fmt::format("no rays of {} fill the stop '{}': {}", name_of(fields[i], i),
                        assembly.stations[*stop].name, aimer.failure()));
  }
  return all.size() == fields.size() ? std::optional(std::move(all)) : std::nullopt;
}

std::array<double, 2> chief_launch(const Assembly& assembly, const Path& path, const Plan& plan,
                                   const Field& field) {
  const auto stop = first_stop(assembly);
  if (!stop)
    return assembly.light.beam.at;
  const auto launch = Aimer(assembly, path, plan, *stop).aim_at(field, Vector2d::Zero());
  // At a stop in an image of the object all rays of a field meet in one point: none of them is nearer.
  if (!launch)
    return assembly.light.beam.at;
  return {(*launch)[0], (*launch)[1]};
}

} // namespace lightledger::trace
