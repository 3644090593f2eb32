#include <lightledger/assembly/load.hpp>

#include <gtest/gtest.h>

#include <algorithm>
#include <filesystem>
#include <fstream>
#include <iterator>
#include <string>
#include <vector>

namespace lightledger::assembly {
namespace {

const std::filesystem::path folder =
    std::filesystem::path(LIGHTLEDGER_SOURCE_DIR) / "tests/unit/assembly/bad";

std::string content(const std::filesystem::path& path) {
  std::ifstream stream(path, std::ios::binary);
  return {std::istreambuf_iterator<char>(stream), std::istreambuf_iterator<char>()};
}

std::vector<std::string> bad_files() {
  std::vector<std::string> names;
  for (const auto& entry : std::filesystem::directory_iterator(folder))
    if (entry.path().extension() == ".yaml")
      names.push_back(entry.path().stem().string());
  std::sort(names.begin(), names.end());
  return names;
}

class BadFile : public testing::TestWithParam<std::string> {};

/// Each file has one class of faults, and beside it the whole report that a person gets.
TEST_P(BadFile, IsReportedInTheseWords) {
  const Loaded loaded =
      load_text(GetParam() + ".yaml", content(folder / (GetParam() + ".yaml")), {}, {folder});
  EXPECT_FALSE(loaded.assembly);
  EXPECT_EQ(loaded.report(), content(folder / (GetParam() + ".txt")));
}

std::string test_name(const testing::TestParamInfo<std::string>& info) {
  std::string name = info.param;
  std::replace(name.begin(), name.end(), '-', '_');
  return name;
}

INSTANTIATE_TEST_SUITE_P(All, BadFile, testing::ValuesIn(bad_files()), test_name);

} // namespace
} // namespace lightledger::assembly
