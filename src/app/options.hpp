#pragma once

#include "commands.hpp"

#include <lightledger/analysis/budget.hpp>
#include <lightledger/analysis/drawing.hpp>
#include <lightledger/analysis/ghosts.hpp>
#include <lightledger/analysis/polarization.hpp>
#include <lightledger/assembly/load.hpp>
#include <lightledger/trace/instruction_set.hpp>

#include <optional>
#include <string>
#include <vector>

namespace lightledger::app {

/// The command line, read and checked.
struct Options {
  Command command = Command::check;
  std::string file;                ///< empty for `media`
  std::optional<std::string> name; ///< of the coating or medium

  std::optional<std::string> json, csv;  ///< paths, `-` for stdout
  std::vector<assembly::Change> changes; ///< of --set, --rays and --accuracy
  int threads = 0;
  std::optional<trace::InstructionSet> isa; ///< none: the fastest
  bool decibels = false;
  bool quiet = false;
  bool allow_outside = false; ///< measured curves may lie outside the assembly file's folder

  analysis::Split split = analysis::Split::none;
  analysis::GhostOptions ghosts;
  bool returned = false;             ///< ghosts: list what leaves through the front too
  std::optional<std::string> images; ///< the folder for pictures
  analysis::Against against = analysis::Against::nothing;
  std::optional<std::string> maps; ///< a folder
  std::optional<std::string> incident, substrate;
  std::vector<double> wavelengths_nm, angles_deg; ///< empty where not given

  std::optional<std::string> out;     ///< path of the picture or page, `-` for stdout
  std::vector<analysis::View> views;  ///< empty: the one that shows most
  std::optional<std::uint64_t> ghost; ///< rank of the ghost to draw, from 1
};

} // namespace lightledger::app
