#pragma once

#include <lightledger/assembly/assembly.hpp>

namespace lightledger::report {

/// The word of the file and of the JSON.
[[nodiscard]] inline const char* sense_key(assembly::Sense sense) {
  return sense == assembly::Sense::at_least ? "at_least" : "at_most";
}

} // namespace lightledger::report
