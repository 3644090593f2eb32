#pragma once

#include "tree_walk.hpp"

#include <lightledger/trace/path_tree.hpp>
#include <lightledger/trace/sampling.hpp>
#include <lightledger/trace/tree.hpp>

namespace lightledger::trace {

/// Follows rays along all paths of a tree.
class TreeSurvey {
public:
  using Found = TreeFound;

  TreeSurvey(const Train& train, const PathTree& tree, double floor) : m_setting(train, tree, floor) {}

  [[nodiscard]] TreeFound blank(const Group& group) const;
  void follow(const Group& group, RayBlock& block, TreeFound& found) const;
  [[nodiscard]] bool accurate(const Samples<TreeFound>& samples, double goal) const;
  /// The standard error of the ghosts.
  [[nodiscard]] static double error(const Samples<TreeFound>& samples);

private:
  TreeSetting m_setting;
};

} // namespace lightledger::trace
