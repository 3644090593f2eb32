#include "program.hpp"
#include "systems.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>
#include <sys/stat.h>

#include <filesystem>

namespace lightledger::contract {
namespace {

using testing::ElementsAre;
using testing::HasSubstr;
using testing::IsEmpty;
using testing::StartsWith;

const std::string budget = std::string("lightledger budget ") + minimal + " ";

TEST(Outputs, WriteJsonAndCsvBesideTheText) {
  const Scratch scratch;
  const Outcome outcome =
      run({"budget", minimal, "--json", scratch.path("a.json"), "--csv", scratch.path("a.csv")});
  EXPECT_EQ(outcome.code, 0) << outcome.err;
  EXPECT_THAT(outcome.out, HasSubstr("delivered"));
  EXPECT_EQ(Json::parse(content(scratch.path("a.json")))["command"], "budget");
  EXPECT_THAT(content(scratch.path("a.csv")), StartsWith("station,name,does,incident,"));
  EXPECT_THAT(scratch.names(), ElementsAre("a.csv", "a.json"));
}

TEST(Outputs, ReplaceAFileAndKeepItsPermissions) {
  const Scratch scratch;
  const std::string target = scratch.file("old.json", std::string(100000, 'x'));
  ASSERT_EQ(chmod(target.c_str(), 0640), 0);
  EXPECT_EQ(run({"budget", minimal, "--json", target}).code, 0);
  EXPECT_EQ(Json::parse(content(target))["contract"], 1);
  EXPECT_EQ(std::filesystem::status(target).permissions(), std::filesystem::perms{0640});
}

TEST(Outputs, FollowALinkToTheFile) {
  const Scratch scratch;
  const std::string target = scratch.file("real.json", "old");
  std::filesystem::create_symlink(target, scratch.path("link.json"));
  EXPECT_EQ(run({"budget", minimal, "--json", scratch.path("link.json")}).code, 0);
  EXPECT_TRUE(std::filesystem::is_symlink(scratch.path("link.json")));
  EXPECT_EQ(Json::parse(content(target))["contract"], 1);
}

TEST(Outputs, OnStdoutStandAlone) {
  const Outcome json = run({"budget", minimal, "--json", "-"});
  EXPECT_EQ(Json::parse(json.out)["command"], "budget");
  EXPECT_EQ(json.err, "");
  EXPECT_THAT(run({"budget", minimal, "--csv", "-"}).out, StartsWith("station,name,"));
}

TEST(Outputs, OnStdoutByItsDeviceStandAloneToo) {
  EXPECT_EQ(Json::parse(run_shell(budget + "--json /dev/stdout").out)["command"], "budget");
  EXPECT_EQ(Json::parse(run_shell(budget + "--json /dev/stdout | cat").out)["command"], "budget");
}

TEST(Outputs, GoIntoDevicesAndPipesDirectly) {
  EXPECT_EQ(run_shell(budget + "--quiet --json /dev/null --csv /dev/null").code, 0);
  const Outcome pipe = run_shell(budget + "--quiet --json >(cat) | cat");
  EXPECT_EQ(Json::parse(pipe.out)["command"], "budget");
}

TEST(Outputs, AreQuietOnRequest) {
  const Outcome outcome = run({"budget", minimal, "--quiet"});
  EXPECT_EQ(outcome.code, 0);
  EXPECT_EQ(outcome.out, "");
  EXPECT_EQ(outcome.err, "");
}

TEST(Outputs, LeaveNothingBehindWhenTheInputIsWrong) {
  const Scratch scratch;
  const std::string bad = scratch.file("bad.yaml", "light: {wavelengths: [532]}\ntrane: []\n");
  const Outcome outcome =
      run({"budget", bad, "--json", scratch.path("a.json"), "--csv", scratch.path("a.csv")});
  EXPECT_EQ(outcome.code, 2);
  EXPECT_EQ(outcome.out, "");
  EXPECT_THAT(scratch.names(), ElementsAre("bad.yaml"));
}

TEST(Outputs, LeaveTheOldFileWhenTheAnalysisFindsAFault) {
  const Scratch scratch;
  const std::string old = scratch.file("a.json", "old");
  const Outcome outcome = run({"budget", minimal, "--json", old, "--set", "window rear.gap=focus"});
  EXPECT_EQ(outcome.code, 2) << outcome.err;
  EXPECT_EQ(content(old), "old");
  EXPECT_THAT(scratch.names(), ElementsAre("a.json"));
}

TEST(Outputs, ThatCannotBeOpenedAreFaultsOfTheCommandLine) {
  const Scratch scratch;
  for (const std::string& path :
       {scratch.path("none/a.json"), scratch.path(""), std::string("/proc/version/x")}) {
    const Outcome outcome = run({"budget", minimal, "--json", path});
    EXPECT_EQ(outcome.code, 2) << path;
    EXPECT_EQ(outcome.out, "");
    EXPECT_THAT(outcome.err, HasSubstr("cannot be opened for writing"));
  }
  EXPECT_THAT(scratch.names(), IsEmpty());
}

TEST(Outputs, TwiceToTheSamePlaceAreAFault) {
  const Scratch scratch;
  const std::string file = scratch.file("a", "old");
  std::filesystem::create_hard_link(file, scratch.path("b"));
  for (const auto& [json, csv] :
       {std::pair<std::string, std::string>{"-", "-"},
        {"-", "/dev/stdout"},
        {file, scratch.path("./a")},
        {file, scratch.path("b")},
        {scratch.path("new"),
         scratch.path("../" + std::filesystem::path(scratch.path("")).parent_path().filename().string() +
                      "/new")}}) {
    const Outcome outcome = run({"budget", minimal, "--json", json, "--csv", csv});
    EXPECT_EQ(outcome.code, 2) << json << ' ' << csv;
    EXPECT_THAT(outcome.err, HasSubstr("--json and --csv go to the same place"));
  }
  EXPECT_EQ(content(file), "old");
}

TEST(Outputs, NeverReplaceTheInput) {
  const Scratch scratch;
  const std::string file = scratch.file("a.yaml", content(project(minimal)));
  const Outcome outcome = run({"budget", file, "--csv", file});
  EXPECT_EQ(outcome.code, 2);
  EXPECT_THAT(outcome.err, HasSubstr("is the input file"));
  EXPECT_EQ(content(file), content(project(minimal)));
}

TEST(Outputs, OnAFullDiskFailWithAMessage) {
  const Outcome device = run_shell(budget + "--json /dev/full");
  EXPECT_EQ(device.code, 3);
  EXPECT_THAT(device.err, HasSubstr("/dev/full: No space left on device"));
  const Outcome text = run_shell(budget + "> /dev/full");
  EXPECT_EQ(text.code, 3);
  EXPECT_THAT(text.err, HasSubstr("standard output: No space left on device"));
}

TEST(Outputs, BeyondALimitOnFileSizeLeaveTheOldFile) {
  const Scratch scratch;
  const std::string old = scratch.file("a.json", "old");
  const Outcome outcome = run_shell("ulimit -f 1; " + budget + "--quiet --json " + old);
  EXPECT_EQ(outcome.code, 3) << outcome.err;
  EXPECT_EQ(content(old), "old");
  EXPECT_THAT(scratch.names(), ElementsAre("a.json"));
}

TEST(Outputs, SurviveAReaderThatLeaves) {
  const Outcome outcome = run_shell("{ " + budget + "; echo $? >&2; } | true");
  EXPECT_THAT(outcome.err, testing::AnyOf("0\n", "3\n"));
}

TEST(Outputs, SurviveAClosedStdout) {
  const Outcome outcome = run_shell(budget + ">&-");
  EXPECT_EQ(outcome.code, 3);
  EXPECT_THAT(outcome.err, HasSubstr("standard output"));
}

TEST(Outputs, NeverFallIntoAFileOpenedInPlaceOfAClosedStdout) {
  const Scratch scratch;
  const std::string target = scratch.path("a.json");
  const Outcome outcome = run_shell(budget + "--json " + target + " >&- <&-");
  EXPECT_EQ(outcome.code, 3);
  EXPECT_EQ(Json::parse(content(target))["command"], "budget");
}

} // namespace
} // namespace lightledger::contract
