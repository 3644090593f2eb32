#pragma once

#include "options.hpp"

#include <lightledger/assembly/assembly.hpp>
#include <lightledger/report/named_file.hpp>

#include <optional>
#include <string>
#include <vector>

namespace lightledger::app {

/// What a command works on.
struct Input {
  std::optional<assembly::Assembly> assembly; ///< none for `media`
  std::vector<std::string> warnings;          ///< of reading it
  std::string file, text;                     ///< for the report of faults
};

/// Reads the file that the command asks for. Throws InputError with the report of its faults.
[[nodiscard]] Input read_input(const Options& options);

/// What a command has to say; documents that nobody asked for are empty.
struct Answer {
  std::string text, json, csv;
  std::string out;                      ///< the picture or page
  std::vector<report::NamedFile> files; ///< for the folder that was asked for
  bool met = true;                      ///< false where `check` finds a requirement not met, or cannot tell
};

/// Runs the command. Throws InputError where the input turns out to be wrong.
[[nodiscard]] Answer answer(const Options& options, const Input& input);

} // namespace lightledger::app
