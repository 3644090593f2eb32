#pragma once

#include <cstddef>
#include <optional>
#include <string_view>

namespace lightledger::assembly {

/// Length of the decimal number that the text begins with, as the YAML 1.2 core schema writes one
/// (`[-+]? (\. [0-9]+ | [0-9]+ (\. [0-9]*)?) ([eE] [-+]? [0-9]+)?`, §10.3.2); 0 where there is none.
[[nodiscard]] std::size_t decimal_length(std::string_view text);

/// The value of a plain scalar that the core schema reads as a number: decimal, 0o17, 0x1F, .inf, .nan.
/// What is too large comes back infinite, what is too small 0.
[[nodiscard]] std::optional<double> core_number(std::string_view text);

/// Whether the core schema reads a plain scalar as true or false.
[[nodiscard]] bool core_boolean(std::string_view text);

} // namespace lightledger::assembly
