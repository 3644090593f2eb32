#pragma once

#include <cstdint>

namespace lightledger::trace {

/// Is told how far a long survey of rays has come. Work is counted in rays; what is expected may grow, where
/// more rays are needed for an accuracy.
class Progress {
public:
  Progress() = default;
  Progress(const Progress&) = delete;
  Progress& operator=(const Progress&) = delete;
  virtual ~Progress() = default;

  /// More work lies ahead. Called before it begins.
  virtual void expect(std::uint64_t rays) = 0;
  /// Some of it is done. Called by many threads at once.
  virtual void advance(std::uint64_t rays) = 0;
};

} // namespace lightledger::trace
