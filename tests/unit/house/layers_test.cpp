#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <algorithm>
#include <filesystem>
#include <fstream>
#include <iterator>
#include <map>
#include <regex>
#include <sstream>
#include <string>
#include <vector>

/// The rule of the house: a module includes only itself and those before it.
namespace lightledger::house {
namespace {

namespace fs = std::filesystem;
using testing::ElementsAre;
using testing::IsEmpty;

const std::vector<std::string> modules{"optics", "assembly", "trace", "analysis", "report", "app"};

/// The place of a module in the order; none for any other word.
std::ptrdiff_t rank(const std::string& module) {
  return std::ranges::find(modules, module) - modules.begin();
}

bool is_module(const std::string& word) {
  return rank(word) < static_cast<std::ptrdiff_t>(modules.size());
}

/// The module that a path after #include belongs to; empty for other libraries and for headers of the same
/// folder.
std::string included_module(std::string path) {
  const std::string public_root = "lightledger/";
  if (path.starts_with(public_root))
    path.erase(0, public_root.size());
  const std::string first = path.substr(0, path.find('/'));
  return path.find('/') != std::string::npos && is_module(first) ? first : "";
}

std::vector<std::string> upward_includes(const std::string& module, const std::string& source) {
  static const std::regex include(R"(^\s*#\s*include\s*[<"]([^>"]+)[>"])");
  std::vector<std::string> upward;
  std::istringstream lines(source);
  for (std::string line; std::getline(lines, line);) {
    std::smatch match;
    if (!std::regex_search(line, match, include))
      continue;
    const std::string used = included_module(match[1]);
    const bool leaves_its_folder = match[1].str().starts_with("..");
    if (leaves_its_folder || (!used.empty() && rank(used) > rank(module)))
      upward.push_back(match[1]);
  }
  return upward;
}

std::string content(const fs::path& path) {
  std::ifstream file(path);
  return {std::istreambuf_iterator<char>(file), {}};
}

/// All sources below src and include/lightledger, by path, with the module of their folder.
std::map<fs::path, std::string> sources() {
  const fs::path root = LIGHTLEDGER_SOURCE_DIR;
  std::map<fs::path, std::string> found;
  for (const fs::path& top : {root / "src", root / "include" / "lightledger"})
    for (const auto& entry : fs::recursive_directory_iterator(top))
      if (const fs::path extension = entry.path().extension(); extension == ".cpp" || extension == ".hpp")
        found[entry.path()] = fs::relative(entry.path(), top).begin()->string();
  return found;
}

TEST(Layers, AreTheFoldersOfTheSources) {
  for (const auto& [path, folder] : sources())
    EXPECT_TRUE(is_module(folder)) << path;
}

TEST(Layers, IncludeOnlyThoseBeforeThem) {
  for (const auto& [path, module] : sources())
    EXPECT_THAT(upward_includes(module, content(path)), IsEmpty()) << path;
}

TEST(Layers, AllOwnSources) {
  std::map<std::string, int> files;
  for (const auto& [path, module] : sources())
    ++files[module];
  for (const std::string& module : modules)
    EXPECT_GT(files[module], 0) << module;
}

TEST(LayerRule, RefusesAnIncludeFromALaterModule) {
  EXPECT_THAT(upward_includes("optics", "#include <lightledger/trace/plan.hpp>\n"),
              ElementsAre("lightledger/trace/plan.hpp"));
  EXPECT_THAT(upward_includes("trace", "  #  include \"report/table.hpp\" // why not\n"),
              ElementsAre("report/table.hpp"));
  EXPECT_THAT(upward_includes("assembly", "#include \"../app/run.hpp\"\n"), ElementsAre("../app/run.hpp"));
}

TEST(LayerRule, AllowsTheOwnModuleThoseBeforeAndOtherLibraries) {
  EXPECT_THAT(upward_includes("trace", "#include <lightledger/trace/plan.hpp>\n"
                                       "#include <lightledger/optics/index.hpp>\n"
                                       "#include \"assembly/scalar.hpp\"\n"
                                       "#include \"parallel.hpp\"\n"
                                       "#include <vector>\n"
                                       "#include <Eigen/Geometry>\n"),
              IsEmpty());
}

} // namespace
} // namespace lightledger::house
