#pragma once

#include <optional>
#include <string>
#include <string_view>

namespace lightledger::assembly {

/// What a bare number stands for at a place of the file, and so which units are accepted there (contract §1).
enum class Unit { millimetres, nanometres, degrees, fraction, none };

/// Reads a scalar's text, a bare number or one with a unit; may be infinite or NaN. `is_text` tells a quoted
/// scalar, which needs a unit.
[[nodiscard]] std::optional<double> read_quantity(std::string_view text, bool is_text, Unit unit);

/// Why a text is no quantity, as a predicate ("is 'x', not a number"), and what was probably meant.
struct Complaint {
  std::string message;
  std::string suggestion;
};
[[nodiscard]] Complaint explain_quantity(std::string_view text, bool is_text, Unit unit);

/// What is accepted where this unit holds: "a length: a number in mm, or one with a unit (nm um mm cm m in)".
[[nodiscard]] std::string accepted_quantity(Unit unit);

} // namespace lightledger::assembly
