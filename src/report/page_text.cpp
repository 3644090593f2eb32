#include "display_width.hpp"
#include "figures.hpp"
#include "losses.hpp"
#include "prose.hpp"

#include <lightledger/report/page.hpp>

#include <fmt/format.h>

#include <algorithm>

namespace lightledger::report {
namespace {

std::string describe_verdicts(const analysis::Judgement& judgement) {
  const auto count = [&](std::optional<bool> met) {
    return std::ranges::count(judgement.verdicts, met, &analysis::Verdict::met);
  };
  if (judgement.verdicts.empty())
    return "The file states no requirements.";
  if (judgement.all_met())
    return "Every requirement is met.";
  std::string sentence = fmt::format("Of {} requirements {} met", judgement.verdicts.size(), count(true));
  if (const auto missed = count(false); missed > 0)
    sentence += fmt::format(", {} not met", missed);
  if (const auto open = count(std::nullopt); open > 0)
    sentence += fmt::format(", {} cannot be told", open);
  return sentence + ".";
}

std::string describe_delivered(const analysis::Budget& budget) {
  if (!budget.uncertainty)
    return fmt::format("delivered  {}", fraction(budget.delivered));
  return fmt::format("delivered  {} +- {}", fraction(budget.delivered), error_size(*budget.uncertainty));
}

} // namespace

std::string page_text(const assembly::Assembly& assembly, const PageContent& content, const std::string& path,
                      const TextStyle& style) {
  std::string text = heading(assembly, style.width) + '\n';
  text += wrapped(describe_verdicts(content.verdicts), style.width);
  text += describe_delivered(content.budget) + '\n';
  text += wrapped(describe_losses(content.budget.stations, style.emphasis), style.width);
  text += wrapped(fmt::format("The page is in {}.", on_one_line(path)), style.width);
  return text + describe_warnings(content.envelope.warnings, style.width);
}

} // namespace lightledger::report
