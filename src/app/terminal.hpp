#pragma once

#include <lightledger/report/text_style.hpp>

namespace lightledger::app {

/// The layout for text on stdout: as wide as the terminal, 80 columns at least and elsewhere; emphasis only
/// on a terminal whose user has not set NO_COLOR.
[[nodiscard]] report::TextStyle style_of_stdout();

/// Makes writing fail with an error code where it would end the program or hit a file by chance: a reader
/// that went away, a limit on file sizes, and standard streams that are closed.
void make_writing_safe();

} // namespace lightledger::app
