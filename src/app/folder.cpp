#include "folder.hpp"

#include "output.hpp"

#include <unistd.h>

#include <cerrno>
#include <memory>
#include <system_error>

namespace lightledger::app {
namespace {

namespace fs = std::filesystem;

/// The folder itself, or the nearest one above it that is there.
fs::path nearest_existing(const fs::path& path) {
  fs::path place = fs::absolute(path);
  while (!fs::exists(place) && place.has_relative_path())
    place = place.parent_path();
  return place;
}

} // namespace

Folder::Folder(const std::string& path) : m_path(path) {
  const fs::path place = nearest_existing(m_path);
  if (!fs::is_directory(place))
    throw std::system_error(ENOTDIR, std::generic_category(), path);
  if (access(place.c_str(), W_OK | X_OK) != 0)
    throw_errno(path);
}

void Folder::write(const std::vector<report::NamedFile>& files) const {
  fs::create_directories(m_path);
  std::vector<std::unique_ptr<Output>> outputs;
  for (const report::NamedFile& file : files) {
    outputs.push_back(std::make_unique<Output>((m_path / file.name).string()));
    outputs.back()->stage(file.bytes);
  }
  for (const auto& output : outputs)
    output->publish();
}

} // namespace lightledger::app
