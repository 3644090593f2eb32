#include "program.hpp"
#include "systems.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lightledger::contract {
namespace {

using testing::ElementsAre;
using testing::HasSubstr;
using testing::StartsWith;

TEST(Draw, WritesNameSvgIntoTheCurrentFolder) {
  const Scratch scratch;
  const std::string there = scratch.path("");
  const Outcome outcome =
      run_shell("file=$PWD/systems/minimal.yaml; cd '" + there + "' && lightledger draw \"$file\"");
  EXPECT_EQ(outcome.code, 0) << outcome.err;
  EXPECT_THAT(scratch.names(), ElementsAre("minimal.svg"));
  EXPECT_THAT(content(scratch.path("minimal.svg")), StartsWith("<svg xmlns="));
  EXPECT_THAT(outcome.out, HasSubstr("minimal.svg"));
}

TEST(Draw, WritesWhereItIsTold) {
  const Scratch scratch;
  EXPECT_EQ(run({"draw", minimal, "--out", scratch.path("a.svg"), "--json", scratch.path("a.json")}).code, 0);
  EXPECT_THAT(scratch.names(), ElementsAre("a.json", "a.svg"));
  EXPECT_EQ(Json::parse(content(scratch.path("a.json")))["command"], "draw");
}

TEST(Draw, OnStdoutStandsAlone) {
  EXPECT_THAT(run({"draw", minimal, "--out", "-"}).out, StartsWith("<svg xmlns="));
}

TEST(Draw, LooksAlongTheAxisAskedFor) {
  for (const char* view : {"x", "y", "z"})
    EXPECT_THAT(run({"draw", lidar, "--view", view, "--out", "-"}).out,
                HasSubstr(std::string("seen along ") + view));
  const std::string all = run({"draw", lidar, "--view", "all", "--out", "-"}).out;
  for (const char* view : {"x", "y", "z"})
    EXPECT_THAT(all, HasSubstr(std::string("seen along ") + view));
}

TEST(Draw, RefusesAViewThatIsNone) {
  const Outcome outcome = run({"draw", minimal, "--view", "w", "--out", "-"});
  EXPECT_EQ(outcome.code, 2);
  EXPECT_EQ(outcome.out, "");
  EXPECT_THAT(outcome.err, HasSubstr("accepted: x, y, z, all"));
}

TEST(Draw, DoesNotOverwriteItsInput) {
  const Scratch scratch;
  const std::string file = scratch.file("train.yaml", content(project(minimal)));
  EXPECT_EQ(run({"draw", file, "--out", file}).code, 2);
  EXPECT_EQ(content(file), content(project(minimal)));
}

} // namespace
} // namespace lightledger::contract
