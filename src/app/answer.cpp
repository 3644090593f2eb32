#include "answer.hpp"

#include "help.hpp"
#include "input_error.hpp"
#include "terminal.hpp"

#include <lightledger/analysis/coating_curve.hpp>
#include <lightledger/analysis/medium_table.hpp>
#include <lightledger/analysis/polarization.hpp>
#include <lightledger/analysis/requirements.hpp>
#include <lightledger/report/budget.hpp>
#include <lightledger/report/check.hpp>
#include <lightledger/report/coating.hpp>
#include <lightledger/report/drawing.hpp>
#include <lightledger/report/ghosts.hpp>
#include <lightledger/report/media.hpp>
#include <lightledger/report/page.hpp>
#include <lightledger/report/polarization.hpp>

#include <chrono>
#include <utility>

namespace lightledger::app {
namespace {

using assembly::Faults;
using Warnings = std::vector<std::string>;

/// The documents asked for, each made by its writer only then.
template <class Json, class Csv, class Text>
Answer written(const Options& options, Json json, Csv csv, Text text) {
  Answer answer;
  if (options.json)
    answer.json = json();
  if (options.csv)
    answer.csv = csv();
  if (!options.quiet)
    answer.text = text();
  return answer;
}

report::TextStyle style_of(const Options& options) {
  report::TextStyle style = style_of_stdout();
  style.decibels = options.decibels;
  return style;
}

report::Envelope envelope_of(const Options& options, const Input& input, Warnings warnings) {
  const std::optional<std::string> title =
      input.assembly ? std::optional(input.assembly->title) : std::nullopt;
  return {LIGHTLEDGER_VERSION, info(options.command).name, title, std::move(warnings)};
}

/// The warnings of reading the file, then those of the analysis.
Warnings joined(const Input& input, const Warnings& later) {
  Warnings all = input.warnings;
  all.insert(all.end(), later.begin(), later.end());
  return all;
}

void refuse_file(const Faults& faults, const Input& input) {
  if (!faults.none())
    throw InputError(assembly::describe(faults, input.file, input.text));
}

void refuse_request(const Faults& faults, const Options& options) {
  if (!faults.none())
    throw InputError(assembly::describe(faults, "lightledger", "") + command_usage(info(options.command)) +
                     '\n');
}

Answer answer_budget(const Options& options, const Input& input) {
  const auto start = std::chrono::steady_clock::now();
  const analysis::BudgetResult result =
      analysis::budget(*input.assembly, {.split = options.split, .threads = options.threads});
  const std::chrono::duration<double> elapsed = std::chrono::steady_clock::now() - start;
  refuse_file(result.faults, input);

  const report::Envelope envelope = envelope_of(options, input, joined(input, result.warnings));
  return written(
      options, [&] { return report::budget_json(envelope, *result.budget); },
      [&] { return report::budget_csv(*result.budget); },
      [&] {
        return report::budget_text(*input.assembly, *result.budget, envelope.warnings, elapsed,
                                   style_of(options));
      });
}

Answer answer_ghosts(const Options& options, const Input& input) {
  analysis::GhostOptions wanted = options.ghosts;
  wanted.threads = options.threads;
  wanted.maps = options.images.has_value();
  const auto start = std::chrono::steady_clock::now();
  const analysis::GhostsResult result = analysis::ghosts(*input.assembly, wanted);
  const std::chrono::duration<double> elapsed = std::chrono::steady_clock::now() - start;
  refuse_file(result.faults, input);

  const report::Envelope envelope = envelope_of(options, input, joined(input, result.warnings));
  report::GhostsTextOptions shown;
  shown.returned = options.returned;
  if (wanted.top)
    shown.rows = *wanted.top;
  Answer answer = written(
      options, [&] { return report::ghosts_json(envelope, *result.ghosts, options.returned); },
      [&] { return report::ghosts_csv(*result.ghosts); },
      [&] {
        return report::ghosts_text(*input.assembly, *result.ghosts, envelope.warnings, elapsed, shown,
                                   style_of(options));
      });
  if (options.images)
    answer.files = report::ghosts_files(*result.ghosts);
  return answer;
}

Answer answer_check(const Options& options, const Input& input) {
  const analysis::CheckResult result = analysis::check(*input.assembly, {.threads = options.threads});
  refuse_file(result.faults, input);

  const report::Envelope envelope = envelope_of(options, input, joined(input, result.warnings));
  Answer answer = written(
      options, [&] { return report::check_json(envelope, *result.judgement); },
      [&] { return report::check_csv(*result.judgement); },
      [&] {
        return report::check_text(*input.assembly, *result.judgement, envelope.warnings, style_of(options));
      });
  answer.met = result.judgement->all_met();
  return answer;
}

Answer answer_polarization(const Options& options, const Input& input) {
  const auto start = std::chrono::steady_clock::now();
  const analysis::PolarizationResult result = analysis::polarization(
      *input.assembly,
      {.against = options.against, .maps = options.maps.has_value(), .threads = options.threads});
  const std::chrono::duration<double> elapsed = std::chrono::steady_clock::now() - start;
  refuse_file(result.faults, input);

  const report::Envelope envelope = envelope_of(options, input, joined(input, result.warnings));
  Answer answer = written(
      options, [&] { return report::polarization_json(envelope, *input.assembly, *result.polarization); },
      [&] { return report::polarization_csv(*result.polarization); },
      [&] {
        return report::polarization_text(*input.assembly, *result.polarization, envelope.warnings, elapsed,
                                         style_of(options));
      });
  if (options.maps)
    answer.files = report::polarization_files(*input.assembly, *result.polarization);
  return answer;
}

analysis::CoatingRequest coating_request(const Options& options) {
  analysis::CoatingRequest request{.name = options.name.value_or("")};
  request.substrate = options.substrate;
  request.wavelengths_nm = options.wavelengths_nm;
  if (options.incident)
    request.incident = *options.incident;
  if (!options.angles_deg.empty())
    request.angles_deg = options.angles_deg;
  return request;
}

Answer answer_coating(const Options& options, const Input& input) {
  const analysis::CoatingCurveResult result =
      analysis::coating_curve(*input.assembly, coating_request(options));
  refuse_file(result.faults, input);

  const report::Envelope envelope = envelope_of(options, input, input.warnings);
  return written(
      options, [&] { return report::coating_json(envelope, *result.curve); },
      [&] { return report::coating_csv(*result.curve); },
      [&] { return report::coating_text(*result.curve, envelope.warnings, style_of(options)); });
}

Answer answer_media(const Options& options, const Input& input) {
  const analysis::MediumTableResult result = analysis::medium_table(options.name, options.wavelengths_nm);
  refuse_request(result.faults, options);

  const report::Envelope envelope = envelope_of(options, input, {});
  return written(
      options, [&] { return report::media_json(envelope, *result.media); },
      [&] { return report::media_csv(*result.media); },
      [&] { return report::media_text(*result.media, style_of(options)); });
}

Answer answer_draw(const Options& options, const Input& input) {
  const analysis::DrawingResult result = analysis::drawing(*input.assembly, {.views = options.views});
  refuse_file(result.faults, input);

  const report::Envelope envelope = envelope_of(options, input, input.warnings);
  Answer answer = written(
      options, [&] { return report::drawing_json(envelope, *result.drawing); },
      [&] { return report::drawing_csv(*result.drawing); },
      [&] {
        return report::drawing_text(*input.assembly, *result.drawing, *options.out, envelope.warnings,
                                    style_of(options));
      });
  answer.out = report::drawing_svg(input.assembly->title, *result.drawing);
  return answer;
}

/// The budget that the page shows, traced once, and the verdicts on it.
report::PageContent page_content(const Options& options, const Input& input) {
  const assembly::Assembly& assembly = *input.assembly;
  analysis::BudgetResult budget =
      analysis::budget(assembly, {.split = analysis::Split::both, .threads = options.threads});
  refuse_file(budget.faults, input);
  analysis::Judgement verdicts = analysis::judge_all(assembly, *budget.budget);
  refuse_file(verdicts.faults, input);
  analysis::DrawingResult drawing = analysis::drawing(assembly);
  refuse_file(drawing.faults, input);

  report::PageContent content{envelope_of(options, input, joined(input, budget.warnings)),
                              input.file,
                              input.text,
                              std::move(*budget.budget),
                              std::move(verdicts),
                              std::move(*drawing.drawing),
                              {},
                              {},
                              {},
                              {},
                              {}};
  content.coatings = analysis::occurring_coatings(assembly, content.budget);
  content.paths = analysis::path_pictures(assembly, content.drawing.views.front().along, {});
  return content;
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

} // namespace

Input read_input(const Options& options) {
  if (options.command == Command::media)
    return {};
  assembly::Loaded loaded = assembly::load(options.file, options.changes, {{}, options.allow_outside});
  if (!loaded.faults.none())
    throw InputError(loaded.report());
  return {std::move(loaded.assembly), std::move(loaded.warnings), std::move(loaded.file),
          std::move(loaded.text)};
}

Answer answer(const Options& options, const Input& input) {
  switch (options.command) {
  case Command::budget:
    return answer_budget(options, input);
  case Command::check:
    return answer_check(options, input);
  case Command::ghosts:
    return answer_ghosts(options, input);
  case Command::polarization:
    return answer_polarization(options, input);
  case Command::coating:
    return answer_coating(options, input);
  case Command::draw:
    return answer_draw(options, input);
  case Command::report:
    return answer_report(options, input);
  case Command::media:
    break;
  }
  return answer_media(options, input);
}

} // namespace lightledger::app
