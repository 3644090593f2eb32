#pragma once

#include <lightledger/assembly/assembly.hpp>
#include <lightledger/trace/routes.hpp>

#include <cstdint>
#include <map>
#include <string>
#include <tuple>
#include <vector>

namespace lightledger::trace {

/// All ways through a train with at most so many bounces, as a graph of meetings and a numbering of its
/// paths.
///
/// A bounce is a reflection where the light should pass (contract §5, ghosts): at a refracting station,
/// within a plate, or at a detector that reflects. The paths that end at the detector or leave through the
/// first station are numbered in the order in which a walk finds them that explores, at each meeting, first
/// the beam on the side and then the one that goes on as intended; so the paths of a branch have consecutive
/// numbers.
class PathTree {
public:
  using JunctionId = std::uint32_t;
  using PathNumber = std::uint64_t;

  /// Where one of the beams of a meeting goes.
  struct Exit {
    bool onward;
    LegId leg;
    JunctionId to;
    End end; ///< where it does not go onward
  };
  /// A meeting. Its main beam is the one that the surface is there for and costs no bounce.
  struct Junction {
    State state;
    OpId op;
    bool detects;
    bool main_bounces; ///< the main beam is the reflected one
    bool side_bounces; ///< the beam on the side costs a bounce
    Exit main, side;   ///< of a detector only the side: the beam that it reflects
  };

  PathTree(const assembly::Assembly& assembly, const Routes& routes, int bounces);

  [[nodiscard]] int bounces() const { return m_bounces; }
  [[nodiscard]] const Exit& start() const { return m_start; }
  [[nodiscard]] const Junction& junction(JunctionId id) const { return m_junctions[id]; }
  [[nodiscard]] std::size_t junctions() const { return m_junctions.size(); }

  /// Paths from an exit on, with at most so many bounces, that end at the detector or return.
  [[nodiscard]] PathNumber paths(const Exit& exit, int left) const;
  /// Paths of the whole tree that end at the detector, the intended one included.
  [[nodiscard]] PathNumber detected() const { return counts_from(m_start, m_bounces).detected; }

  /// Of the paths with numbers below this, how many end at the detector.
  [[nodiscard]] PathNumber detected_below(PathNumber number) const;

  /// The path of a number below paths(start(), bounces()).
  struct Way {
    Path path;
    std::vector<State> states;        ///< per step
    std::vector<std::size_t> bounces; ///< steps that bounce
  };
  [[nodiscard]] Way way(PathNumber number) const;

  /// Whether the beam on the side is followed with so many bounces left, and how many it then has.
  [[nodiscard]] static bool follows_side(const Junction& junction, int left) {
    return junction.side_bounces ? left > 0 : junction.side.onward;
  }
  [[nodiscard]] static int left_aside(const Junction& junction, int left) {
    return junction.side_bounces ? left - 1 : left;
  }

private:
  struct Counts {
    PathNumber detected = 0, returned = 0;
  };

  JunctionId add(State state);
  Exit exit(const Hop& hop);
  void connect(const assembly::Assembly& assembly, const Routes& routes, JunctionId id);
  void count();
  [[nodiscard]] Counts counts_at(JunctionId id, int left) const;
  [[nodiscard]] Counts counts_from(const Exit& exit, int left) const;
  [[nodiscard]] std::size_t place(JunctionId id, int left) const {
    return std::size_t{id} * static_cast<std::size_t>(m_bounces + 1) + static_cast<std::size_t>(left);
  }

  int m_bounces;
  std::map<std::tuple<StationId, Heading, Face>, JunctionId> m_known;
  std::vector<Junction> m_junctions;
  Exit m_start;
  std::vector<Counts> m_counts; ///< per junction, by bounces left
};

/// What the bounces of a way are called, in their order.
[[nodiscard]] std::vector<std::string> bounce_names(const assembly::Assembly& assembly,
                                                    const PathTree::Way& way);

} // namespace lightledger::trace
