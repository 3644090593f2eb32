#pragma once

#include <Eigen/Core>
#include <optional>
#include <span>
#include <vector>

/// Where the names of things may stand without covering each other or what they name. Places are in px, y
/// downward.
namespace lightledger::report {

using Eigen::Vector2d;

struct Box {
  Vector2d low, high;

  [[nodiscard]] Vector2d centre() const { return 0.5 * (low + high); }
  [[nodiscard]] bool overlaps(const Box& other) const;
};

struct Segment {
  Vector2d from, to;
};
[[nodiscard]] bool crosses(const Segment& segment, const Box& box);

/// Places as near as may be, in the least-squares sense, to those wanted (ascending) and at least the given
/// distances apart: isotonic regression of what is left after the distances are taken off.
[[nodiscard]] std::vector<double> spread(std::span<const double> wanted, std::span<const double> distances);

/// A point that a label may be tied to, and the unit vector that leads away from the drawing there.
struct Tie {
  Vector2d point, outward;
};

struct Placed {
  Box box;
  Segment leader;
};

/// Finds room for one label after the other, beside what is drawn already.
class LabelPlacer {
public:
  /// What labels must not cover, and what they should not.
  void forbid(const Segment& line) { m_forbidden.push_back(line); }
  void avoid(const Segment& line) { m_avoided.push_back(line); }

  /// The best place for a label of some size near one of its ties; none where all are taken.
  std::optional<Placed> place(std::span<const Tie> ties, const Vector2d& size);

private:
  [[nodiscard]] bool free(const Box& box) const;
  [[nodiscard]] double crossings(const Placed& placed) const;

  std::vector<Segment> m_forbidden, m_avoided;
  std::vector<Placed> m_placed;
};

} // namespace lightledger::report
