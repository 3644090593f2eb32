#pragma once

#include "commands.hpp"

#include <string>
#include <vector>

namespace lightledger::app {

/// What the user typed after the command, not yet understood: every value of every option, in order.
struct Words {
  std::vector<std::string> positionals;
  std::vector<std::string> unknown; ///< options that the command does not have
  std::vector<std::string> json, csv, rays, accuracy, threads, isa, set;
  std::vector<std::string> bounces, floor, top, field, images;
  std::vector<std::string> split, against, maps, incident, substrate, wavelengths, angles;
  std::vector<std::string> out, view, ghost;
  bool decibels = false;
  bool quiet = false;
  bool returned = false;
  bool allow_outside = false;
};

/// An option of a command: it fills either a list of values or a switch.
struct OptionInfo {
  const char* name;
  const char* value; ///< what it takes, for the help; null for a switch
  const char* meaning;
  std::vector<std::string> Words::*values = nullptr;
  bool Words::*switched = nullptr;
};

/// Options that all commands share, and those of one command alone.
[[nodiscard]] const std::vector<OptionInfo>& common_options();
[[nodiscard]] const std::vector<OptionInfo>& own_options(Command command);

/// Sorts the arguments of a command. An option without its value gets an empty one.
[[nodiscard]] Words sort_words(Command command, std::vector<std::string> arguments);

} // namespace lightledger::app
