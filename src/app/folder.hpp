#pragma once

#include <lightledger/report/named_file.hpp>

#include <filesystem>
#include <string>
#include <vector>

namespace lightledger::app {

/// A folder that several documents go to; it is made when they are written.
class Folder {
public:
  /// Throws std::system_error where it cannot be made or written into; changes nothing.
  explicit Folder(const std::string& path);

  /// Each file is written whole or not at all, and all are before any comes into its place.
  void write(const std::vector<report::NamedFile>& files) const;

private:
  std::filesystem::path m_path;
};

} // namespace lightledger::app
