#pragma once

#include <lightledger/assembly/assembly.hpp>
#include <lightledger/assembly/diagnostics.hpp>
#include <lightledger/assembly/document.hpp>

#include <filesystem>
#include <optional>
#include <string>
#include <vector>

namespace lightledger::assembly {

/// What became of an assembly file: the assembly, or the faults that stand in its way.
struct Loaded {
  std::optional<Assembly> assembly; ///< none where there are faults
  std::vector<std::string> warnings;
  Faults faults;
  std::string file;
  std::string text;

  /// The report of the faults, empty where there are none.
  [[nodiscard]] std::string report() const { return describe(faults, file, text); }
};

/// One change of a value on its way from the file to the assembly: an address and YAML flow text.
struct Change {
  std::string address;
  std::string value;
};

/// Where files of measured curves are looked for.
struct MeasuredFiles {
  std::filesystem::path folder; ///< that their names start from; empty: that of the assembly file
  bool allow_outside = false;   ///< whether they may lie outside of it, links followed
};

/// Reads, checks and completes an assembly file. All faults of the file are found in one run: of syntax, of
/// names, types, units and senses, of media out of their range at the light's wavelengths.
[[nodiscard]] Loaded load(const std::filesystem::path& path, const std::vector<Change>& changes = {},
                          const MeasuredFiles& curves = {});

/// The same for text that is already here; `file` is the name used in messages.
[[nodiscard]] Loaded load_text(std::string file, std::string text, const std::vector<Change>& changes = {},
                               const MeasuredFiles& curves = {});

} // namespace lightledger::assembly
