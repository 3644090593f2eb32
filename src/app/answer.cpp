#include "answer.hpp"

#include "answer_parts.hpp"
#include "answer_pictures.hpp"
#include "input_error.hpp"
#include "progress_bar.hpp"

#include <lightledger/analysis/coating_curve.hpp>
#include <lightledger/analysis/medium_table.hpp>
#include <lightledger/analysis/polarization.hpp>
#include <lightledger/analysis/remedy.hpp>
#include <lightledger/analysis/requirements.hpp>
#include <lightledger/report/budget.hpp>
#include <lightledger/report/check.hpp>
#include <lightledger/report/coating.hpp>
#include <lightledger/report/ghosts.hpp>
#include <lightledger/report/media.hpp>
#include <lightledger/report/polarization.hpp>

#include <chrono>
#include <utility>

namespace lightledger::app {
namespace {

/// What an analysis of rays gives, its progress shown meanwhile.
template <class Analysis>
auto watched(const Options& options, Analysis analysis) {
  ProgressBar bar(!options.quiet);
  return analysis(analysis::BudgetOptions{options.split, options.threads, &bar});
}

Answer answer_budget(const Options& options, const Input& input) {
  const auto start = std::chrono::steady_clock::now();
  const analysis::BudgetResult result =
      watched(options, [&](const auto& asked) { return analysis::budget(*input.assembly, asked); });
  const std::chrono::duration<double> elapsed = std::chrono::steady_clock::now() - start;
  refuse_file(result.faults, input);

  const report::Envelope envelope = envelope_of(options, input, joined(input, result.warnings));
  return written(
      options, [&] { return report::budget_json(envelope, *result.budget); },
      [&] { return report::budget_csv(*result.budget); },
      [&] {
        const auto remedies =
            analysis::remedies(*input.assembly, *result.budget, {.threads = options.threads});
        return report::budget_text(*input.assembly, *result.budget, remedies, envelope.warnings, elapsed,
                                   style_of(options));
      });
}

Answer answer_ghosts(const Options& options, const Input& input) {
  analysis::GhostOptions wanted = options.ghosts;
  wanted.threads = options.threads;
  wanted.maps = options.images.has_value();
  const auto start = std::chrono::steady_clock::now();
  const analysis::GhostsResult result = watched(options, [&](const auto& asked) {
    wanted.progress = asked.progress;
    return analysis::ghosts(*input.assembly, wanted);
  });
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
  const analysis::CheckResult result =
      watched(options, [&](const auto& asked) { return analysis::check(*input.assembly, asked); });
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
  const analysis::PolarizationResult result = watched(options, [&](const auto& asked) {
    return analysis::polarization(*input.assembly, {.against = options.against,
                                                    .maps = options.maps.has_value(),
                                                    .threads = asked.threads,
                                                    .progress = asked.progress});
  });
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

  Warnings warnings;
  if (!options.changes.empty())
    warnings.emplace_back("media reads no assembly: --set, --rays and --accuracy change nothing here");
  const report::Envelope envelope = envelope_of(options, input, std::move(warnings));
  return written(
      options, [&] { return report::media_json(envelope, *result.media); },
      [&] { return report::media_csv(*result.media); },
      [&] { return report::media_text(*result.media, envelope.warnings, style_of(options)); });
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
