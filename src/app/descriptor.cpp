#include "descriptor.hpp"

#include <unistd.h>

#include <algorithm>
#include <cerrno>
#include <system_error>

namespace lightledger::app {

Descriptor::~Descriptor() {
  if (m_owned && is_open())
    ::close(m_number);
}

Descriptor Descriptor::standard_output() {
  Descriptor descriptor;
  descriptor.m_number = STDOUT_FILENO;
  return descriptor;
}

void Descriptor::write(std::string_view bytes, const std::string& name) const {
  while (!bytes.empty()) {
    const ssize_t written = ::write(m_number, bytes.data(), bytes.size());
    if (written < 0 && errno != EINTR)
      throw_errno(name);
    bytes.remove_prefix(static_cast<std::size_t>(std::max<ssize_t>(written, 0)));
  }
}

void Descriptor::close(const std::string& name) {
  if (!m_owned || !is_open())
    return;
  const int status = ::close(std::exchange(m_number, -1));
  if (status != 0)
    throw_errno(name);
}

void throw_errno(const std::string& name) {
  throw std::system_error(errno, std::generic_category(), name);
}

} // namespace lightledger::app
