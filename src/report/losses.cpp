#include "losses.hpp"

#include "display_width.hpp"
#include "figures.hpp"
#include "table.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace lightledger::report {
namespace {

using analysis::StationBudget;

std::string clause(const StationBudget& station, const Loss& loss) {
  const std::string name = on_one_line(station.name);
  const std::string share = per_cent(station.*loss.power);
  if (loss.power == &StationBudget::aside)
    return station.does == "reflect" ? fmt::format("{} lets {} through", name, share)
                                     : fmt::format("{} sends {} aside", name, share);
  if (loss.power == &StationBudget::absorbed)
    return fmt::format("{} absorbs {}", name, share);
  if (loss.power == &StationBudget::clipped)
    return fmt::format("{} clips {}", name, share);
  if (loss.power == &StationBudget::missed)
    return fmt::format("{} misses {}", share, name);
  if (loss.power == &StationBudget::scattered)
    return fmt::format("{} scatters {}", name, share);
  if (loss.power == &StationBudget::extra)
    return fmt::format("{} loses {} to dust and ageing", name, share);
  return fmt::format("the medium after {} absorbs {}", name, share);
}

/// A reflectance to four decimals, on the safe side, without trailing zeros.
std::string reflectance(const analysis::Remedy& remedy) {
  constexpr double steps = 1e4;
  constexpr double rounding = 1e-9;
  const double scaled = remedy.reflectance * steps;
  const double safe = remedy.reflects ? std::ceil(scaled - rounding) : std::floor(scaled + rounding);
  return fmt::format("{} {}", remedy.reflects ? ">=" : "<=", plain(safe / steps));
}

} // namespace

std::vector<LossEntry> largest_losses(const std::vector<StationBudget>& stations, std::size_t how_many) {
  std::vector<LossEntry> entries;
  for (std::size_t station = 0; station < stations.size(); ++station)
    for (std::size_t loss = 0; loss < losses.size(); ++loss)
      if (const double power = stations[station].*losses[loss].power; power > 0.0)
        entries.push_back({station, loss, power});
  std::ranges::stable_sort(entries, std::ranges::greater{}, &LossEntry::power);
  entries.resize(std::min(entries.size(), how_many));
  return entries;
}

double total(const std::vector<StationBudget>& stations, const Loss& loss) {
  double sum = 0.0;
  for (const StationBudget& station : stations)
    sum += station.*loss.power;
  return sum;
}

std::string describe_losses(const std::vector<StationBudget>& stations, bool emphasis) {
  const std::vector<LossEntry> entries = largest_losses(stations, 3);
  if (entries.empty())
    return "Nothing is lost.";
  std::string sentence = entries.size() == 1 ? "Largest loss:" : "Largest losses:";
  for (const LossEntry& entry : entries) {
    const std::string words = clause(stations[entry.station], losses[entry.loss]);
    const bool first = &entry == &entries.front();
    sentence.append(first ? " " : ", ").append(first && emphasis ? strong(words) : words);
  }
  return sentence + ".";
}

std::string describe_remedies(const std::vector<StationBudget>& stations,
                              const std::vector<analysis::Remedy>& remedies, bool in_decibels) {
  std::string sentence;
  for (const analysis::Remedy& remedy : remedies) {
    const bool first = sentence.empty();
    const std::string name = on_one_line(stations[remedy.station].name);
    const std::string figure = in_decibels ? decibels(remedy.delivered) + " dB" : fraction(remedy.delivered);
    sentence += first ? fmt::format("A coating of R {} on {} would bring delivered to {}",
                                    reflectance(remedy), name, figure)
                      : fmt::format(", one of R {} on {} to {}", reflectance(remedy), name, figure);
    if (remedy.suffices)
      sentence += ", as required";
  }
  return sentence.empty() ? sentence : sentence + ".";
}

} // namespace lightledger::report
