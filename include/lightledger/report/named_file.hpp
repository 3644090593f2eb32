#pragma once

#include <string>

namespace lightledger::report {

/// A document to be written into a folder.
struct NamedFile {
  std::string name;
  std::string bytes;
};

} // namespace lightledger::report
