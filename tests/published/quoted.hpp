#pragma once

#include <string>
#include <string_view>

namespace lightledger::published {

/// A number as a source prints it.
struct Quoted {
  double value = 0.0;
  double half_unit = 0.0; ///< half a unit in the last printed digit
  double scale = 1.0;     ///< printed unit per unit of ours: 100 for "%"
  int digits = 0;         ///< significant ones
};

/// Reads "-0.2", "1.5e-3", "14 %" or "56 deg 40'" (in degrees); throws std::invalid_argument on anything
/// else.
[[nodiscard]] Quoted quoted(std::string_view text);

} // namespace lightledger::published
