#pragma once

#include "arrival.hpp"

#include <lightledger/optics/polarization.hpp>
#include <lightledger/trace/path_tree.hpp>
#include <lightledger/trace/sampling.hpp>
#include <lightledger/trace/tree.hpp>

#include <vector>

namespace lightledger::trace {

/// Follows rays along all paths of a tree.
class TreeSurvey {
public:
  using Found = TreeFound;

  TreeSurvey(const Train& train, const PathTree& tree, double floor);

  [[nodiscard]] TreeFound blank(const Group& group) const;
  void follow(const Group& group, RayBlock& block, TreeFound& found) const;
  [[nodiscard]] bool accurate(const Samples<TreeFound>& samples, double goal) const;
  /// The standard error of the ghosts.
  [[nodiscard]] static double error(const Samples<TreeFound>& samples);

private:
  friend class TreeWalk;

  const Train& m_train;
  const PathTree& m_tree;
  double m_floor;
  double m_reflectance; ///< of the detector
  optics::Coherency m_coherency;
  ArrivalReader m_reader;
  std::vector<PlanOp> m_detectors; ///< per wavelength: the detector, which reflects what it lets through too
};

} // namespace lightledger::trace
