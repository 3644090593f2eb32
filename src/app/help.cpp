#include "help.hpp"

#include "words.hpp"

#include <fmt/format.h>

#include <algorithm>

namespace lightledger::app {
namespace {

std::string left_side(const OptionInfo& option) {
  return option.value ? fmt::format("{} {}", option.name, option.value) : option.name;
}

/// One line an option; a long left side has a line of its own.
std::string option_lines(const std::vector<OptionInfo>& options) {
  constexpr std::size_t left_width = 18;
  std::string lines;
  for (const OptionInfo& option : options) {
    const std::string left = left_side(option);
    if (left.size() > left_width)
      lines += fmt::format("  {}\n  {:{}}  {}\n", left, "", left_width, option.meaning);
    else
      lines += fmt::format("  {:{}}  {}\n", left, left_width, option.meaning);
  }
  return lines;
}

} // namespace

std::string program_usage() {
  return "usage: lightledger COMMAND FILE [options]";
}

std::string command_usage(const CommandInfo& command) {
  return fmt::format("usage: lightledger {} {} [options]", command.name, command.arguments);
}

std::string program_help() {
  std::string text = "lightledger keeps the ledger of an optical train: every unit of launched power\n"
                     "is entered, followed, and accounted for. A YAML file describes the train.\n\n";
  text += program_usage() + "\n\n";
  for (const CommandInfo& command : commands())
    text +=
        fmt::format("  {:18} {}\n", fmt::format("{} {}", command.name, command.arguments), command.purpose);
  text += "\n`lightledger COMMAND --help` lists the options of a command, `lightledger\n"
          "--version` tells the version. Exit codes: 0 done; 1 a requirement is not met, or\n"
          "cannot be told; 2 the input or the command line is wrong; 3 anything else.\n\n";
  text += fmt::format("example: {}\n", info(Command::budget).example);
  return text;
}

std::string command_help(const CommandInfo& command) {
  const std::string own = option_lines(own_options(command.command));
  return fmt::format("{}\n\n{}\n\n{}{}{}\nexample: {}\n", command.purpose, command_usage(command), own,
                     own.empty() ? "" : "\n", option_lines(common_options()), command.example);
}

} // namespace lightledger::app
