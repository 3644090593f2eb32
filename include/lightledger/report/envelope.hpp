#pragma once

#include <optional>
#include <string>
#include <vector>

namespace lightledger::report {

/// What every JSON document says about itself, beside the result (contract §5).
struct Envelope {
  std::string version;
  std::string command;
  std::optional<std::string> title; ///< none where no assembly was read
  std::vector<std::string> warnings;
};

} // namespace lightledger::report
