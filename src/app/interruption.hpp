#pragma once

namespace lightledger::app {

/// From here on, a signal that asks the program to end (Ctrl-C, a closed terminal, `kill`) ends it with exit
/// code 3 and a line on stderr that says what was written.
void watch_for_interruption();

/// While it lives, such a signal waits: files are put into place together, and nothing half done stays
/// behind.
class Uninterrupted {
public:
  Uninterrupted();
  ~Uninterrupted();
  Uninterrupted(const Uninterrupted&) = delete;
  Uninterrupted& operator=(const Uninterrupted&) = delete;
};

/// What an interruption has to tell from now on: the files are in their places.
void files_are_written();

/// Whether a line on the terminal is to be cleared before anything else is said there.
void line_is_drawn(bool drawn);

} // namespace lightledger::app
