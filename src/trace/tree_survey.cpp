#include "reflecting_detector.hpp"
#include "tree_survey.hpp"

#include <lightledger/trace/interact.hpp>

#include <algorithm>
#include <memory>

namespace lightledger::trace {
namespace {

using JunctionId = PathTree::JunctionId;

double launched(const RayBlock& block) {
  double power = 0.0;
  for (int lane = 0; lane < block.count; ++lane)
    power += block.w[lane];
  return power;
}

} // namespace

/// One block of rays on its way through the tree, depth first.
class TreeWalk {
public:
  TreeWalk(const TreeSurvey& survey, const Group& group, TreeFound& found)
      : m_survey(survey), m_tree(survey.m_tree), m_plan(*group.plan),
        m_detector(survey.m_detectors[group.wavelength]), m_found(found),
        m_levels(new Level[static_cast<std::size_t>(m_tree.bounces()) + most_free_sides + 2]) {}

  void run(const RayBlock& block) {
    m_faintest = m_survey.m_floor * launched(block);
    see_image(block);
    m_levels[0].block[0] = block;
    m_levels[0].first = 0;
    follow(m_tree.start(), 0, {m_tree.bounces(), 0});
    m_found.paths += m_paths;
    m_found.returned += m_returned;
    m_found.cut += m_cut;
  }

private:
  /// Beams on the side that cost no bounce and hang in each other.
  static constexpr std::size_t most_free_sides = 4;

  /// The rays of one beam, before and behind a meeting in turn.
  struct Level {
    RayBlock block[2];
    int first; ///< which of them holds the rays
  };
  /// Where in the tree a beam is: bounces left, and the number of the first path that starts here.
  struct Place {
    int left;
    PathTree::PathNumber number;
  };

  /// What arrives as intended, for the comparison of each ghost with it.
  void see_image(const RayBlock& block) {
    Level& level = m_levels[0];
    level.block[0] = block;
    for (PathTree::Exit exit = m_tree.start(); exit.onward; exit = m_tree.junction(exit.to).main) {
      const PathTree::Junction& junction = m_tree.junction(exit.to);
      StepOut out;
      (junction.main_bounces ? out.bounce : out.pass) = &level.block[0];
      out.bounces = junction.main_bounces;
      interact(m_plan.legs[exit.leg], m_plan.ops[junction.op], m_survey.m_coherency, level.block[0], out);
      if (level.block[0].alive == 0)
        break;
    }
    m_survey.m_reader.read(level.block[0], m_image);
  }

  /// Follows the beam of a level to its end, and at each fork first the beam on the side.
  void follow(PathTree::Exit exit, std::size_t depth, Place place) {
    double power = 0.0;
    while (exit.onward) {
      const PathTree::Junction& junction = m_tree.junction(exit.to);
      if (PathTree::follows_side(junction, place.left))
        power = fork(exit.leg, junction, depth, place);
      else
        power = pass(exit.leg, junction, depth);
      exit = junction.main;
      const bool bounced = place.left < m_tree.bounces();
      if (exit.onward && cut_off(exit, power, place, bounced))
        return;
    }
    if (exit.end == End::detected)
      arrive(m_levels[depth].block[m_levels[depth].first], place);
    else
      end(exit.end, power, place);
  }

  /// A meeting at which only the main beam is followed; the power of what goes on.
  double pass(LegId leg, const PathTree::Junction& junction, std::size_t depth) {
    Level& level = m_levels[depth];
    RayBlock& block = level.block[level.first];
    Entry entry;
    StepOut out;
    out.entry = &entry;
    out.bounces = junction.main_bounces;
    (junction.main_bounces ? out.bounce : out.pass) = &block;
    interact(m_plan.legs[leg], m_plan.ops[junction.op], m_survey.m_coherency, block, out);
    enter(entry);
    TreeLedger& ledger = m_found.ledger;
    if (junction.detects)
      ledger.not_followed += m_survey.m_reflectance * entry.onward;
    else
      (junction.side_bounces ? ledger.not_followed : ledger.leaked) += entry.aside;
    return entry.onward;
  }

