#pragma once

#include "answer.hpp"
#include "folder.hpp"
#include "options.hpp"
#include "output.hpp"

#include <lightledger/assembly/diagnostics.hpp>

#include <memory>
#include <optional>
#include <string>
#include <vector>

namespace lightledger::app {

/// All that a run writes, opened before the run. Files come into their places together, stdout comes last.
class Outputs {
public:
  /// Throws InputError where a place cannot be written, is the input, or is given twice.
  explicit Outputs(const Options& options);

  /// Throws std::system_error where writing fails; no file is changed then unless a rename is what failed.
  void write(const Answer& answer);

private:
  /// A place and the document that goes there.
  struct Target {
    const char* option;
    std::string Answer::*document;
    std::unique_ptr<Output> output;
  };

  void open(const char* option, const std::optional<std::string>& path, std::string Answer::*document);
  void open_folder(const char* option, const std::optional<std::string>& path);
  void refuse_clashes(const Options& options);

  std::vector<Target> m_targets;
  assembly::Faults m_faults;
  std::optional<Folder> m_folder;
};

} // namespace lightledger::app
