#include "program.hpp"
#include "systems.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <string>

namespace lightledger::contract {
namespace {

using testing::HasSubstr;
using testing::IsEmpty;

/// Enough work for the longest patience.
const std::string endless = std::string("budget '") + minimal + "' --rays 4000000000";

/// Runs the program for a while, then sends it a signal.
Outcome interrupted(const std::string& signal, const std::string& arguments) {
  return run_shell("timeout --preserve-status -s " + signal + " 0.4 '" LIGHTLEDGER_PROGRAM "' " + arguments);
}

TEST(Interruption, LeavesNoFileAndSaysSo) {
  for (const char* signal : {"INT", "TERM", "HUP"}) {
    const Scratch scratch;
    const Outcome outcome = interrupted(signal, endless + " --json " + scratch.path("a.json") + " --csv " +
                                                    scratch.path("a.csv"));
    EXPECT_EQ(outcome.code, 3) << signal;
    EXPECT_EQ(outcome.out, "");
    EXPECT_EQ(outcome.err, "lightledger  interrupted; no file was written\n");
    EXPECT_THAT(scratch.names(), IsEmpty());
  }
}

TEST(Interruption, LeavesTheFileThatWasThere) {
  const Scratch scratch;
  const std::string old = scratch.file("a.json", "old");
  EXPECT_EQ(interrupted("INT", endless + " --json " + old).code, 3);
  EXPECT_EQ(content(old), "old");
}

TEST(Interruption, IsOfNoMatterToWhomIsToldToIgnoreIt) {
  const Outcome outcome = run_shell(std::string("trap '' HUP; lightledger budget ") + minimal +
                                    " --rays 10000000 --quiet & sleep 0.1; kill -HUP $!; wait $!");
  EXPECT_EQ(outcome.code, 0) << outcome.err;
}

/// Enough work for more than a second.
const Arguments long_work{"budget", minimal, "--rays", "200000000", "--threads", "1"};

TEST(Progress, IsSilentInPipes) {
  EXPECT_EQ(run(long_work).err, "");
}

TEST(Progress, IsShownOnATerminalAndCleared) {
  const std::string seen = run_on_terminal(long_work, 80).out;
  EXPECT_THAT(seen, HasSubstr("\x1b[Ktracing  ="));
  EXPECT_THAT(seen, HasSubstr(" s left\x1b[KRain window"));
}

} // namespace
} // namespace lightledger::contract
