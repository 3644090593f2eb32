#pragma once

#include <cstddef>
#include <string>

namespace lightledger::report {

inline constexpr std::size_t series_kinds = 8;

/// The style sheet of charts: each rule holds below `.chart` only, so that a page may hold several. Series
/// are
/// `.series0` … `.series7`.
[[nodiscard]] std::string chart_style();

} // namespace lightledger::report
