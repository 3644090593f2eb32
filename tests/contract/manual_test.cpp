#include "program.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <regex>
#include <set>
#include <sstream>

/// What README and manual show is what happens.
namespace lightledger::contract {
namespace {

using testing::HasSubstr;
using testing::SizeIs;

/// The contents of all fenced blocks of a language, in order.
std::vector<std::string> blocks(const std::string& document, const std::string& language) {
  std::vector<std::string> found;
  std::istringstream lines(content(project(document)));
  bool inside = false;
  for (std::string line; std::getline(lines, line);) {
    if (!inside && line == "```" + language) {
      inside = true;
      found.emplace_back();
    } else if (inside && line == "```") {
      inside = false;
    } else if (inside) {
      found.back() += line + '\n';
    }
  }
  return found;
}

/// The lines of a document's shell blocks that begin with some words, without these.
std::vector<std::string> commands_of(const std::string& document, const std::string& beginning) {
  std::vector<std::string> commands;
  for (const std::string& block : blocks(document, "sh")) {
    std::istringstream lines(block);
    for (std::string line; std::getline(lines, line);)
      if (line.starts_with(beginning))
        commands.push_back(line.substr(beginning.size()));
  }
  return commands;
}

/// The lines of README that run the program, without `tools/run`.
std::vector<std::string> readme_commands() {
  return commands_of("README.md", "tools/run ");
}

/// Text of a budget without the figures that differ from run to run and from machine to machine.
std::string lasting(const std::string& text) {
  return std::regex_replace(std::regex_replace(text, std::regex("closes to [0-9.e-]+"), "closes to …"),
                            std::regex("[0-9.]+ m?s\n"), "… ms\n");
}

TEST(Readme, BeginsWithTheJob) {
  EXPECT_TRUE(content(project("README.md")).starts_with("# lightledger\n\nWhoever designs the optical path"));
}

TEST(Readme, HasCommandsThatRun) {
  ASSERT_THAT(readme_commands(), SizeIs(testing::Ge(2U)));
  for (const std::string& command : readme_commands()) {
    const Outcome outcome = run_shell("lightledger " + command);
    EXPECT_EQ(outcome.code, 0) << command << '\n' << outcome.err;
    EXPECT_NE(outcome.out, "") << command;
  }
}

TEST(Readme, NamesTheCommandThatTests) {
  EXPECT_THAT(blocks("README.md", "sh").front(), HasSubstr("\ntools/test\n"));
  EXPECT_NE(content(project("tools/test")), "");
}

TEST(Readme, ShowsWhatItsFirstCommandPrints) {
  const std::vector<std::string> shown = blocks("README.md", "text");
  ASSERT_THAT(shown, SizeIs(1U));
  EXPECT_EQ(lasting(shown.front()), lasting(run_shell("lightledger " + readme_commands().front()).out));
}

TEST(Readme, ShowsTheMinimalSystem) {
  EXPECT_THAT(blocks("README.md", "yaml"), testing::ElementsAre(content(project("systems/minimal.yaml"))));
}

TEST(Readme, LinksToFilesThatExist) {
  const std::string text = content(project("README.md"));
  const std::regex link(R"(\]\(([^)]+)\))");
  for (std::sregex_iterator it(text.begin(), text.end(), link), end; it != end; ++it)
    EXPECT_TRUE(std::filesystem::exists(project((*it)[1]))) << (*it)[1];
}

TEST(Manual, ShowsAssembliesThatAreSoundAndMeetTheirRequirements) {
  const Scratch scratch;
  for (const std::string& yaml : blocks("docs/assembly-file.md", "yaml")) {
    const Outcome outcome = run({"check", scratch.file("example.yaml", yaml)});
    EXPECT_EQ(outcome.code, 0) << outcome.err << outcome.out;
  }
}

TEST(Manual, ShowsRequirementsThatItsExampleMeets) {
  const Scratch scratch;
  const std::string example = scratch.file("example.yaml", blocks("docs/assembly-file.md", "yaml").front());
  std::istringstream lines(blocks("docs/assembly-file.md", "yaml requirements").front());
  for (std::string line; std::getline(lines, line);) {
    const Outcome outcome = run({"check", example, "--set", "requirements=" + line});
    EXPECT_EQ(outcome.code, 0) << line << '\n' << outcome.err << outcome.out;
  }
}

TEST(Manual, ShowsDrawingsAndPagesThatCanBeMade) {
  const std::vector<std::string> commands = commands_of("docs/drawing-and-page.md", "lightledger ");
  ASSERT_THAT(commands, SizeIs(testing::Ge(4U)));
  for (const std::string& command : commands)
    EXPECT_EQ(run_shell("lightledger " + command).code, 0) << command;
}

/// Names of all members in a JSON document, at any depth.
void gather_keys(const Json& json, std::set<std::string>& keys) {
  if (json.is_object())
    for (const auto& [key, value] : json.items())
      keys.insert(key);
  if (json.is_structured())
    for (const Json& inner : json)
      gather_keys(inner, keys);
}

TEST(Manual, DefinesEveryKeyOfTheResults) {
  const std::string results = content(project("docs/results.md"));
  std::set<std::string> keys;
  for (const Arguments& arguments :
       {Arguments{"budget", "systems/minimal.yaml", "--split", "field"},
        Arguments{"polarization", "systems/relay-terminal.yaml", "--against", "angle"},
        Arguments{"polarization", "systems/relay-terminal-crossed.yaml"},
        Arguments{"check", "systems/minimal.yaml"}, Arguments{"coating", "systems/minimal.yaml", "bare"},
        Arguments{"media", "SiO2", "--wavelengths", "500"}})
    gather_keys(json_of(arguments), keys);
  ASSERT_THAT(keys, SizeIs(testing::Ge(50U)));
  for (const std::string& key : keys) {
    const bool defined = results.find('`' + key + '`') != std::string::npos ||
                         results.find('"' + key + '"') != std::string::npos;
    EXPECT_TRUE(defined) << key;
  }
}

} // namespace
} // namespace lightledger::contract
