#include "tree_walk.hpp"

#include "reflecting_detector.hpp"

#include <lightledger/optics/boundary.hpp>

#include <algorithm>
#include <bit>
#include <cmath>
#include <numeric>

namespace lightledger::trace {
namespace {

/// Beams on the side that cost no bounce and hang in each other.
constexpr std::size_t most_free_sides = 4;

double launched(const RayBlock& block) {
  double power = 0.0;
  for (int lane = 0; lane < block.count; ++lane)
    power += block.w[lane];
  return power;
}

double reflected_squarely(const PlanOp& op) {
  switch (op.amplitude) {
  case AmplitudeKind::none:
  case AmplitudeKind::element:
    return 0.0;
  case AmplitudeKind::fresnel:
    return std::pow((op.n1 - op.n2) / (op.n1 + op.n2), 2.0);
  case AmplitudeKind::ideal:
    return std::max(op.reflect_s, op.reflect_p);
  case AmplitudeKind::measured:
    return std::max(op.curve[0].reflect_s, op.curve[0].reflect_p);
  case AmplitudeKind::stack: {
    std::vector<optics::Layer> layers;
    for (std::uint32_t i = 0; i < op.layer_count; ++i)
      layers.push_back({{op.layers[i].n, op.layers[i].kappa}, op.layers[i].thickness_nm});
    const optics::Index exit{op.n2, op.n2_kappa};
    return std::norm(
        optics::layered_boundary(op.n1, layers, {exit.n, exit.kappa}, 1.0, op.wavelength_nm).r_s);
  }
  case AmplitudeKind::metal:
    return 1.0;
  }
  return 1.0;
}

std::vector<std::vector<double>> reflected_squarely(const Train& train) {
  std::vector<std::vector<double>> all;
  for (const Plan& plan : train.plans) {
    all.emplace_back();
    for (const PlanOp& op : plan.ops)
      all.back().push_back(reflected_squarely(op));
  }
  return all;
}

std::vector<double> prospects(const PathTree& tree, const std::vector<double>& reflects) {
  std::vector<double> all;
  for (PathTree::JunctionId id = 0; id < tree.junctions(); ++id) {
    double best = 0.0;
    PathTree::Exit exit{true, 0, id, End::absorbed};
    for (; exit.onward; exit = tree.junction(exit.to).main) {
      const PathTree::Junction& junction = tree.junction(exit.to);
      best = std::max(best, junction.side_bounces ? reflects[junction.op] : 0.0);
      best = std::max(best, junction.side.onward && !junction.side_bounces ? 1.0 : 0.0);
    }
    all.push_back(exit.end == End::detected ? 1.0 : best);
  }
  return all;
}

/// Where most lanes hold no ray any more, moves those that do together.
void close_ranks(RayBlock& block, LaneMap& launch) {
  constexpr int worth_it = 8; ///< fewer lanes are one step of the kernel
  const int left = std::popcount(block.alive);
  if (block.count <= worth_it || 2 * left > block.count)
    return;
  int next = 0;
  const auto move = [&](auto& quantity, int from) {
    for (auto& component : quantity)
      component[next] = component[from];
  };
  for (std::uint64_t rest = block.alive; rest != 0; rest &= rest - 1, ++next) {
    const int lane = std::countr_zero(rest);
    move(block.p, lane);
    move(block.d, lane);
    move(block.u, lane);
    move(block.J, lane);
    block.opl[next] = block.opl[lane];
    block.w[next] = block.w[lane];
    launch[static_cast<std::size_t>(next)] = launch[static_cast<std::size_t>(lane)];
  }
  block.count = left;
  block.alive = left == 0 ? 0 : ~std::uint64_t{0} >> (RayBlock::lanes - left);
}

} // namespace

TreeSetting::TreeSetting(const Train& of_train, const PathTree& of_paths, double cut_below)
    : train(of_train), tree(of_paths), floor(cut_below), reflectance(detector_reflectance(of_train)),
      coherency(optics::coherency(of_train.assembly->light.polarization)), reader(of_train),
      detectors(reflecting_detectors(of_train)), reflects(reflected_squarely(of_train)) {
  for (const std::vector<double>& of_plan : reflects)
    prospects.push_back(lightledger::trace::prospects(tree, of_plan));
}

TreeWalk::TreeWalk(const TreeSetting& setting, std::size_t wavelength, TreeFound& found,
                   TreeObserver* observer)
    : m_setting(setting), m_tree(setting.tree), m_plan(setting.train.plans[wavelength]),
      m_detector(setting.detectors[wavelength]), m_found(found), m_observer(observer),
      m_levels(new Level[static_cast<std::size_t>(m_tree.bounces()) + most_free_sides + 2]),
      m_reflects(setting.reflects[wavelength]), m_prospects(setting.prospects[wavelength]) {}

void TreeWalk::run(const RayBlock& block) {
  m_faintest = m_setting.floor * launched(block);
  see_image(block);
  m_levels[0].block[0] = block;
  m_levels[0].first = 0;
  std::iota(m_levels[0].launch.begin(), m_levels[0].launch.end(), std::uint8_t{0});
  follow(m_tree.start(), launched(block), 0, {m_tree.bounces(), 0});
  m_found.paths += m_paths;
  m_found.returned += m_returned;
  m_found.cut += m_cut;
}

/// What arrives as intended, for the comparison of each ghost with it.
void TreeWalk::see_image(const RayBlock& block) {
  RayBlock& rays = m_levels[0].block[0];
  rays = block;
  for (PathTree::Exit exit = m_tree.start(); exit.onward && rays.alive != 0;
       exit = m_tree.junction(exit.to).main) {
    const PathTree::Junction& junction = m_tree.junction(exit.to);
    StepOut out;
    out.bounces = junction.main_bounces;
    (out.bounces ? out.bounce : out.pass) = &rays;
    interact(m_plan.legs[exit.leg], m_plan.ops[junction.op], m_setting.coherency, rays, out);
  }
  m_setting.reader.read(rays, m_image);
}

/// Follows the beam of a level to its end, and at each fork first the beam on the side.
void TreeWalk::follow(PathTree::Exit exit, double power, std::size_t depth, Place place) {
  Level& level = m_levels[depth];
  while (exit.onward) {
    const PathTree::Junction& junction = m_tree.junction(exit.to);
    if (bounced(place))
      close_ranks(level.block[level.first], level.launch);
    if (!PathTree::follows_side(junction, place.left))
      power = pass(exit.leg, junction, depth);
    else if (const auto passed = pass_by(exit, power, depth, place))
      power = *passed;
    else
      power = fork(exit, depth, place);
    exit = junction.main;
    if (exit.onward && cut_off(exit, power, place))
      return;
  }
  if (exit.end == End::detected)
    arrive(level, place);
  else
    end(exit.end, power, place);
}

/// A meeting at which only the main beam is followed; the power of what goes on.
double TreeWalk::pass(LegId leg, const PathTree::Junction& junction, std::size_t depth) {
  Level& level = m_levels[depth];
  RayBlock& in = level.block[level.first];
  if (m_observer != nullptr)
    level.block[1 - level.first] = in;
  Entry entry;
  StepOut out;
  out.entry = &entry;
  out.bounces = junction.main_bounces;
  (out.bounces ? out.bounce : out.pass) = &in;
  interact(m_plan.legs[leg], m_plan.ops[junction.op], m_setting.coherency, in, out);
  if (m_observer != nullptr)
    m_observer->see({leg, junction, level.block[1 - level.first], in, m_bounced});
  enter(entry);
  TreeLedger& ledger = m_found.ledger;
  if (junction.detects)
    ledger.not_followed += m_setting.reflectance * entry.onward;
  else
    (junction.side_bounces ? ledger.not_followed : ledger.leaked) += entry.aside;
  return entry.onward;
}

/// A meeting whose beam on the side will be cut off, by the look of it: not made at all, it is cheaper. None
/// where it turns out to be worth following.
std::optional<double> TreeWalk::pass_by(const PathTree::Exit& exit, double power, std::size_t depth,
                                        Place& place) {
  constexpr double doubt = 2.0;
  const PathTree::Junction& junction = m_tree.junction(exit.to);
  const bool faint = bounced(place) && junction.side_bounces && !junction.detects && !junction.main_bounces &&
                     doubt * power * m_reflects[junction.op] < m_faintest;
  if (!faint || m_observer != nullptr)
    return std::nullopt;
  Level& level = m_levels[depth];
  Entry entry;
  StepOut out;
  out.entry = &entry;
  out.pass = &level.block[1 - level.first];
  interact(m_plan.legs[exit.leg], m_plan.ops[junction.op], m_setting.coherency, level.block[level.first],
           out);
  if (entry.aside >= m_faintest)
    return std::nullopt;
  level.first = 1 - level.first;
  enter(entry);
  const PathTree::PathNumber paths = m_tree.paths(junction.side, place.left - 1);
  m_found.ledger.not_followed += entry.aside;
  if (entry.aside > 0.0)
    m_cut.append(place.number, place.number + paths);
  place.number += paths;
  return entry.onward;
}

/// A meeting at which both beams are followed.
double TreeWalk::fork(const PathTree::Exit& exit, std::size_t depth, Place& place) {
  const PathTree::Junction& junction = m_tree.junction(exit.to);
  Level& level = m_levels[depth];
  RayBlock& in = level.block[level.first];
  RayBlock& on = level.block[1 - level.first];
  RayBlock& side = m_levels[depth + 1].block[0];
  m_levels[depth + 1].first = 0;
  m_levels[depth + 1].launch = level.launch;
  Entry entry;
  StepOut out;
  out.entry = &entry;
  out.bounces = junction.main_bounces;
  out.pass = out.bounces ? &side : &on;
  out.bounce = out.bounces ? &on : &side;
  const PlanOp& op = junction.detects ? m_detector : m_plan.ops[junction.op];
  interact(m_plan.legs[exit.leg], op, m_setting.coherency, in, out);
  if (m_observer != nullptr)
    m_observer->see({exit.leg, junction, in, on, m_bounced});
  enter(entry);
  if (!junction.detects) { // a detector's are those of what it lets through
    m_found.ledger.scattered += entry.turned_scattered;
    m_found.ledger.extra += entry.turned_extra;
  }
  level.first = 1 - level.first;
  const Place aside{PathTree::left_aside(junction, place.left), place.number};
  if (junction.side_bounces)
    m_bounced.push_back(exit.to);
  branch(junction.side, entry.turned, depth + 1, aside);
  if (junction.side_bounces)
    m_bounced.pop_back();
  place.number += m_tree.paths(junction.side, aside.left);
  return entry.onward;
}

void TreeWalk::branch(const PathTree::Exit& exit, double power, std::size_t depth, Place place) {
  if (!exit.onward)
    end(exit.end, power, place);
  else if (!cut_off(exit, power, place))
    follow(exit, power, depth, place);
}

/// Whether a beam is not worth following: nothing is left of it, or so little that what it may bring is given
/// up. What goes on as intended never is.
bool TreeWalk::cut_off(const PathTree::Exit& exit, double power, Place place) {
  // On its way back it may bring nothing and yet tell what returns, unless it is faint itself.
  constexpr double faint_itself = 1e-3;
  const double prospect = power * std::max(m_prospects[exit.to], faint_itself);
  if (power > 0.0 && !(bounced(place) && prospect < m_faintest))
    return false;
  if (power > 0.0)
    m_cut.append(place.number, place.number + m_tree.paths(exit, place.left));
  m_found.ledger.not_followed += power;
  return true;
}

void TreeWalk::end(End end, double power, Place place) {
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

void TreeWalk::arrive(const Level& level, Place place) {
  const RayBlock& rays = level.block[level.first];
  if (rays.alive == 0)
    return;
  m_setting.reader.read(rays, m_arrival);
  const PathSums sums = m_setting.reader.sums(m_arrival, m_image, level.launch);
  if (!bounced(place)) {
    m_found.image += sums;
  } else if (sums.power > 0.0) {
    m_found.ghosts += sums.power;
    m_paths.append(place.number, sums);
  }
}

void TreeWalk::enter(const Entry& entry) {
  TreeLedger& ledger = m_found.ledger;
  ledger.missed += entry.missed;
  ledger.clipped += entry.clipped;
  ledger.absorbed += entry.absorbed;
  ledger.scattered += entry.scattered;
  ledger.extra += entry.extra;
  ledger.bulk += entry.bulk;
}

} // namespace lightledger::trace
