#include "interruption.hpp"

#include <unistd.h>

#include <csignal>
#include <string_view>

namespace lightledger::app {
namespace {

constexpr int anything_else = 3;

// What a signal handler may look at.
volatile std::sig_atomic_t busy = 0;
volatile std::sig_atomic_t asked = 0;
volatile std::sig_atomic_t files_written = 0;
volatile std::sig_atomic_t line_drawn = 0;

void say(std::string_view words) {
  [[maybe_unused]] const ssize_t written = ::write(STDERR_FILENO, words.data(), words.size());
}

[[noreturn]] void leave() {
  if (line_drawn != 0)
    say("\r\x1b[K");
  say(files_written != 0 ? "lightledger  interrupted; the files are written, other output is not complete\n"
                         : "lightledger  interrupted; no file was written\n");
  _exit(anything_else);
}

extern "C" void asked_to_end(int /*signal*/) {
  if (busy != 0)
    asked = 1;
  else
    leave();
}

} // namespace

void watch_for_interruption() {
  struct sigaction action {};
  action.sa_handler = asked_to_end;
  action.sa_flags = SA_RESTART;
  for (const int signal : {SIGINT, SIGTERM, SIGHUP}) {
    struct sigaction before {};
    // What the caller has chosen to ignore, as `nohup` does, stays ignored.
    if (sigaction(signal, nullptr, &before) == 0 && before.sa_handler != SIG_IGN)
      sigaction(signal, &action, nullptr);
  }
}

Uninterrupted::Uninterrupted() {
  busy = busy + 1;
}

Uninterrupted::~Uninterrupted() {
  busy = busy - 1;
  if (busy == 0 && asked != 0)
    leave();
}

void files_are_written() {
  files_written = 1;
}

void line_is_drawn(bool drawn) {
  line_drawn = drawn ? 1 : 0;
}

} // namespace lightledger::app
