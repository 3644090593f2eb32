#pragma once

#include <lightledger/trace/progress.hpp>

#include <atomic>
#include <chrono>
#include <mutex>
#include <optional>
#include <string>

namespace lightledger::app {

/// One line of progress: a bar, the share done, and the time that is left at the pace so far. `seconds` have
/// passed since the work began; a share of 0 has no time left to tell.
[[nodiscard]] std::string progress_line(double share, double seconds);

/// Draws such a line on stderr while work goes on for more than a second, and clears it at the end. Draws
/// nothing where stderr is not a terminal.
class ProgressBar final : public trace::Progress {
public:
  explicit ProgressBar(bool wanted);
  ~ProgressBar() override;

  void expect(std::uint64_t rays) override;
  void advance(std::uint64_t rays) override;

private:
  using Clock = std::chrono::steady_clock;
  void draw(Clock::time_point now);

  bool m_on_terminal;
  Clock::time_point m_start = Clock::now();
  std::atomic<std::uint64_t> m_expected = 0, m_done = 0;
  std::mutex m_drawing;
  std::optional<Clock::time_point> m_drawn; ///< when last
};

} // namespace lightledger::app
