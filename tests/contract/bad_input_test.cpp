#include "program.hpp"
#include "systems.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <chrono>

namespace lightledger::contract {
namespace {

using namespace std::string_literals;
using testing::HasSubstr;

/// Has a file of this text refused, and returns the report.
std::string refusal_of(const std::string& text) {
  const Scratch scratch;
  const std::string file = scratch.file("bad.yaml", text);
  const Outcome outcome = run({"budget", file, "--json", scratch.path("a.json")});
  EXPECT_EQ(outcome.code, 2);
  EXPECT_EQ(outcome.out, "");
  EXPECT_EQ(scratch.names(), std::vector<std::string>{"bad.yaml"});
  EXPECT_THAT(outcome.err, HasSubstr("bad.yaml"));
  EXPECT_LT(outcome.err.size(), 40000U);
  return outcome.err;
}

TEST(BadInput, ThatIsEmptyIsRefused) {
  EXPECT_NE(refusal_of(""), "");
  EXPECT_NE(refusal_of("\n  \n# nothing\n"), "");
}

TEST(BadInput, ThatIsBinaryIsRefused) {
  EXPECT_NE(refusal_of("\x7f\x45LF\x02\x01\0\0\0\xff\xfe"s), "");
}

TEST(BadInput, ThatIsNoYamlIsRefused) {
  EXPECT_NE(refusal_of("title: [1, 2\nlight: }"), "");
}

TEST(BadInput, ThatIsNestedBeyondSenseIsRefused) {
  EXPECT_NE(refusal_of(std::string(100000, '[')), "");
  EXPECT_NE(refusal_of(std::string(100000, '{')), "");
}

TEST(BadInput, OfWrongTypesIsRefused) {
  EXPECT_NE(refusal_of("title: {}\nlight: 3\ntrain: yes\n"), "");
}

TEST(BadInput, ThatGrowsByAliasesIsRefused) {
  std::string text = "a0: &a0 [x, x, x, x, x, x, x, x, x, x]\n";
  for (int i = 1; i < 12; ++i) {
    const std::string inner = "*a" + std::to_string(i - 1);
    text += "a" + std::to_string(i) + ": &a" + std::to_string(i) + " [" + inner;
    for (int k = 0; k < 9; ++k)
      text += ", " + inner;
    text += "]\n";
  }
  EXPECT_NE(refusal_of(text), "");
}

TEST(BadInput, OfManyFaultsTellsTheFirstTwentyAndTheirNumberInTime) {
  std::string text = "title: many\nlight: {wavelengths: [532], beam: {radius: 1}}\ntrain:\n";
  for (int i = 0; i < 100000; ++i)
    text += "  - {name: n" + std::to_string(i) + ", into: nowhere, gap: 1}\n";
  const auto start = std::chrono::steady_clock::now();
  const std::string report = refusal_of(text);
  const std::chrono::duration<double> elapsed = std::chrono::steady_clock::now() - start;
  EXPECT_THAT(report, HasSubstr("the first 20 of 10000"));
  // About a second on an idle machine; the bound tells a hang from a machine that is shared or sanitized.
  EXPECT_LT(elapsed.count(), LIGHTLEDGER_SANITIZED ? 120.0 : 20.0);
}

TEST(BadInput, ThatIsAFolderOrMissingIsRefused) {
  for (const char* file : {"systems", "systems/none.yaml"}) {
    const Outcome outcome = run({"budget", file});
    EXPECT_EQ(outcome.code, 2);
    EXPECT_EQ(outcome.out, "");
    EXPECT_THAT(outcome.err, HasSubstr(file));
  }
}

} // namespace
} // namespace lightledger::contract
