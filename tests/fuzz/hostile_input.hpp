#pragma once

#include <string_view>

namespace lightledger::fuzz {

/// Takes arbitrary bytes the way of a user's files, from text to ledger, and throws std::logic_error where a
/// promise to the user is broken: a report or an assembly, never both; a report under 40 kB; layout that
/// gives a train or faults; a ledger of finite numbers that closes.
///
/// The bytes are an assembly file. Lines `# set ADDRESS=VALUE` at its beginning are also made changes of the
/// command line, and what follows a line `# curves.csv` is what a file of that name beside it holds.
void take(std::string_view bytes);

} // namespace lightledger::fuzz
