#include "display_width.hpp"
#include "figures.hpp"
#include "prose.hpp"
#include "table.hpp"

#include <lightledger/report/check.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <string_view>

namespace lightledger::report {
namespace {

using analysis::Judgement;
using analysis::Verdict;

std::string verdict_word(const Verdict& verdict) {
  if (!verdict.met)
    return "cannot be told";
  return *verdict.met ? "met" : "not met";
}

/// Angles, counts and errors are no fractions of power and have no level in dB.
bool is_fraction(std::string_view quantity) {
  constexpr std::array<std::string_view, 4> others{"_deg", "rays", "closure_error", "uncertainty"};
  return std::ranges::none_of(
      others, [&](std::string_view other) { return quantity.find(other) != std::string_view::npos; });
}

std::string figure(double value, const Verdict& verdict, const TextStyle& style) {
  return style.decibels && is_fraction(verdict.quantity) ? decibels(value) : quantity(value);
}

/// In dB the margin is the ratio of value and limit, positive when met.
std::string margin(const Verdict& verdict, const TextStyle& style) {
  if (!verdict.margin)
    return "-";
  if (!style.decibels || !is_fraction(verdict.quantity))
    return quantity(*verdict.margin);
  const double ratio = *verdict.value / verdict.limit;
  return decibels(verdict.sense == assembly::Sense::at_least ? ratio : 1.0 / ratio);
}

std::string requirements_table(const Judgement& judgement, const TextStyle& style) {
  constexpr int others_width = 48; ///< of all columns but the quantity's
  Table table({{"", Align::right, 3},
               {"quantity", Align::left},
               {"", Align::left},
               {"limit"},
               {"value"},
               {"margin"},
               {"", Align::left}});
  for (std::size_t i = 0; i < judgement.verdicts.size(); ++i) {
    const Verdict& verdict = judgement.verdicts[i];
    const char* sense = verdict.sense == assembly::Sense::at_least ? ">=" : "<=";
    const std::string value = verdict.value ? figure(*verdict.value, verdict, style) : "-";
    table.add({std::to_string(i + 1), shortened(on_one_line(verdict.quantity), style.width - others_width),
               sense, figure(verdict.limit, verdict, style), value, margin(verdict, style),
               Cell(verdict_word(verdict), verdict.met == false)});
  }
  return table.text(style.emphasis);
}

std::string numbers_of(const Judgement& judgement, std::optional<bool> met) {
  std::vector<std::string> numbers;
  for (std::size_t i = 0; i < judgement.verdicts.size(); ++i)
    if (judgement.verdicts[i].met == met)
      numbers.push_back(std::to_string(i + 1));
  return fmt::format("{}", fmt::join(numbers, ", "));
}

std::string verdict_sentence(const Judgement& judgement, bool emphasis) {
  if (judgement.verdicts.empty())
    return "The file is sound; it states no requirements.";
  if (judgement.all_met())
    return "The file is sound; every requirement is met.";
  std::vector<std::string> clauses;
  if (const std::string missed = numbers_of(judgement, false); !missed.empty())
    clauses.push_back(fmt::format("not met: {}", missed));
  if (const std::string open = numbers_of(judgement, std::nullopt); !open.empty())
    clauses.push_back(fmt::format("cannot be told: {}", open));
  const std::string verdict = fmt::format("{}", fmt::join(clauses, "; "));
  return fmt::format("The file is sound. Requirements {}.", emphasis ? strong(verdict) : verdict);
}

/// What to do about values too close to their limits for the rays that were traced.
std::string advice(const Judgement& judgement, int width) {
  const auto close = [](const Verdict& verdict) { return verdict.value && !verdict.met; };
  const auto worst = std::ranges::find_if(judgement.verdicts, close);
  if (worst == judgement.verdicts.end())
    return "";
  return wrapped(
      fmt::format("{} lies within two standard errors ({}) of its limit: ask for a smaller --accuracy.",
                  on_one_line(worst->quantity), error_size(2.0 * worst->uncertainty.value_or(0.0))),
      width);
}

} // namespace

std::string check_text(const assembly::Assembly& assembly, const Judgement& judgement,
                       const std::vector<std::string>& warnings, const TextStyle& style) {
  std::string text = heading(assembly, style.width);
  text += '\n';
  if (!judgement.verdicts.empty())
    text.append(requirements_table(judgement, style)).append("\n");
  text += wrapped(verdict_sentence(judgement, style.emphasis), style.width);
  text += advice(judgement, style.width);
  text += describe_warnings(warnings, style.width);
  return text;
}

} // namespace lightledger::report
