#include "progress_bar.hpp"

#include "interruption.hpp"

#include <fmt/format.h>
#include <unistd.h>

#include <algorithm>
#include <cmath>
#include <cstdio>
#include <string>

namespace lightledger::app {
namespace {

using namespace std::chrono_literals;

constexpr auto patience = 1s; ///< before anything is drawn
constexpr auto pause = 100ms; ///< between two drawings
constexpr int bar_width = 30;

std::string time_left(double seconds) {
  const auto whole = static_cast<long long>(std::ceil(seconds));
  if (whole < 60)
    return fmt::format("{} s left", whole);
  if (whole < 3600)
    return fmt::format("{} min {:02} s left", whole / 60, whole % 60);
  return fmt::format("{} h {:02} min left", whole / 3600, whole % 3600 / 60);
}

} // namespace

std::string progress_line(double share, double seconds) {
  constexpr double most = 1e6; // seconds: nobody waits longer
  const double done = std::clamp(share, 0.0, 1.0);
  const auto filled = static_cast<std::size_t>(std::floor(done * bar_width));
  std::string line = "tracing  " + std::string(filled, '=') + std::string(bar_width - filled, '.') +
                     fmt::format("  {:3.0f} %", std::floor(100.0 * done));
  const double left = done > 0.0 ? seconds * (1.0 - done) / done : most;
  return left < most ? line + "  " + time_left(left) : line;
}

ProgressBar::ProgressBar(bool wanted) : m_on_terminal(wanted && isatty(STDERR_FILENO) != 0) {}

ProgressBar::~ProgressBar() {
  if (!m_drawn)
    return;
  std::fputs("\r\x1b[K", stderr);
  line_is_drawn(false);
}

void ProgressBar::expect(std::uint64_t rays) {
  m_expected += rays;
}

void ProgressBar::advance(std::uint64_t rays) {
  m_done += rays;
  if (!m_on_terminal)
    return;
  const Clock::time_point now = Clock::now();
  const std::unique_lock drawing(m_drawing, std::try_to_lock);
  if (drawing && now - m_start >= patience && (!m_drawn || now - *m_drawn >= pause))
    draw(now);
}

void ProgressBar::draw(Clock::time_point now) {
  const double share =
      static_cast<double>(m_done) / static_cast<double>(std::max<std::uint64_t>(m_expected, 1));
  const std::chrono::duration<double> elapsed = now - m_start;
  line_is_drawn(true);
  std::fputs(("\r\x1b[K" + progress_line(share, elapsed.count())).c_str(), stderr);
  m_drawn = now;
}

} // namespace lightledger::app
