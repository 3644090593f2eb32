#include "read_file.hpp"

#include <array>
#include <fstream>
#include <system_error>

namespace lightledger::assembly {

std::variant<std::string, Unreadable> read_file(const std::filesystem::path& path, std::size_t largest) {
  std::error_code error;
  const auto status = std::filesystem::status(path, error);
  if (status.type() == std::filesystem::file_type::not_found)
    return Unreadable::missing;
  if (std::filesystem::is_directory(status))
    return Unreadable::folder;
  std::ifstream stream(path, std::ios::binary);
  std::string text;
  std::array<char, 1U << 16U> piece;
  while (stream && text.size() <= largest) {
    stream.read(piece.data(), piece.size());
    text.append(piece.data(), static_cast<std::size_t>(stream.gcount()));
  }
  if (text.size() > largest)
    return Unreadable::too_large;
  if (!stream.eof())
    return Unreadable::refused;
  return text;
}

} // namespace lightledger::assembly
