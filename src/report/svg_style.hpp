#pragma once

#include <cstddef>
#include <string>

/// Style sheets of the pictures. Each rule holds below `.chart` or `.drawing` only, so that a page may hold
/// several; dark ones hold on a screen whose reader wants it dark.
namespace lightledger::report {

/// Lines that are told apart by colour and dashes: `.series0` … `.series7` in charts, `.field0` … in
/// drawings.
inline constexpr std::size_t line_kinds = 8;

[[nodiscard]] std::string chart_style();
[[nodiscard]] std::string drawing_style();

} // namespace lightledger::report
