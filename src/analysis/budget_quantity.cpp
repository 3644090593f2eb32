#include "budget_quantity.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <functional>
#include <span>

namespace lightledger::analysis {
namespace {

/// A key of one object in the JSON, and the figure that stands under it.
template <class Object>
struct Key {
  const char* name;
  std::function<std::optional<double>(const Object&)> value;
};

const std::vector<Key<Budget>> budget_keys{
    {"launched", [](const Budget&) { return 1.0; }},
    {"delivered", &Budget::delivered},
    {"uncertainty", &Budget::uncertainty},
    {"rays", [](const Budget& budget) { return static_cast<double>(budget.rays); }},
    {"closure_error", &Budget::closure_error},
};

template <double StationBudget::Incidence::*angle>
std::optional<double> incidence(const StationBudget& station) {
  return station.incidence ? std::optional((*station.incidence).*angle) : std::nullopt;
}

const std::vector<Key<StationBudget>> station_keys{
    {"incident", &StationBudget::incident},
    {"onward", &StationBudget::onward},
    {"aside", &StationBudget::aside},
    {"absorbed", &StationBudget::absorbed},
    {"clipped", &StationBudget::clipped},
    {"missed", &StationBudget::missed},
    {"scattered", &StationBudget::scattered},
    {"extra", &StationBudget::extra},
    {"bulk", &StationBudget::bulk},
    {"transmittance", &StationBudget::transmittance},
    {"pass_s", &StationBudget::pass_s},
    {"pass_p", &StationBudget::pass_p},
    {"incidence_deg.min", incidence<&StationBudget::Incidence::min_deg>},
    {"incidence_deg.mean", incidence<&StationBudget::Incidence::mean_deg>},
    {"incidence_deg.max", incidence<&StationBudget::Incidence::max_deg>},
};

const std::vector<Key<WavelengthBudget>> wavelength_keys{{"delivered", &WavelengthBudget::delivered}};
const std::vector<Key<FieldBudget>> field_keys{{"delivered", &FieldBudget::delivered}};

/// How an item of a list is addressed: `.name` where it has one, else `[index]`.
std::string address(const std::optional<std::string>& name, std::size_t index) {
  return name ? "." + *name : fmt::format("[{}]", index);
}

/// One list of objects in the JSON.
template <class Object>
struct List {
  const char* name;
  std::span<const Object> items;
  const std::vector<Key<Object>>& keys;
  std::function<std::optional<std::string>(const Object&)> name_of;
};

/// Calls `visit` for each of the budget's lists.
template <class Visit>
void for_each_list(const Budget& budget, Visit visit) {
  visit(List<StationBudget>{"stations", budget.stations, station_keys, &StationBudget::name});
  visit(List<WavelengthBudget>{"by_wavelength", budget.by_wavelength, wavelength_keys,
                               [](const WavelengthBudget&) { return std::nullopt; }});
  visit(List<FieldBudget>{"by_field", budget.by_field, field_keys, &FieldBudget::name});
}

/// The figure of a list at a path. Names may hold dots, so each is tried as it stands.
template <class Object>
std::optional<Figure> figure_in(const List<Object>& list, std::string_view path) {
  for (std::size_t i = 0; i < list.items.size(); ++i)
    for (const Key<Object>& key : list.keys) {
      const auto leads_here = [&](const std::string& item) {
        return path == fmt::format("{}{}.{}", list.name, item, key.name);
      };
      if (leads_here(address(std::nullopt, i)) || leads_here(address(list.name_of(list.items[i]), i)))
        return Figure{key.value(list.items[i]), std::nullopt};
    }
  return std::nullopt;
}

} // namespace

std::optional<Figure> budget_figure(const Budget& budget, std::string_view path) {
  for (const Key<Budget>& key : budget_keys)
    if (path == key.name)
      return Figure{key.value(budget), path == "delivered" ? budget.uncertainty : std::nullopt};
  std::optional<Figure> figure;
  for_each_list(budget, [&](const auto& list) {
    if (!figure)
      figure = figure_in(list, path);
  });
  return figure;
}

std::vector<std::string> budget_paths(const Budget& budget) {
  std::vector<std::string> paths(budget_keys.size());
  std::ranges::transform(budget_keys, paths.begin(), &Key<Budget>::name);
  for_each_list(budget, [&](const auto& list) {
    for (std::size_t i = 0; i < list.items.size(); ++i)
      for (const auto& key : list.keys)
        paths.push_back(fmt::format("{}{}.{}", list.name, address(list.name_of(list.items[i]), i), key.name));
  });
  return paths;
}

} // namespace lightledger::analysis
