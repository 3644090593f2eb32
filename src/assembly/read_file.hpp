#pragma once

#include <cstddef>
#include <filesystem>
#include <string>
#include <variant>

namespace lightledger::assembly {

enum class Unreadable { missing, folder, too_large, refused };

/// The bytes of a file of at most `largest` bytes, or why they cannot be had.
[[nodiscard]] std::variant<std::string, Unreadable> read_file(const std::filesystem::path& path,
                                                              std::size_t largest);

} // namespace lightledger::assembly
