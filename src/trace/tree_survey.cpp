#include "tree_survey.hpp"

#include <algorithm>

namespace lightledger::trace {

TreeFound TreeSurvey::blank(const Group&) const {
  TreeFound found;
  found.reflectance = m_setting.reflectance;
  return found;
}

void TreeSurvey::follow(const Group& group, RayBlock& block, TreeFound& found) const {
  TreeWalk(m_setting, group.wavelength, found).run(block);
}

double TreeSurvey::error(const Samples<TreeFound>& samples) {
  return standard_error(residuals(samples, [](const TreeFound& found) { return found.ghosts; }));
}

bool TreeSurvey::accurate(const Samples<TreeFound>& samples, double goal) const {
  constexpr double relative = 0.01;       // of the ghosts,
  constexpr double usual_accuracy = 1e-4; // and in proportion for smaller accuracies
  double ghosts = 0.0;
  for (const Sample<TreeFound>& sample : samples)
    ghosts += sample.group.share * sample.sum([](const auto& tally) { return tally.found.ghosts; }) /
              sample.launched();
  return error(samples) <= relative * std::min(goal / usual_accuracy, 1.0) * ghosts;
}

} // namespace lightledger::trace
