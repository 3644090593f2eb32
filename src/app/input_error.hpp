#pragma once

#include <stdexcept>

namespace lightledger::app {

/// The input or the command line is wrong; the message is the whole report for stderr, with its line breaks.
class InputError : public std::runtime_error {
public:
  using std::runtime_error::runtime_error;
};

} // namespace lightledger::app
