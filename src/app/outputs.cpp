#include "outputs.hpp"

#include "help.hpp"
#include "input_error.hpp"
#include "interruption.hpp"

#include <lightledger/assembly/diagnostics.hpp>

#include <fmt/format.h>

#include <system_error>

namespace lightledger::app {
namespace {

using assembly::Faults;

void open(std::optional<Output>& output, const char* option, const std::optional<std::string>& path,
          Faults& faults) {
  if (!path)
    return;
  try {
    output.emplace(*path);
  } catch (const std::system_error& error) {
    faults.add(
        {{},
         fmt::format("{}: '{}' cannot be opened for writing: {}", option, *path, error.code().message()),
         {},
         {}});
  }
}

void keep_input(const char* option, const std::optional<Output>& output, const Options& options,
                Faults& faults) {
  if (output && output->is_file(options.file))
    faults.add({{}, fmt::format("{}: '{}' is the input file", option, output->path()), {}, {}});
}

} // namespace

Outputs::Outputs(const Options& options) {
  Faults faults;
  open(m_json, "--json", options.json, faults);
  open(m_csv, "--csv", options.csv, faults);
  keep_input("--json", m_json, options, faults);
  keep_input("--csv", m_csv, options, faults);
  open_folder("--maps", options.maps, faults);
  open_folder("--images", options.images, faults);
  if (m_json && m_csv && m_json->same_place(*m_csv))
    faults.add({{}, "--json and --csv go to the same place", "two different paths", {}});
  if (!faults.none())
    throw InputError(assembly::describe(faults, "lightledger", "") + command_usage(info(options.command)) +
                     '\n');
}

void Outputs::open_folder(const char* option, const std::optional<std::string>& path, Faults& faults) {
  if (!path)
    return;
  try {
    m_folder.emplace(*path);
  } catch (const std::system_error& error) {
    faults.add({{},
                fmt::format("{}: '{}' is no folder to write into: {}", option, *path, error.code().message()),
                {},
                {}});
  }
}

bool Outputs::stdout_is_taken() const {
  return (m_json && m_json->is_stdout()) || (m_csv && m_csv->is_stdout());
}

void Outputs::write(const Answer& answer) {
  const auto stage = [&](Output::Kind kind) {
    if (m_json && m_json->kind() == kind)
      m_json->stage(answer.json);
    if (m_csv && m_csv->kind() == kind)
      m_csv->stage(answer.csv);
  };
  stage(Output::Kind::device);
  {
    const Uninterrupted together;
    if (m_folder)
      m_folder->write(answer.files);
    stage(Output::Kind::file);
    for (std::optional<Output>* output : {&m_json, &m_csv})
      if (*output)
        (*output)->publish();
    files_are_written();
  }
  stage(Output::Kind::standard_output);
  if (!stdout_is_taken())
    Output("-").stage(answer.text);
}

} // namespace lightledger::app
