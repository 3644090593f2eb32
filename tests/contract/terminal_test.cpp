#include "program.hpp"
#include "systems.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <algorithm>
#include <sstream>

namespace lightledger::contract {
namespace {

using testing::HasSubstr;
using testing::Not;

std::size_t widest_line(const std::string& text) {
  std::istringstream lines(text);
  std::size_t widest = 0;
  for (std::string line; std::getline(lines, line);)
    widest = std::max(widest, line.size());
  return widest;
}

TEST(Text, FitsEightyColumnsInAPipe) {
  for (const Arguments& arguments : {Arguments{"budget", lidar},
                                     {"budget", lidar, "--db", "--split", "field"},
                                     {"check", lidar},
                                     {"coating", lidar, "lens_ar"},
                                     {"media", "fused-silica"}})
    EXPECT_LE(widest_line(run(arguments).out), 80U) << arguments.front();
}

TEST(Text, HasNoEscapesInAPipe) {
  EXPECT_THAT(run({"budget", lidar}).out, Not(HasSubstr("\x1b")));
}

TEST(Text, EmphasisesTheLargestLossOnATerminal) {
  const std::string text = run_on_terminal({"budget", lidar}, 80).out;
  EXPECT_THAT(text, HasSubstr("\x1b[1;31m"));
  EXPECT_EQ(std::ranges::count(text, '\x1b'), 4);
}

TEST(Text, HasNoEscapesWithNoColor) {
  EXPECT_THAT(run_on_terminal({"budget", lidar}, 80, {{"NO_COLOR", "1"}}).out, Not(HasSubstr("\x1b")));
}

TEST(Text, HasEscapesWithAnEmptyNoColor) {
  EXPECT_THAT(run_on_terminal({"budget", lidar}, 80, {{"NO_COLOR", ""}}).out, HasSubstr("\x1b"));
}

TEST(Text, HasNoEscapesOnADumbTerminal) {
  EXPECT_THAT(run_on_terminal({"budget", lidar}, 80, {{"TERM", "dumb"}}).out, Not(HasSubstr("\x1b")));
}

TEST(Text, ShowsMoreOnAWideTerminal) {
  EXPECT_THAT(run_on_terminal({"coating", lidar, "lens_ar"}, 80).out, Not(HasSubstr("rs deg")));
  EXPECT_THAT(run_on_terminal({"coating", lidar, "lens_ar"}, 140).out, HasSubstr("rs deg"));
}

TEST(Text, KeepsEightyColumnsOnANarrowTerminal) {
  EXPECT_EQ(widest_line(run_on_terminal({"budget", lidar}, 20, {{"NO_COLOR", "1"}}).out),
            widest_line(run({"budget", lidar}).out));
}

TEST(Json, HasNoEscapesOnATerminal) {
  EXPECT_THAT(run_on_terminal({"budget", minimal, "--json", "-"}, 80).out, Not(HasSubstr("\x1b")));
}

} // namespace
} // namespace lightledger::contract
