#pragma once

#include <lightledger/trace/entry.hpp>

#include <cstddef>
#include <vector>

namespace lightledger::trace {

/// The rows of all stations, and what was launched.
struct Ledger {
  double launched = 0.0;
  std::vector<Entry> rows;

  explicit Ledger(std::size_t stations = 0) : rows(stations) {}

  /// Enters what a step found on its way to and at a station; the leg's own losses go to the station before.
  void enter(std::size_t station, const Entry& found);

  [[nodiscard]] double delivered() const { return rows.empty() ? 0.0 : rows.back().onward; }
  /// launched − delivered − the losses of all stations as summed.
  [[nodiscard]] double closure_error() const;

  Ledger& operator+=(const Ledger& other);
  Ledger& operator*=(double factor);
};

} // namespace lightledger::trace
