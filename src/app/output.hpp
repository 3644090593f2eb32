#pragma once

#include "descriptor.hpp"

#include <filesystem>
#include <string>
#include <string_view>

namespace lightledger::app {

/// A place that a document goes to. A regular file is replaced as a whole: the document is staged in a
/// temporary file beside it, then renamed. Devices and pipes are opened at once and written to directly, and
/// so is stdout.
class Output {
public:
  /// Opens the place, or finds out that it can be written, without changing it; `-` is stdout. Throws
  /// std::system_error where it cannot be written.
  explicit Output(std::string path);
  ~Output();
  Output(const Output&) = delete;
  Output& operator=(const Output&) = delete;

  [[nodiscard]] const std::string& path() const { return m_path; }
  enum class Kind { file, device, standard_output };
  [[nodiscard]] Kind kind() const { return m_kind; }
  [[nodiscard]] bool is_stdout() const { return m_kind == Kind::standard_output; }

  /// Whether two documents would get into each other's way; the null device takes any number.
  [[nodiscard]] bool same_place(const Output& other) const;
  [[nodiscard]] bool is_file(const std::filesystem::path& path) const;

  /// Writes the document, for a regular file where nobody sees it yet.
  void stage(std::string_view document);
  /// Puts a staged file in its place.
  void publish();

private:
  void open_device();
  void probe_file();

  std::string m_path;
  std::filesystem::path m_target; ///< with links followed
  Kind m_kind = Kind::file;
  Descriptor m_direct;     ///< of stdout, a device or a pipe
  std::string m_temporary; ///< of a staged file; empty without one
};

} // namespace lightledger::app
