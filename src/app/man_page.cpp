#include "man_page.hpp"

#include "commands.hpp"
#include "words.hpp"

#include <fmt/format.h>

#include <string_view>
#include <vector>

namespace lightledger::app {
namespace {

/// Text as roff takes it: backslashes and hyphens are themselves, and no line is a request by chance.
std::string roff(std::string_view text) {
  std::string result;
  for (const char letter : text)
    if (letter == '\\')
      result += "\\e";
    else if (letter == '-')
      result += "\\-";
    else
      result += letter;
  return result.starts_with('.') || result.starts_with('\'') ? "\\&" + result : result;
}

/// A term in bold, what it takes in italics, and its meaning indented below.
std::string entry(std::string_view term, std::string_view value, std::string_view meaning) {
  const std::string argument = value.empty() ? "" : fmt::format(" \\fI{}\\fR", roff(value));
  return fmt::format(".TP\n\\fB{}\\fR{}\n{}\n", roff(term), argument, roff(meaning));
}

std::string entries(const std::vector<OptionInfo>& options) {
  std::string text;
  for (const OptionInfo& option : options)
    text += entry(option.name, option.value ? option.value : "", option.meaning);
  return text;
}

std::string command_entries() {
  std::string text;
  for (const CommandInfo& command : commands())
    text += entry(command.name, command.arguments, command.purpose);
  return text;
}

std::string own_option_sections() {
  std::string text;
  for (const CommandInfo& command : commands())
    if (const auto& options = own_options(command.command); !options.empty())
      text += fmt::format(".SS \"Options of {}\"\n{}", command.name, entries(options));
  return text;
}

std::string examples() {
  std::string text;
  for (const CommandInfo& command : commands())
    text += fmt::format(".PP\n.EX\n{}\n.EE\n", roff(command.example));
  return text;
}

std::string exit_codes() {
  return entry("0", "", "done") +
         entry("1", "", "a requirement is not met, or cannot be told at this accuracy (check only)") +
         entry("2", "", "the input or the command line is wrong; nothing was written") +
         entry("3", "", "anything else");
}

} // namespace

std::string man_page() {
  return fmt::format(R"(.TH LIGHTLEDGER 1 "" "lightledger {}" "User Commands"
.SH NAME
lightledger \- the optical budget of a train of lenses, mirrors and coatings
.SH SYNOPSIS
.B lightledger
.I COMMAND FILE
.RI [ options ]
.SH DESCRIPTION
lightledger keeps the ledger of an optical train: every unit of launched power is entered, followed, and accounted for.
A YAML file describes the light, the train that it passes, and what is required of it.
.SH COMMANDS
{}.SH OPTIONS
Every command takes these:
{}{}.TP
\fB\-\-help\fR
after a command, its options; without one, the commands
.TP
\fB\-\-version\fR
the version alone
.SH "EXIT STATUS"
{}.SH EXAMPLES
{}.SH CAUTION
Focused, reflected and returned laser beams can damage optics and eyes.
No figure of this program replaces the judgement of a laser safety officer and IEC 60825\-1.
)",
                     LIGHTLEDGER_VERSION, command_entries(), entries(common_options()), own_option_sections(),
                     exit_codes(), examples());
}

} // namespace lightledger::app
