#include "program.hpp"
#include "systems.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <sstream>

namespace lightledger::contract {
namespace {

using testing::HasSubstr;
using testing::Not;
using testing::StartsWith;

/// A wrong command line: exit code 2, the report on stderr, nothing on stdout.
std::string refusal(const Arguments& arguments) {
  const Outcome outcome = run(arguments);
  EXPECT_EQ(outcome.code, 2);
  EXPECT_EQ(outcome.out, "");
  EXPECT_THAT(outcome.err, HasSubstr("usage: lightledger "));
  return outcome.err;
}

std::string example_in(const std::string& help) {
  const std::string mark = "\nexample: ";
  const std::size_t start = help.find(mark);
  EXPECT_NE(start, std::string::npos) << help;
  return start == std::string::npos ? "false" : help.substr(start + mark.size());
}

class CommandHelp : public testing::TestWithParam<const char*> {};

TEST_P(CommandHelp, TellsUsageOptionsAndAnExampleThatRuns) {
  const Outcome help = run({GetParam(), "--help"});
  EXPECT_EQ(help.code, 0);
  EXPECT_EQ(help.err, "");
  EXPECT_THAT(help.out, HasSubstr(std::string("\nusage: lightledger ") + GetParam()));
  for (const char* option :
       {"--json", "--csv", "--rays", "--accuracy", "--threads", "--isa", "--db", "--set", "--quiet"})
    EXPECT_THAT(help.out, HasSubstr(std::string("\n  ") + option));
  const Outcome example = run_shell(example_in(help.out));
  EXPECT_EQ(example.code, 0) << example.err;
  EXPECT_NE(example.out, "");
}

INSTANTIATE_TEST_SUITE_P(All, CommandHelp, testing::Values("check", "budget", "coating", "media"),
                         [](const auto& each) { return std::string(each.param); });

TEST(Help, NamesEveryCommandAndExitCode) {
  const Outcome help = run({"--help"});
  EXPECT_EQ(help.code, 0);
  for (const char* command : {"check", "budget", "coating", "media"})
    EXPECT_THAT(help.out, HasSubstr(std::string("\n  ") + command));
  EXPECT_THAT(help.out, HasSubstr("Exit codes: 0 done; 1"));
  EXPECT_EQ(run_shell(example_in(help.out)).code, 0);
}

TEST(Help, FitsEightyColumnsButForExamples) {
  for (const Arguments& arguments : {Arguments{"--help"}, {"budget", "--help"}, {"coating", "--help"}}) {
    std::istringstream lines(run(arguments).out);
    for (std::string line; std::getline(lines, line);)
      EXPECT_LE(line.starts_with("example: ") ? 0U : line.size(), 80U) << line;
  }
}

TEST(Version, IsOneLine) {
  const Outcome outcome = run({"--version"});
  EXPECT_EQ(outcome.code, 0);
  EXPECT_THAT(outcome.out, testing::MatchesRegex("lightledger [0-9]+\\.[0-9]+\\.[0-9]+\n"));
}

TEST(Refusal, OfNoCommandAtAll) {
  EXPECT_THAT(refusal({}), HasSubstr("no command is given"));
}

TEST(Refusal, OfAnUnknownCommandSuggestsANearOne) {
  EXPECT_THAT(refusal({"budgt", minimal}), HasSubstr("there is no command 'budgt'"));
  EXPECT_THAT(refusal({"budgt", minimal}), HasSubstr("did you mean 'budget'?"));
}

TEST(Refusal, OfAnUnknownOptionSuggestsANearOne) {
  EXPECT_THAT(refusal({"budget", minimal, "--jsn", "x"}), HasSubstr("did you mean '--json'?"));
  EXPECT_THAT(refusal({"check", minimal, "--split", "field"}), HasSubstr("check has no option '--split'"));
}

TEST(Refusal, OfAMissingFileOrNameNamesIt) {
  EXPECT_THAT(refusal({"budget"}), HasSubstr("budget needs FILE"));
  EXPECT_THAT(refusal({"coating"}), HasSubstr("coating needs FILE and NAME"));
  EXPECT_THAT(refusal({"coating", minimal}), HasSubstr("coating needs NAME"));
}

TEST(Refusal, OfAnArgumentTooMany) {
  EXPECT_THAT(refusal({"budget", minimal, "more"}), HasSubstr("'more' is one argument too many"));
}

TEST(Refusal, OfAnOptionWithoutItsValueOrGivenTwice) {
  EXPECT_THAT(refusal({"budget", minimal, "--json"}), HasSubstr("--json needs a value"));
  EXPECT_THAT(refusal({"budget", minimal, "--rays", "16", "--rays", "32"}),
              HasSubstr("--rays is given 2 times"));
}

TEST(Refusal, OfNumbersThatMakeNoSense) {
  for (const char* rays : {"0", "-16", "1e3", "nan", "16.5", "4294967297", "many", "16x"})
    EXPECT_THAT(refusal({"budget", minimal, "--rays", rays}), HasSubstr("is no count of rays"));
  for (const char* accuracy : {"0", "-1e-4", "nan", "inf", "1e999", "fine"})
    EXPECT_THAT(refusal({"budget", minimal, "--accuracy", accuracy}), HasSubstr("is no standard error"));
  for (const char* threads : {"0", "-1", "1.5", "1000000"})
    EXPECT_THAT(refusal({"budget", minimal, "--threads", threads}), HasSubstr("is no count of threads"));
}

TEST(Refusal, OfRangesThatMakeNoSense) {
  for (const char* range :
       {"400:700", "400:700:0", "700:400:10", "400:700:-10", "a:b:c", "400:700:1e-9", "nan", ":"})
    EXPECT_THAT(refusal({"media", "fused-silica", "--wavelengths", range}),
                HasSubstr("is no range of numbers"));
}

TEST(Refusal, OfRaysAndAccuracyAtOnce) {
  EXPECT_THAT(refusal({"budget", minimal, "--rays", "16", "--accuracy", "1e-3"}),
              HasSubstr("exclude each other"));
}

TEST(Refusal, OfAnInstructionSetNamesWhatExists) {
  const std::string report = refusal({"budget", minimal, "--isa", "abacus"});
  EXPECT_THAT(report, HasSubstr("this machine has no instruction set 'abacus'"));
  EXPECT_THAT(report, HasSubstr("portable"));
}

TEST(Refusal, OfASetWithoutAValueOrAddress) {
  EXPECT_THAT(refusal({"budget", minimal, "--set", "diode"}), HasSubstr("names no value"));
  EXPECT_THAT(refusal({"budget", minimal, "--set", "=3"}), HasSubstr("names no value"));
}

TEST(Refusal, TellsAllFaultsAtOnce) {
  const std::string report = refusal({"budget", minimal, "--rays", "x", "--threads", "x", "--isa", "x"});
  EXPECT_THAT(report, HasSubstr("count of rays"));
  EXPECT_THAT(report, HasSubstr("count of threads"));
  EXPECT_THAT(report, HasSubstr("instruction set"));
  EXPECT_THAT(report, HasSubstr("3 faults; nothing was written"));
}

TEST(Refusal, ShowsNoControlCharactersOfTheCommandLine) {
  EXPECT_THAT(refusal({"bud\x1b[31mget"}), Not(HasSubstr("\x1b")));
}

TEST(Isa, AcceptsThePortableOne) {
  EXPECT_EQ(run({"budget", minimal, "--isa", "portable"}).code, 0);
}

TEST(Set, ChangesAValueOfTheFile) {
  const Json json = json_of({"budget", minimal, "--set", "light.wavelengths=[1064]"});
  EXPECT_EQ(json["budget"]["by_wavelength"][0]["wavelength_nm"], 1064.0);
}

TEST(Set, SplitsAtTheFirstEqualsSign) {
  const Json json = json_of({"budget", minimal, "--set", "title=a = b"});
  EXPECT_EQ(json["title"], "a = b");
}

TEST(Set, MayBeRepeated) {
  const Json json =
      json_of({"budget", minimal, "--set", "title=Other", "--set", "diode.clear={diameter: 4}"});
  EXPECT_EQ(json["title"], "Other");
  EXPECT_GT(json["budget"]["stations"][2]["clipped"].get<double>(), 0.5);
}

TEST(Set, OfAnUnknownKeyIsAFaultOfTheInput) {
  const Outcome outcome = run({"budget", minimal, "--set", "diode.diameter=4"});
  EXPECT_EQ(outcome.code, 2);
  EXPECT_EQ(outcome.out, "");
  EXPECT_THAT(outcome.err, StartsWith("--set  "));
}

} // namespace
} // namespace lightledger::contract
