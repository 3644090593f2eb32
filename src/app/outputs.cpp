#include "outputs.hpp"

#include "help.hpp"
#include "input_error.hpp"
#include "interruption.hpp"

#include <lightledger/assembly/diagnostics.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <system_error>

namespace lightledger::app {

Outputs::Outputs(const Options& options) {
  open("--json", options.json, &Answer::json);
  open("--csv", options.csv, &Answer::csv);
  open("--out", options.out, &Answer::out);
  open_folder("--maps", options.maps);
  open_folder("--images", options.images);
  refuse_clashes(options);
  if (!m_faults.none())
    throw InputError(assembly::describe(m_faults, "lightledger", "") + command_usage(info(options.command)) +
                     '\n');
}

void Outputs::open(const char* option, const std::optional<std::string>& path,
                   std::string Answer::*document) {
  if (!path)
    return;
  try {
    m_targets.push_back({option, document, std::make_unique<Output>(*path)});
  } catch (const std::system_error& error) {
    m_faults.add(
        {{},
         fmt::format("{}: '{}' cannot be opened for writing: {}", option, *path, error.code().message()),
         {},
         {}});
  }
}

void Outputs::open_folder(const char* option, const std::optional<std::string>& path) {
  if (!path)
    return;
  try {
    m_folder.emplace(*path);
  } catch (const std::system_error& error) {
    m_faults.add(
        {{},
         fmt::format("{}: '{}' is no folder to write into: {}", option, *path, error.code().message()),
         {},
         {}});
  }
}

void Outputs::refuse_clashes(const Options& options) {
  for (const Target& target : m_targets)
    if (target.output->is_file(options.file))
      m_faults.add(
          {{}, fmt::format("{}: '{}' is the input file", target.option, target.output->path()), {}, {}});
  for (std::size_t i = 0; i < m_targets.size(); ++i)
    for (std::size_t j = i + 1; j < m_targets.size(); ++j)
      if (m_targets[i].output->same_place(*m_targets[j].output))
        m_faults.add({{},
                      fmt::format("{} and {} go to the same place", m_targets[i].option, m_targets[j].option),
                      "two different paths",
                      {}});
}

void Outputs::write(const Answer& answer) {
  const auto stage = [&](Output::Kind kind) {
    for (const Target& target : m_targets)
      if (target.output->kind() == kind)
        target.output->stage(answer.*target.document);
  };
  stage(Output::Kind::device);
  {
    const Uninterrupted together;
    if (m_folder)
      m_folder->write(answer.files);
    stage(Output::Kind::file);
    for (const Target& target : m_targets)
      target.output->publish();
    files_are_written();
  }
  stage(Output::Kind::standard_output);
  const auto takes_stdout = [](const Target& target) {
    return target.output->kind() == Output::Kind::standard_output;
  };
  if (std::ranges::none_of(m_targets, takes_stdout))
    Output("-").stage(answer.text);
}

} // namespace lightledger::app
