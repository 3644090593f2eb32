#include "completions.hpp"

#include "commands.hpp"
#include "words.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <string_view>
#include <vector>

namespace lightledger::app {
namespace {

std::vector<OptionInfo> options_of(const CommandInfo& command) {
  std::vector<OptionInfo> options = own_options(command.command);
  options.insert(options.end(), common_options().begin(), common_options().end());
  return options;
}

bool takes_path(const OptionInfo& option) {
  return option.value &&
         (std::string_view(option.value) == "PATH" || std::string_view(option.value) == "FOLDER");
}

/// The words that an option takes, as `wavelength|field`, with blanks between them; empty where it takes
/// others.
std::string choices(const OptionInfo& option) {
  std::string words = option.value ? option.value : "";
  if (words.find('|') == std::string::npos)
    return {};
  std::ranges::replace(words, '|', ' ');
  return words;
}

bool reads_file(const CommandInfo& command) {
  return std::string_view(command.arguments).starts_with("FILE");
}

std::string replaced(std::string text, std::string_view what, std::string_view by) {
  for (std::size_t at = text.find(what); at != std::string::npos; at = text.find(what, at + by.size()))
    text.replace(at, what.size(), by);
  return text;
}

/// In single quotes for bash and zsh.
std::string quoted(const std::string& text) {
  return "'" + replaced(text, "'", R"('\'')") + "'";
}

std::string names_of(const CommandInfo& command) {
  std::string names;
  for (const OptionInfo& option : options_of(command))
    names.append(option.name).append(" ");
  return names + "--help";
}

std::string all_commands() {
  std::string names;
  for (const CommandInfo& command : commands())
    names.append(command.name).append(" ");
  return names + "--help --version";
}

/// What follows an option that takes a value, for all options of all commands: each name once.
std::string bash_values() {
  std::string cases;
  std::vector<std::string_view> seen;
  for (const CommandInfo& command : commands())
    for (const OptionInfo& option : options_of(command)) {
      if (!option.value || std::ranges::find(seen, option.name) != seen.end())
        continue;
      seen.emplace_back(option.name);
      const std::string words = choices(option);
      if (!words.empty())
        cases += fmt::format("    {}) COMPREPLY=($(compgen -W '{}' -- \"$word\")); return ;;\n", option.name,
                             words);
      else
        cases += fmt::format("    {}) {}return ;;\n", option.name,
                             takes_path(option) ? "compopt -o default; " : "");
    }
  return cases;
}

std::string bash_options() {
  std::string cases;
  for (const CommandInfo& command : commands())
    cases += fmt::format("    {}) options='{}' ;;\n", command.name, names_of(command));
  return cases;
}

/// An explanation within a zsh specification, where colons and brackets mean something.
std::string zsh_escaped(std::string text) {
  for (const char* sign : {":", "[", "]"})
    text = replaced(text, sign, std::string("\\") + sign);
  return text;
}

std::string zsh_argument(const OptionInfo& option) {
  if (!option.value)
    return {};
  const std::string words = choices(option);
  const std::string action = !words.empty() ? "(" + words + ")" : takes_path(option) ? "_files" : " ";
  return fmt::format(":{}:{}", zsh_escaped(option.value), action);
}

std::string zsh_command(const CommandInfo& command) {
  std::string words = fmt::format("    {})\n      _arguments \\\n", command.name);
  for (const OptionInfo& option : options_of(command))
    words += fmt::format("        {} \\\n",
                         quoted(fmt::format("{}{}[{}]{}", option.values == &Words::set ? "*" : "",
                                            option.name, zsh_escaped(option.meaning), zsh_argument(option))));
  return words + fmt::format("        '--help[the options of the command]' \\\n        {}\n      ;;\n",
                             reads_file(command) ? "'1:file:_files' '2: : '" : "'1: : '");
}

std::string fish_quoted(const std::string& text) {
  return "'" + replaced(replaced(text, "\\", "\\\\"), "'", "\\'") + "'";
}

std::string fish_option(const CommandInfo& command, const OptionInfo& option) {
  const std::string words = choices(option);
  std::string line = fmt::format("complete -c lightledger -n '__fish_seen_subcommand_from {}' -l {}",
                                 command.name, std::string_view(option.name).substr(2));
  if (!words.empty())
    line += fmt::format(" -x -a '{}'", words);
  else if (option.value)
    line += takes_path(option) ? " -r -F" : " -x";
  return line + fmt::format(" -d {}\n", fish_quoted(option.meaning));
}

} // namespace

std::string bash_completion() {
  return fmt::format(R"(# Completion of lightledger for bash.
_lightledger() {{
  local word=${{COMP_WORDS[COMP_CWORD]}} before=${{COMP_WORDS[COMP_CWORD-1]}} options=
  COMPREPLY=()
  if [ "$COMP_CWORD" -eq 1 ]; then
    COMPREPLY=($(compgen -W '{}' -- "$word"))
    return
  fi
  case $before in
{}  esac
  case ${{COMP_WORDS[1]}} in
{}  esac
  case $word in
    -*) COMPREPLY=($(compgen -W "$options" -- "$word")) ;;
    *) compopt -o default ;;
  esac
}}
complete -F _lightledger lightledger
)",
                     all_commands(), bash_values(), bash_options());
}

std::string zsh_completion() {
  std::string names;
  std::string cases;
  for (const CommandInfo& command : commands()) {
    names += "    " + quoted(fmt::format("{}:{}", command.name, zsh_escaped(command.purpose))) + '\n';
    cases += zsh_command(command);
  }
  return fmt::format(R"(#compdef lightledger
# Completion of lightledger for zsh.
_lightledger() {{
  local -a commands
  commands=(
{}  )
  if (( CURRENT == 2 )); then
    _describe command commands
    return
  fi
  local command=$words[2]
  shift words
  (( CURRENT-- ))
  case $command in
{}  esac
}}
_lightledger "$@"
)",
                     names, cases);
}

std::string fish_completion() {
  std::string text = "# Completion of lightledger for fish.\n"
                     "complete -c lightledger -n __fish_use_subcommand -f\n";
  for (const CommandInfo& command : commands())
    text += fmt::format("complete -c lightledger -n __fish_use_subcommand -a {} -d {}\n", command.name,
                        fish_quoted(command.purpose));
  for (const CommandInfo& command : commands())
    for (const OptionInfo& option : options_of(command))
      text += fish_option(command, option);
  return text;
}

} // namespace lightledger::app
