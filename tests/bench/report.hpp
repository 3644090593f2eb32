#pragma once

#include "bench/whole.hpp"

#include <benchmark/benchmark.h>

#include <map>
#include <string>
#include <utility>
#include <vector>

namespace lightledger::bench {

/// Collects the speed of every repetition, in million interactions a second, by kind and by what did it.
class Speeds : public benchmark::BenchmarkReporter {
public:
  bool ReportContext(const Context&) override { return true; }
  void ReportRuns(const std::vector<Run>& runs) override;

  struct Spread {
    double median, least, most;
  };
  [[nodiscard]] bool has(const std::string& kind, const std::string& by) const;
  [[nodiscard]] Spread of(const std::string& kind, const std::string& by) const;
  /// Kinds and makers in the order in which they were timed.
  [[nodiscard]] const std::vector<std::pair<std::string, std::string>>& order() const { return m_order; }

private:
  std::map<std::pair<std::string, std::string>, std::vector<double>> m_found;
  std::vector<std::pair<std::string, std::string>> m_order;
};

void print(const Speeds& speeds, const Whole& whole);
void write_json(const Speeds& speeds, const Whole& whole, const std::string& path);

} // namespace lightledger::bench
