#pragma once

#include <lightledger/analysis/drawing.hpp>

#include <string_view>

namespace lightledger::report {

/// `x`, `y` or `z`.
[[nodiscard]] const char* name_of(analysis::View view);

/// `seen along x: z to the right, y up`, in small letters.
[[nodiscard]] std::string_view describe_view(analysis::View view);

/// `arrived`, `clipped`, `missed`, `turned_back`.
[[nodiscard]] const char* name_of(analysis::RayEnd end);

} // namespace lightledger::report
