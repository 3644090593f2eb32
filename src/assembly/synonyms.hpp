#pragma once

#include <string>
#include <string_view>
#include <vector>

namespace lightledger::assembly {

/// The accepted key or word that someone meant who used another term of the field ("thickness" for `gap`), or
/// empty.
[[nodiscard]] std::string synonym(std::string_view word, const std::vector<std::string_view>& accepted);

} // namespace lightledger::assembly
