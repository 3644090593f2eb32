#include "terminal.hpp"

#include <fcntl.h>
#include <sys/ioctl.h>
#include <unistd.h>

#include <algorithm>
#include <csignal>
#include <cstdlib>
#include <string_view>

namespace lightledger::app {
namespace {

bool is_set(const char* variable) {
  const char* value = std::getenv(variable); // NOLINT(concurrency-mt-unsafe): read before any thread starts
  return value && *value != '\0';
}

bool is_dumb_terminal() {
  const char* kind = std::getenv("TERM"); // NOLINT(concurrency-mt-unsafe): read before any thread starts
  return kind && std::string_view(kind) == "dumb";
}

} // namespace

report::TextStyle style_of_stdout() {
  report::TextStyle style;
  if (isatty(STDOUT_FILENO) == 0)
    return style;
  winsize size{};
  if (ioctl(STDOUT_FILENO, TIOCGWINSZ, &size) == 0)
    style.width = std::max<int>(style.width, size.ws_col);
  style.emphasis = !is_set("NO_COLOR") && !is_dumb_terminal();
  return style;
}

void make_writing_safe() {
  std::signal(SIGPIPE, SIG_IGN); // NOLINT(cert-err33-c): cannot fail for these
  std::signal(SIGXFSZ, SIG_IGN); // NOLINT(cert-err33-c)
  // A closed stream would give its number to the next file opened; opened for reading it fails on writing.
  for (const int stream : {STDIN_FILENO, STDOUT_FILENO, STDERR_FILENO})
    if (fcntl(stream, F_GETFD) == -1 && open("/dev/null", O_RDONLY) != stream)
      std::abort();
}

} // namespace lightledger::app
