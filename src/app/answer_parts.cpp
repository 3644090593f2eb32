#include "answer_parts.hpp"

#include "help.hpp"
#include "input_error.hpp"
#include "terminal.hpp"

#include <utility>

namespace lightledger::app {

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

Warnings joined(const Input& input, const Warnings& later) {
  Warnings all = input.warnings;
  all.insert(all.end(), later.begin(), later.end());
  return all;
}

void refuse_file(const assembly::Faults& faults, const Input& input) {
  if (!faults.none())
    throw InputError(assembly::describe(faults, input.file, input.text));
}

void refuse_request(const assembly::Faults& faults, const Options& options) {
  if (!faults.none())
    throw InputError(assembly::describe(faults, "lightledger", "") + command_usage(info(options.command)) +
                     '\n');
}

} // namespace lightledger::app