  /// A meeting at which both beams are followed.
  double fork(LegId leg, const PathTree::Junction& junction, std::size_t depth, Place& place) {
    Level& level = m_levels[depth];
    Level& side = m_levels[depth + 1];
    RayBlock& in = level.block[level.first];
    RayBlock& on = level.block[1 - level.first];
    side.first = 0;
    Entry entry;
    StepOut out;
    out.entry = &entry;
    out.bounces = junction.main_bounces;
    out.pass = junction.main_bounces ? &side.block[0] : &on;
    out.bounce = junction.main_bounces ? &on : &side.block[0];
    const PlanOp& op = junction.detects ? m_detector : m_plan.ops[junction.op];
    interact(m_plan.legs[leg], op, m_survey.m_coherency, in, out);
    enter(entry);
    if (!junction.detects) { // a detector's are those of what it lets through
      m_found.ledger.scattered += entry.turned_scattered;
      m_found.ledger.extra += entry.turned_extra;
    }
    level.first = 1 - level.first;
    const Place aside{PathTree::left_aside(junction, place.left), place.number};
    branch(junction.side, entry.turned, depth + 1, aside);
    place.number += m_tree.paths(junction.side, aside.left);
    return entry.onward;
  }

  void branch(const PathTree::Exit& exit, double power, std::size_t depth, Place place) {
    if (!exit.onward)
      end(exit.end, power, place);
    else if (!cut_off(exit, power, place, true))
      follow(exit, depth, place);
  }

  /// Whether a beam is not worth following: nothing is left of it, or so little that it is given up. What
  /// goes on as intended never is.
  bool cut_off(const PathTree::Exit& exit, double power, Place place, bool bounced) {
    if (power > 0.0 && !(bounced && power < m_faintest))
      return false;
    if (power > 0.0)
      m_cut.append(place.number, place.number + m_tree.paths(exit, place.left));
    m_found.ledger.not_followed += power;
    return true;
  }

  void end(End end, double power, Place place) {
    TreeLedger& ledger = m_found.ledger;
    switch (end) {
    case End::returned:
      ledger.returned += power;
      if (power > 0.0)
        m_returned.append(place.number, PathSums{.power = power});
      break;
    case End::leaked:
      ledger.leaked += power;
      break;
    default:
      ledger.absorbed += power;
      break;
    }
  }

  void arrive(const RayBlock& rays, Place place) {
    if (rays.alive == 0)
      return;
    m_survey.m_reader.read(rays, m_arrival);
    const PathSums sums = m_survey.m_reader.sums(m_arrival, m_image);
    if (place.left == m_tree.bounces()) {
      m_found.image += sums;
    } else if (sums.power > 0.0) {
      m_found.ghosts += sums.power;
      m_paths.append(place.number, sums);
    }
  }

  void enter(const Entry& entry) {
    TreeLedger& ledger = m_found.ledger;
    ledger.missed += entry.missed;
    ledger.clipped += entry.clipped;
    ledger.absorbed += entry.absorbed;
    ledger.scattered += entry.scattered;
    ledger.extra += entry.extra;
    ledger.bulk += entry.bulk;
  }

  const TreeSurvey& m_survey;
  const PathTree& m_tree;
  const Plan& m_plan;
  const PlanOp& m_detector;
  TreeFound& m_found;
  std::unique_ptr<Level[]> m_levels;
  double m_faintest = 0.0;
  Arrival m_image, m_arrival;
  PathTable m_paths, m_returned;
  PathSpans m_cut;
};

TreeSurvey::TreeSurvey(const Train& train, const PathTree& tree, double floor)
    : m_train(train), m_tree(tree), m_floor(floor), m_reflectance(detector_reflectance(train)),
      m_coherency(optics::coherency(train.assembly->light.polarization)), m_reader(train), m_detectors(reflecting_detectors(train)) {}

TreeFound TreeSurvey::blank(const Group&) const {
  TreeFound found;
  found.reflectance = m_reflectance;
  return found;
}

void TreeSurvey::follow(const Group& group, RayBlock& block, TreeFound& found) const {
  TreeWalk(*this, group, found).run(block);
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
