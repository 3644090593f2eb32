#include "answer_pictures.hpp"

#include "answer_parts.hpp"
#include "progress_bar.hpp"

#include <lightledger/analysis/ghosts.hpp>
#include <lightledger/analysis/polarization.hpp>
#include <lightledger/analysis/requirements.hpp>
#include <lightledger/report/budget.hpp>
#include <lightledger/report/drawing.hpp>
#include <lightledger/report/ghosts.hpp>
#include <lightledger/report/page.hpp>
#include <lightledger/report/polarization.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <utility>

namespace lightledger::app {
namespace {

/// Ghosts whose rays and spots are traced for the page.
constexpr std::size_t most_ghost_pictures = 40;
/// Maps of the pupil on the page, in bytes.
constexpr std::size_t most_map_bytes = 220'000;

/// The ghost of a rank, brightest first.
analysis::Ghost ghost_of_rank(std::uint64_t rank, const Options& options, const Input& input) {
  analysis::GhostOptions wanted;
  wanted.top = rank;
  wanted.threads = options.threads;
  const analysis::GhostsResult result = analysis::ghosts(*input.assembly, wanted);
  refuse_file(result.faults, input);
  const std::vector<analysis::Ghost>& paths = result.ghosts->paths;
  if (paths.size() < rank) {
    assembly::Faults faults;
    faults.add(
        {{},
         fmt::format("--ghost {}: {} ghost{} bring light", rank, paths.size(), paths.size() == 1 ? "" : "s"),
         "a number from 1 on",
         {}});
    refuse_request(faults, options);
  }
  return paths[rank - 1];
}

std::string title_of(const Options& options, const Input& input,
                     const std::optional<analysis::Ghost>& ghost) {
  if (!ghost)
    return input.assembly->title;
  return fmt::format("{}, ghost {}: {}", input.assembly->title, *options.ghost,
                     fmt::join(ghost->bounces, ", then "));
}

std::vector<analysis::Bounces> bounces_of(const analysis::Ghosts& ghosts) {
  std::vector<analysis::Bounces> all;
  for (const analysis::Ghost& ghost : ghosts.paths)
    if (all.size() < most_ghost_pictures)
      all.push_back(ghost.bounces);
  return all;
}

/// As many of the pupil's maps as the page has room for.
std::vector<report::PageMap> maps_of(const Input& input, const analysis::Polarization& polarization) {
  std::vector<report::PageMap> maps;
  std::size_t bytes = 0;
  for (report::NamedFile& file : report::polarization_files(*input.assembly, polarization)) {
    if (!file.name.ends_with(".png") || bytes + file.bytes.size() > most_map_bytes)
      continue;
    bytes += file.bytes.size();
    std::string words = file.name.substr(0, file.name.size() - 4);
    std::ranges::replace(words, '-', ' ');
    std::ranges::replace(words, '_', ' ');
    if (words.ends_with(" deg"))
      words.insert(words.size() - 4, ",");
    maps.push_back({std::move(file.bytes), std::move(words)});
  }
  return maps;
}

/// Everything that the page shows: each analysis once.
report::PageContent page_content(const Options& options, const Input& input) {
  const assembly::Assembly& assembly = *input.assembly;
  ProgressBar bar(!options.quiet);
  analysis::BudgetResult budget = analysis::budget(
      assembly, {.split = analysis::Split::both, .threads = options.threads, .progress = &bar});
  refuse_file(budget.faults, input);
  const analysis::GhostsResult ghosts =
      analysis::ghosts(assembly, {.threads = options.threads, .progress = &bar});
  refuse_file(ghosts.faults, input);
  const analysis::PolarizationResult polarization =
      analysis::polarization(assembly, {.maps = true, .threads = options.threads, .progress = &bar});
  refuse_file(polarization.faults, input);
  analysis::Judgement verdicts =
      analysis::judge_all(assembly, *budget.budget, &*polarization.polarization, &*ghosts.ghosts);
  refuse_file(verdicts.faults, input);
  analysis::DrawingResult drawing = analysis::drawing(assembly);
  refuse_file(drawing.faults, input);

  report::PageContent content;
  content.envelope = envelope_of(options, input, joined(input, budget.warnings));
  content.file = input.file;
  content.text = input.text;
  content.budget = std::move(*budget.budget);
  content.verdicts = std::move(verdicts);
  content.drawing = std::move(*drawing.drawing);
  content.coatings = analysis::occurring_coatings(assembly, content.budget);
  report::Envelope envelope = envelope_of(options, input, ghosts.warnings);
  envelope.command = "ghosts";
  content.ghosts = report::ghosts_json(envelope, *ghosts.ghosts, false);
  envelope = envelope_of(options, input, polarization.warnings);
  envelope.command = "polarization";
  content.polarization = report::polarization_json(envelope, assembly, *polarization.polarization);
  content.paths =
      analysis::path_pictures(assembly, content.drawing.views.front().along, bounces_of(*ghosts.ghosts));
  content.maps = maps_of(input, *polarization.polarization);
  return content;
}

} // namespace

Answer answer_draw(const Options& options, const Input& input) {
  std::optional<analysis::Ghost> ghost;
  analysis::DrawingOptions wanted{.views = options.views};
  if (options.ghost) {
    ghost = ghost_of_rank(*options.ghost, options, input);
    wanted.ghost = ghost->bounces;
  }
  const analysis::DrawingResult result = analysis::drawing(*input.assembly, wanted);
  refuse_file(result.faults, input);

  const report::Envelope envelope = envelope_of(options, input, input.warnings);
  Answer answer = written(
      options, [&] { return report::drawing_json(envelope, *result.drawing); },
      [&] { return report::drawing_csv(*result.drawing); },
      [&] {
        return report::drawing_text(*input.assembly, *result.drawing, *options.out, envelope.warnings,
                                    style_of(options));
      });
  answer.out = report::drawing_svg(title_of(options, input, ghost), *result.drawing);
  return answer;
}

Answer answer_report(const Options& options, const Input& input) {
  const report::PageContent content = page_content(options, input);
  Answer answer = written(
      options, [&] { return report::page_json(*input.assembly, content); },
      [&] { return report::budget_csv(content.budget); },
      [&] { return report::page_text(*input.assembly, content, *options.out, style_of(options)); });
  answer.out = report::page(*input.assembly, content);
  return answer;
}

} // namespace lightledger::app
