#pragma once

#include <string>
#include <vector>

namespace lightledger::report {

struct Interval {
  double from, to;
  [[nodiscard]] double length() const { return to - from; }
};

struct Tick {
  double value;
  std::string label; ///< empty for one between two that are named
};

/// The interval as given where it can carry an axis; else one of some length about it.
[[nodiscard]] Interval drawable(Interval interval);

/// Round values (1, 2 or 5 times a power of ten apart) within the interval, about as many as wished for.
[[nodiscard]] std::vector<Tick> linear_ticks(Interval interval, int about);

/// Powers of ten within an interval of positive values, each `1`, `10`, `1e-06`-like in words as a user would
/// type them, with unnamed ticks at their multiples where there are few decades.
[[nodiscard]] std::vector<Tick> decade_ticks(Interval interval, int most);

} // namespace lightledger::report
