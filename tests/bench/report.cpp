#include "bench/report.hpp"

#include <fmt/format.h>
#include <nlohmann/json.hpp>

#include <algorithm>
#include <fstream>

namespace lightledger::bench {

void Speeds::ReportRuns(const std::vector<Run>& runs) {
  for (const Run& run : runs) {
    if (run.run_type != Run::RT_Iteration)
      continue;
    const std::string name = run.run_name.function_name;
    const auto slash = name.find('/');
    const std::pair key{name.substr(0, slash), name.substr(slash + 1)};
    if (!m_found.contains(key))
      m_order.push_back(key);
    m_found[key].push_back(run.counters.at("items_per_second").value / 1e6);
  }
}

bool Speeds::has(const std::string& kind, const std::string& by) const {
  return m_found.contains({kind, by});
}

Speeds::Spread Speeds::of(const std::string& kind, const std::string& by) const {
  std::vector<double> sorted = m_found.at({kind, by});
  std::ranges::sort(sorted);
  return {sorted[sorted.size() / 2], sorted.front(), sorted.back()};
}

void print(const Speeds& speeds, const Whole& whole) {
  fmt::print("million polarized interactions a second on one core: median (least to most)\n\n");
  for (const auto& [kind, by] : speeds.order()) {
    const Speeds::Spread found = speeds.of(kind, by);
    fmt::print("{:<9} {:<9} {:9.2f}  ({:.2f} to {:.2f})", kind, by, found.median, found.least, found.most);
    for (const char* other : {"textbook", "reference"})
      if (by != other && by != "textbook" && speeds.has(kind, other))
        fmt::print("  {:.1f} x {}", found.median / speeds.of(kind, other).median, other);
    fmt::print("\n");
  }
  fmt::print("\n");
  for (const Figure& figure : whole)
    fmt::print("{:<64} {:10.3f} {}\n", figure.what, figure.value, figure.unit);
}

void write_json(const Speeds& speeds, const Whole& whole, const std::string& path) {
  nlohmann::ordered_json json;
  for (const auto& [kind, by] : speeds.order()) {
    const Speeds::Spread found = speeds.of(kind, by);
    json["interactions_per_microsecond"][kind][by] = {
        {"median", found.median}, {"least", found.least}, {"most", found.most}};
  }
  for (const Figure& figure : whole)
    json["whole"].push_back({{"what", figure.what}, {"value", figure.value}, {"unit", figure.unit}});
  std::ofstream(path) << json.dump(2) << '\n';
}

} // namespace lightledger::bench
