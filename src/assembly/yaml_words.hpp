#pragma once

#include <lightledger/assembly/diagnostics.hpp>

#include <string>
#include <string_view>

namespace lightledger::assembly {

/// A parser's complaint in words that help, at the place `mark` where it was noticed; `before` is what stands
/// before that place in the text, `after` the rest.
[[nodiscard]] Fault syntax_fault(std::string_view complaint, Mark mark, std::string_view before,
                                 std::string_view after);

} // namespace lightledger::assembly
