#include "label_layout.hpp"

#include <algorithm>
#include <array>
#include <cmath>

namespace lightledger::report {
namespace {

constexpr double padding = 2.5;
/// What a crossed line costs, in px of a longer leader.
constexpr double cost_of_ray = 6.0;
constexpr double cost_of_surface = 25.0;
constexpr double cost_of_label = 60.0; ///< of a leader through another label

double cross(const Vector2d& one, const Vector2d& other) {
  return one[0] * other[1] - one[1] * other[0];
}

bool meet(const Segment& one, const Segment& other) {
  const Vector2d along = one.to - one.from;
  const Vector2d across = other.to - other.from;
  const double turn = cross(along, across);
  if (std::abs(turn) < 1e-12)
    return false;
  const Vector2d between = other.from - one.from;
  const double on_one = cross(between, across) / turn;
  const double on_other = cross(between, along) / turn;
  return on_one >= 0.0 && on_one <= 1.0 && on_other >= 0.0 && on_other <= 1.0;
}

/// The box whose nearest side or corner, seen along `outward`, touches the point.
Box beside(const Vector2d& point, const Vector2d& outward, const Vector2d& size) {
  const double stretch = std::max(std::abs(outward[0]) / size[0], std::abs(outward[1]) / size[1]);
  const Vector2d centre = point + outward * (0.5 / stretch);
  return {centre - 0.5 * size, centre + 0.5 * size};
}

Vector2d nearest(const Box& box, const Vector2d& point) {
  return point.cwiseMax(box.low).cwiseMin(box.high);
}

} // namespace

bool Box::overlaps(const Box& other) const {
  return (low.array() < other.high.array()).all() && (other.low.array() < high.array()).all();
}

/// Liang & Barsky (ACM Trans. Graph. 3, 1 (1984)).
bool crosses(const Segment& segment, const Box& box) {
  double enter = 0.0;
  double leave = 1.0;
  const Vector2d along = segment.to - segment.from;
  for (int axis = 0; axis < 2; ++axis) {
    if (std::abs(along[axis]) < 1e-12) {
      if (segment.from[axis] < box.low[axis] || segment.from[axis] > box.high[axis])
        return false;
      continue;
    }
    const double low = (box.low[axis] - segment.from[axis]) / along[axis];
    const double high = (box.high[axis] - segment.from[axis]) / along[axis];
    enter = std::max(enter, std::min(low, high));
    leave = std::min(leave, std::max(low, high));
  }
  return enter <= leave;
}

std::vector<double> spread(std::span<const double> wanted, std::span<const double> distances) {
  struct Group {
    double sum;
    std::size_t count;
    [[nodiscard]] double mean() const { return sum / static_cast<double>(count); }
  };
  std::vector<Group> groups;
  double taken = 0.0;
  for (std::size_t i = 0; i < wanted.size(); ++i) {
    taken += i == 0 ? 0.0 : distances[i - 1];
    groups.push_back({wanted[i] - taken, 1});
    while (groups.size() > 1 && groups[groups.size() - 2].mean() >= groups.back().mean()) {
      const Group last = groups.back();
      groups.pop_back();
      groups.back().sum += last.sum;
      groups.back().count += last.count;
    }
  }
  std::vector<double> places;
  taken = 0.0;
  for (const Group& group : groups)
    for (std::size_t i = 0; i < group.count; ++i) {
      taken += places.empty() ? 0.0 : distances[places.size() - 1];
      places.push_back(group.mean() + taken);
    }
  return places;
}

bool LabelPlacer::free(const Box& box) const {
  const Box padded{box.low.array() - padding, box.high.array() + padding};
  return std::ranges::none_of(m_placed, [&](const Placed& other) { return padded.overlaps(other.box); }) &&
         std::ranges::none_of(m_forbidden, [&](const Segment& line) { return crosses(line, padded); });
}

double LabelPlacer::crossings(const Placed& placed) const {
  double cost = 0.0;
  for (const Segment& line : m_avoided)
    cost += crosses(line, placed.box) ? cost_of_ray : 0.0;
  for (const Segment& line : m_forbidden)
    cost += meet(line, placed.leader) ? cost_of_surface : 0.0;
  for (const Placed& other : m_placed)
    cost += crosses(other.leader, placed.box) || crosses(placed.leader, other.box) ? cost_of_label : 0.0;
  return cost;
}

std::optional<Placed> LabelPlacer::place(std::span<const Tie> ties, const Vector2d& size) {
  constexpr std::array<double, 8> away{9.0, 18.0, 30.0, 44.0, 62.0, 84.0, 110.0, 140.0};
  constexpr std::array<double, 11> aside{0.0, 9.0, -9.0, 20.0, -20.0, 36.0, -36.0, 60.0, -60.0, 95.0, -95.0};
  std::optional<Placed> best;
  double least = INFINITY;
  for (const Tie& tie : ties)
    for (const double distance : away)
      for (const double slide : aside) {
        const Vector2d along(-tie.outward[1], tie.outward[0]);
        const Box box = beside(tie.point + distance * tie.outward + slide * along, tie.outward, size);
        const double length = distance + 0.8 * std::abs(slide);
        if (length >= least || !free(box))
          continue;
        const Vector2d start = tie.point + 2.0 * tie.outward;
        const Placed placed{box, {start, nearest(box, start)}};
        const double cost = length + crossings(placed);
        if (cost >= least)
          continue;
        least = cost;
        best = placed;
      }
  if (best) {
    m_placed.push_back(*best);
  }
  return best;
}

} // namespace lightledger::report
