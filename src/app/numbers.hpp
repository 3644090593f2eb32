#pragma once

#include <cstdint>
#include <optional>
#include <string_view>
#include <vector>

/// Numbers as they are typed on the command line: the whole word must be one.
namespace lightledger::app {

/// A whole number from `least` to `most`.
[[nodiscard]] std::optional<std::uint64_t> whole_number(std::string_view word, std::uint64_t least,
                                                        std::uint64_t most);

/// A finite number.
[[nodiscard]] std::optional<double> finite_number(std::string_view word);

/// `START:STOP:STEP`, with STOP included when a step hits it to rounding, or one number. STEP is above zero,
/// STOP not below START, and there are at most `most` values.
[[nodiscard]] std::optional<std::vector<double>> steps(std::string_view word, std::size_t most);

} // namespace lightledger::app
