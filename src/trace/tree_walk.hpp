#pragma once

#include "arrival.hpp"

#include <lightledger/optics/polarization.hpp>
#include <lightledger/trace/interact.hpp>
#include <lightledger/trace/path_tree.hpp>
#include <lightledger/trace/tree.hpp>

#include <memory>
#include <optional>
#include <vector>

namespace lightledger::trace {

/// What all walks through a tree have in common.
struct TreeSetting {
  TreeSetting(const Train& of_train, const PathTree& of_paths, double cut_below);

  const Train& train;
  const PathTree& tree;
  double floor;       ///< beams that may bring a smaller share of the launched power are cut off
  double reflectance; ///< of the detector
  optics::Coherency coherency;
  ArrivalReader reader;
  std::vector<PlanOp> detectors; ///< per wavelength, reflecting
  /// Per wavelength and operator, what it reflects at normal incidence: a guess of what it reflects at all.
  std::vector<std::vector<double>> reflects;
  /// Per wavelength and meeting, the share of the light on its way there that may at most reach the detector
  /// by one path: all where it goes there by itself, else what its strongest bounce on the way reflects.
  std::vector<std::vector<double>> prospects;
};

/// A run of light from one meeting to the next.
struct Run {
  LegId leg;
  const PathTree::Junction& junction;               ///< where it leads
  const RayBlock& before;                           ///< as it left the meeting before
  const RayBlock& after;                            ///< as its main beam leaves this one
  const std::vector<PathTree::JunctionId>& bounced; ///< so far
};

/// Is told of every run of light; rays are copied for it, so it is for few of them.
class TreeObserver {
public:
  TreeObserver() = default;
  TreeObserver(const TreeObserver&) = delete;
  TreeObserver& operator=(const TreeObserver&) = delete;
  virtual ~TreeObserver() = default;

  virtual void see(const Run& run) = 0;
};

/// One block of rays on its way through the tree, depth first.
class TreeWalk {
public:
  TreeWalk(const TreeSetting& setting, std::size_t wavelength, TreeFound& found,
           TreeObserver* observer = nullptr);

  void run(const RayBlock& block);

private:
  /// The rays of one beam, before and behind a meeting in turn.
  struct Level {
    RayBlock block[2];
    int first;      ///< which of them holds the rays
    LaneMap launch; ///< of each lane, the lane in which its ray was launched
  };
  /// Where in the tree a beam is: bounces left, and the number of the first path that starts here.
  struct Place {
    int left;
    PathTree::PathNumber number;
  };

  void see_image(const RayBlock& block);
  void follow(PathTree::Exit exit, double power, std::size_t depth, Place place);
  double pass(LegId leg, const PathTree::Junction& junction, std::size_t depth);
  double fork(const PathTree::Exit& exit, std::size_t depth, Place& place);
  std::optional<double> pass_by(const PathTree::Exit& exit, double power, std::size_t depth, Place& place);
  void branch(const PathTree::Exit& exit, double power, std::size_t depth, Place place);
  bool cut_off(const PathTree::Exit& exit, double power, Place place);
  void end(End end, double power, Place place);
  void arrive(const Level& level, Place place);
  void enter(const Entry& entry);
  [[nodiscard]] bool bounced(Place place) const { return place.left < m_tree.bounces(); }

  const TreeSetting& m_setting;
  const PathTree& m_tree;
  const Plan& m_plan;
  const PlanOp& m_detector;
  TreeFound& m_found;
  TreeObserver* m_observer;
  std::unique_ptr<Level[]> m_levels;
  double m_faintest = 0.0;
  Arrival m_image, m_arrival;
  const std::vector<double>& m_reflects;
  const std::vector<double>& m_prospects;
  PathTable m_paths, m_returned;
  PathSpans m_cut;
  std::vector<PathTree::JunctionId> m_bounced;
};

} // namespace lightledger::trace
