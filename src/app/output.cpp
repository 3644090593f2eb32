#include "output.hpp"

#include "interruption.hpp"

#include <fcntl.h>
#include <sys/stat.h>
#include <sys/sysmacros.h>
#include <unistd.h>

#include <cerrno>
#include <optional>
#include <system_error>
#include <utility>

namespace lightledger::app {
namespace {

namespace fs = std::filesystem;

std::optional<struct stat> status_of(const fs::path& path) {
  struct stat status {};
  return stat(path.c_str(), &status) == 0 ? std::optional(status) : std::nullopt;
}

bool is_null_device(const struct stat& status) {
  return S_ISCHR(status.st_mode) && status.st_rdev == makedev(1, 3);
}

bool same_inode(const struct stat& a, const struct stat& b) {
  return a.st_dev == b.st_dev && a.st_ino == b.st_ino;
}

/// `/dev/stdout` and its like, also where stdout has been sent to a file of that name.
bool is_standard_output(const struct stat& status) {
  struct stat standard {};
  return fstat(STDOUT_FILENO, &standard) == 0 && same_inode(status, standard) && !is_null_device(status);
}

/// The permissions of the file to be replaced, or those of any new file.
mode_t permissions_for(const fs::path& target) {
  constexpr mode_t all_of_them = 07777;
  if (const auto status = status_of(target))
    return status->st_mode & all_of_them;
  const mode_t mask = umask(0);
  umask(mask);
  return 0666 & ~mask;
}

fs::path folder_of(const fs::path& target) {
  return target.has_parent_path() ? target.parent_path() : fs::path(".");
}

/// A new file beside the target; `name` gets its path.
Descriptor create_beside(const fs::path& target, const std::string& path, std::string& name) {
  name = (folder_of(target) / ".lightledger-XXXXXX").string();
  Descriptor file(mkostemp(name.data(), O_CLOEXEC));
  if (!file.is_open()) {
    name.clear();
    throw_errno(path);
  }
  return file;
}

} // namespace

Output::Output(std::string path) : m_path(std::move(path)) {
  const std::optional<struct stat> status = m_path == "-" ? std::nullopt : status_of(m_path);
  if (m_path == "-" || (status && is_standard_output(*status))) {
    m_kind = Kind::standard_output;
    m_direct = Descriptor::standard_output();
  } else if (status && !S_ISREG(status->st_mode)) {
    open_device();
  } else {
    m_target = fs::weakly_canonical(m_path);
    probe_file();
  }
}

Output::~Output() {
  if (!m_temporary.empty())
    unlink(m_temporary.c_str());
}

void Output::open_device() {
  m_kind = Kind::device;
  m_target = m_path;
  m_direct = Descriptor(open(m_path.c_str(), O_WRONLY | O_NOCTTY | O_CLOEXEC));
  if (!m_direct.is_open())
    throw_errno(m_path);
}

void Output::probe_file() {
  if (!m_target.has_filename())
    throw std::system_error(EISDIR, std::generic_category(), m_path);
  if (status_of(m_target) && access(m_target.c_str(), W_OK) != 0)
    throw_errno(m_path);
  const Uninterrupted briefly;
  std::string probe;
  create_beside(m_target, m_path, probe);
  unlink(probe.c_str());
}

bool Output::same_place(const Output& other) const {
  if (is_stdout() || other.is_stdout())
    return is_stdout() && other.is_stdout();
  const auto mine = status_of(m_target);
  const auto theirs = status_of(other.m_target);
  if (mine && theirs)
    return same_inode(*mine, *theirs) && !is_null_device(*mine);
  return m_target == other.m_target;
}

bool Output::is_file(const fs::path& path) const {
  const auto mine = m_target.empty() ? std::nullopt : status_of(m_target);
  const auto other = status_of(path);
  return mine && other && same_inode(*mine, *other);
}

void Output::stage(std::string_view document) {
  if (m_kind != Kind::file) {
    m_direct.write(document, is_stdout() ? "standard output" : m_path);
    m_direct.close(m_path);
    return;
  }
  Descriptor file = create_beside(m_target, m_path, m_temporary);
  file.write(document, m_path);
  if (fchmod(file.number(), permissions_for(m_target)) != 0)
    throw_errno(m_path);
  file.close(m_path);
}

void Output::publish() {
  if (m_temporary.empty())
    return;
  if (std::rename(m_temporary.c_str(), m_target.c_str()) != 0)
    throw_errno(m_path);
  m_temporary.clear();
}

} // namespace lightledger::app
