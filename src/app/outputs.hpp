#pragma once

#include "answer.hpp"
#include "folder.hpp"
#include "options.hpp"
#include "output.hpp"

#include <lightledger/assembly/diagnostics.hpp>

#include <optional>

namespace lightledger::app {

/// All that a run writes, opened before the run. Files come into their places together, stdout comes last.
class Outputs {
public:
  /// Throws InputError where a place cannot be written, is the input, or is given twice.
  explicit Outputs(const Options& options);

  /// Throws std::system_error where writing fails; no file is changed then unless a rename is what failed.
  void write(const Answer& answer);

private:
  void open_folder(const char* option, const std::optional<std::string>& path, assembly::Faults& faults);
  [[nodiscard]] bool stdout_is_taken() const;

  std::optional<Output> m_json, m_csv;
  std::optional<Folder> m_folder;
};

} // namespace lightledger::app
