#pragma once

#include <string>
#include <string_view>
#include <utility>

namespace lightledger::app {

/// An open file, closed at the end unless it is borrowed. Errors of the system are std::system_error.
class Descriptor {
public:
  Descriptor() = default;
  /// A file opened here.
  explicit Descriptor(int number) : m_number(number), m_owned(true) {}
  ~Descriptor();
  Descriptor(Descriptor&& other) noexcept { swap(other); }
  Descriptor& operator=(Descriptor&& other) noexcept {
    swap(other);
    return *this;
  }
  Descriptor(const Descriptor&) = delete;
  Descriptor& operator=(const Descriptor&) = delete;

  [[nodiscard]] static Descriptor standard_output();

  [[nodiscard]] bool is_open() const { return m_number >= 0; }
  [[nodiscard]] int number() const { return m_number; }

  /// Writes all of it; `name` is for the message of an error.
  void write(std::string_view bytes, const std::string& name) const;
  /// Closes an owned file and reports what the system held back until now.
  void close(const std::string& name);

private:
  void swap(Descriptor& other) noexcept {
    std::swap(m_number, other.m_number);
    std::swap(m_owned, other.m_owned);
  }

  int m_number = -1;
  bool m_owned = false;
};

/// Throws the current errno as std::system_error about a file.
[[noreturn]] void throw_errno(const std::string& name);

} // namespace lightledger::app
