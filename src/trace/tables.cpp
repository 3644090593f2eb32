#include <lightledger/optics/polarization.hpp>
#include <lightledger/trace/interact.hpp>
#include <lightledger/trace/tables.hpp>

#include <algorithm>
#include <array>
#include <cmath>
#include <memory>
#include <string>
#include <unordered_map>
#include <vector>

namespace lightledger::trace {
namespace {

/// A table costs as much as so many rays do without it.
constexpr std::uint64_t enough_rays = 2000;
constexpr std::size_t most_fields = 64;

/// Ranges are widened to a common grid, so that surfaces with one coating share its table.
constexpr double grid = 32.0;
constexpr double margin = 0.002;
constexpr double margin_of_the_other_side = 0.05;

struct RayCount {
  std::uint64_t operator()(const assembly::ToAccuracy&) const { return enough_rays; }
  std::uint64_t operator()(const assembly::Scattered& scattered) const { return scattered.count; }
  std::uint64_t operator()(const assembly::Rings& rings) const { return rings.rings * rings.spokes; }
  std::uint64_t operator()(const assembly::Grid& squares) const { return squares.across * squares.across; }
};

Cosines widened(Cosines found, double by) {
  return {std::max(std::floor((found.least - by) * grid) / grid, 1.0 / grid),
          std::min(std::ceil((found.most + by) * grid) / grid, 1.0)};
}

/// What a few rays of each field find at each operator of the intended path, at the first wavelength.
class Probe {
public:
  explicit Probe(const Train& train)
      : m_train(train), m_found(train.plans.front().ops.size(), Cosines{2.0, -1.0}) {
    const assembly::Light& light = train.assembly->light;
    const Pupil pupil(light);
    const std::uint64_t count = pupil.scattered() ? RayBlock::lanes : pupil.size();
    for (std::size_t f = 0; f < std::min(light.fields.size(), most_fields); ++f) {
      const Launcher launcher(Source(light, light.fields[f]), pupil, train.footprints[f]);
      for (int replicate = 0; replicate < replicates; replicate += pupil.scattered() ? replicates : 1) {
        RayBlock block;
        launcher.fill(block, replicate, 0, count);
        follow(block);
      }
    }
  }

  [[nodiscard]] const std::vector<Cosines>& found() const { return m_found; }

private:
  void follow(RayBlock& block) {
    const Plan& plan = m_train.plans.front();
    for (const Path::Step& step : m_train.path.steps) {
      if (block.alive == 0)
        return;
      Entry entry;
      StepOut out;
      out.entry = &entry;
      out.bounces = step.act == Act::bounce;
      (out.bounces ? out.bounce : out.pass) = &block;
      interact(plan.legs[step.leg], plan.ops[step.op], {0.5, 0.5, {}}, block, out);
      if (entry.least_incidence <= entry.most_incidence) {
        Cosines& cosines = m_found[step.op];
        cosines.least = std::min(cosines.least, std::cos(entry.most_incidence));
        cosines.most = std::max(cosines.most, std::cos(entry.least_incidence));
      }
    }
  }

  const Train& m_train;
  std::vector<Cosines> m_found;
};

/// The range of the light that comes to a surface from its other side.
Cosines from_other_side(const PlanOp& op, Cosines found) {
  const double ratio = op.n1 / op.n2;
  const auto beyond = [&](double cosine) {
    return std::sqrt(std::max(1.0 - ratio * ratio * (1.0 - cosine * cosine), 0.0));
  };
  return {std::min(beyond(found.least), found.least), 1.0};
}

/// Operators of one content, which share a table.
struct Order {
  Plan* plan;
  std::vector<OpId> ops;
  Cosines range;
  std::shared_ptr<const AmplitudeTable> table;
};

std::string content(const PlanOp& op, Cosines range) {
  const std::array numbers = {op.n1, op.n2, op.n2_kappa, op.wavelength_nm, range.least, range.most};
  std::string key(reinterpret_cast<const char*>(numbers.data()), sizeof numbers);
  key.append(reinterpret_cast<const char*>(op.layers), op.layer_count * sizeof(PlanLayer));
  return key;
}

class OrderBook {
public:
  void add(Plan& plan, OpId id, Cosines range) {
    const auto [place, fresh] = m_known.try_emplace(content(plan.ops[id], range), m_orders.size());
    if (fresh)
      m_orders.push_back({&plan, {}, range, nullptr});
    m_orders[place->second].ops.push_back(id);
  }

  void fulfil() {
    for (Order& order : m_orders)
      if (auto table = tabulate(order.plan->ops[order.ops.front()], order.range))
        order.table = std::make_shared<const AmplitudeTable>(*table);
    for (Order& order : m_orders) {
      if (!order.table)
        continue;
      order.plan->tables.push_back(order.table);
      for (const OpId id : order.ops)
        order.plan->ops[id].table = order.table.get();
    }
  }

private:
  std::unordered_map<std::string, std::size_t> m_known;
  std::vector<Order> m_orders;
};

} // namespace

void tabulate(Train& train) {
  const assembly::Light& light = train.assembly->light;
  const auto& ops = train.plans.front().ops;
  const bool any =
      std::ranges::any_of(ops, [](const PlanOp& op) { return op.amplitude == AmplitudeKind::stack; });
  if (!any || std::visit(RayCount{}, light.sampling) * light.fields.size() < enough_rays)
    return;
  const Probe probe(train);
  OrderBook book;
  for (Plan& plan : train.plans)
    for (OpId id = 0; id < plan.ops.size(); ++id) {
      if (plan.ops[id].amplitude != AmplitudeKind::stack)
        continue;
      const Cosines own = probe.found()[id];
      const Cosines opposite = probe.found()[id ^ 1U];
      if (own.least <= own.most)
        book.add(plan, id, widened(own, margin));
      else if (opposite.least <= opposite.most)
        book.add(plan, id, widened(from_other_side(plan.ops[id ^ 1U], opposite), margin_of_the_other_side));
    }
  book.fulfil();
}

} // namespace lightledger::trace
