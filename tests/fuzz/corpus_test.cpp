#include "fuzz/hostile_input.hpp"

#include <gtest/gtest.h>

#include <algorithm>
#include <ctime>
#include <filesystem>
#include <fstream>
#include <iterator>
#include <string>
#include <vector>

/// What fuzzing found once, and a seed of every kind, never goes wrong again.
namespace lightledger::fuzz {
namespace {

namespace fs = std::filesystem;

/// Processor seconds, so that other work on the machine does not count; generous for builds that check
/// themselves.
constexpr double allowed_seconds = 5.0;
constexpr std::size_t largest_case = 2048;

std::vector<fs::path> corpus() {
  std::vector<fs::path> files;
  for (const auto& entry : fs::directory_iterator(LIGHTLEDGER_SOURCE_DIR "/tests/fuzz/corpus"))
    files.push_back(entry.path());
  std::sort(files.begin(), files.end());
  return files;
}

std::string content(const fs::path& path) {
  std::ifstream file(path, std::ios::binary);
  return {std::istreambuf_iterator<char>(file), {}};
}

class Corpus : public testing::TestWithParam<fs::path> {};

TEST_P(Corpus, KeepsEveryPromise) {
  const std::string bytes = content(GetParam());
  const std::clock_t start = std::clock();
  EXPECT_NO_THROW(take(bytes));
  EXPECT_LT(static_cast<double>(std::clock() - start) / CLOCKS_PER_SEC, allowed_seconds);
  EXPECT_LT(bytes.size(), largest_case);
}

std::string case_name(const testing::TestParamInfo<fs::path>& tested) {
  std::string name = tested.param.stem().string();
  std::replace(name.begin(), name.end(), '-', '_');
  return name;
}

INSTANTIATE_TEST_SUITE_P(Files, Corpus, testing::ValuesIn(corpus()), case_name);

} // namespace
} // namespace lightledger::fuzz
