#include "program.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <filesystem>
#include <memory>
#include <string>

/// What `cmake --install` puts into place, and a project of somebody else's that builds against it.
namespace lightledger::contract {
namespace {

using testing::HasSubstr;
using testing::StartsWith;

class Installed : public testing::Test {
protected:
  static void SetUpTestSuite() {
    s_scratch = std::make_unique<Scratch>();
    const Outcome outcome =
        run_shell(std::string("cmake --install '" LIGHTLEDGER_BUILD_DIR "' --prefix ") + at(""));
    EXPECT_EQ(outcome.code, 0) << outcome.err;
  }
  static void TearDownTestSuite() { s_scratch.reset(); }

  static std::string at(const std::string& path) { return s_scratch->path("there/" + path); }

  static std::unique_ptr<Scratch> s_scratch;
};
std::unique_ptr<Scratch> Installed::s_scratch;

TEST_F(Installed, HasAllThatIsPromised) {
  for (const char* path :
       {"bin/lightledger", "include/lightledger/analysis/budget.hpp", "share/lightledger/media.yaml",
        "share/lightledger/systems/minimal.yaml", "share/lightledger/docs/assembly.schema.json",
        "share/man/man1/lightledger.1", "share/bash-completion/completions/lightledger",
        "share/zsh/site-functions/_lightledger", "share/fish/vendor_completions.d/lightledger.fish"})
    EXPECT_TRUE(std::filesystem::exists(at(path))) << path;
}

TEST_F(Installed, ProgramReadsAnInstalledSystem) {
  const Outcome outcome =
      run_shell(at("bin/lightledger") + " check " + at("share/lightledger/systems/minimal.yaml"));
  EXPECT_EQ(outcome.code, 0) << outcome.err;
}

/// The block of C++ in the manual's page on the library.
std::string example() {
  const std::string page = content(project("docs/library.md"));
  const std::string fence = "```cpp\n";
  const std::size_t start = page.find(fence) + fence.size();
  return page.substr(start, page.find("```", start) - start);
}

TEST_F(Installed, LibraryServesTheManualsExampleInAProjectOfItsOwn) {
  if (LIGHTLEDGER_SANITIZED)
    GTEST_SKIP() << "the libraries need the sanitizers of their own flavour";
  const std::string source = s_scratch->file("example.cpp", example());
  const std::string tree = s_scratch->path("tree");
  const Outcome built =
      run_shell("cmake -G Ninja -S tests/consumer -B " + tree + " -DCMAKE_PREFIX_PATH=" + at("") +
                " -DEXAMPLE=" + source + " && cmake --build " + tree);
  ASSERT_EQ(built.code, 0) << built.out << built.err;
  const Outcome outcome = run_shell(tree + "/example systems/minimal.yaml");
  EXPECT_EQ(outcome.code, 0) << outcome.err;
  EXPECT_THAT(outcome.out, StartsWith("window front         reaches 1.000000  onward 0.96"));
  const double delivered = json_of({"budget", "systems/minimal.yaml"})["budget"]["delivered"];
  EXPECT_THAT(outcome.out, HasSubstr("\ndelivered " + std::to_string(delivered)));
}

TEST_F(Installed, ManualPageIsSoundRoff) {
  if (run_shell("command -v groff").code != 0)
    GTEST_SKIP() << "no groff";
  const Outcome page = run_shell("groff -man -ww -Tutf8 -Wall " + at("share/man/man1/lightledger.1"));
  EXPECT_EQ(page.code, 0);
  EXPECT_EQ(page.err, "");
  EXPECT_THAT(page.out, HasSubstr("lightledger budget systems/fog-bank-lidar.yaml --json -"));
}

/// What bash offers for a line that ends at the cursor.
std::string offered(const std::string& completion, const std::string& words, int at) {
  return run_shell(". " + completion + "; compopt() { echo files; }; COMP_WORDS=(" + words +
                   "); COMP_CWORD=" + std::to_string(at) + "; _lightledger; echo ${COMPREPLY[@]}")
      .out;
}

TEST_F(Installed, BashCompletesCommandsOptionsAndTheirValues) {
  const std::string script = at("share/bash-completion/completions/lightledger");
  EXPECT_EQ(offered(script, "lightledger bu", 1), "budget\n");
  EXPECT_EQ(offered(script, "lightledger budget --sp", 2), "--split\n");
  EXPECT_EQ(offered(script, "lightledger budget --split w", 3), "wavelength\n");
  EXPECT_EQ(offered(script, "lightledger check --sp", 2), "\n");
  EXPECT_EQ(offered(script, "lightledger budget sys", 2), "files\n\n");
  EXPECT_EQ(offered(script, "lightledger budget --json o", 3), "files\n\n");
}

TEST_F(Installed, ZshAndFishAreToldOfEveryCommand) {
  const std::string zsh = content(at("share/zsh/site-functions/_lightledger"));
  const std::string fish = content(at("share/fish/vendor_completions.d/lightledger.fish"));
  EXPECT_THAT(zsh, StartsWith("#compdef lightledger\n"));
  EXPECT_THAT(
      zsh, HasSubstr("'*--set[a change of the file, as fold.tilt=\\[44,0,0\\]; repeatable]:PATH=VALUE: '"));
  EXPECT_THAT(
      fish, HasSubstr("complete -c lightledger -n __fish_use_subcommand -a coating -d 'What does a coating"));
  EXPECT_THAT(fish, HasSubstr("seen_subcommand_from budget' -l split -x -a 'wavelength field' -d "));
}

} // namespace
} // namespace lightledger::contract
