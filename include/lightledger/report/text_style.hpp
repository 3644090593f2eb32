#pragma once

namespace lightledger::report {

/// How text for a person is laid out.
struct TextStyle {
  int width = 80;        ///< columns of the terminal
  bool emphasis = false; ///< bold and colour for the verdict and the largest loss
  bool decibels = false; ///< fractions in dB
};

} // namespace lightledger::report
