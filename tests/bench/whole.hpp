#pragma once

#include <string>
#include <vector>

namespace lightledger::bench {

struct Figure {
  std::string what;
  double value;
  std::string unit;
};

/// What is measured on whole traces and on the program as a process: scaling on two threads, exponents of the
/// cost, the building of plans, start-up, peak memory.
using Whole = std::vector<Figure>;

[[nodiscard]] Whole measure_whole(const std::string& own_path);

} // namespace lightledger::bench
