#include "published/validation.hpp"

#include <fmt/format.h>
#include <gtest/gtest.h>

#include <algorithm>
#include <array>
#include <cctype>
#include <filesystem>
#include <fstream>
#include <iterator>
#include <stdexcept>
#include <string_view>
#include <tuple>

namespace lightledger::published {
namespace {

struct Chapter {
  std::string_view letters, title;
};

constexpr std::array chapters{
    Chapter{"F", "Interfaces"}, Chapter{"T", "Thin films"},   Chapter{"M", "Identities"},
    Chapter{"N", "Media"},      Chapter{"RT", "Ray tracing"}, Chapter{"PR", "Polarization"},
    Chapter{"GH", "Ghosts"},
};

constexpr std::string_view head =
    R"(# Validation

Published values that lightledger reproduces. This file is written by the test program `published_tests` when all
of its checks pass; each line names the test that guards it.

- *published*: the value as its source prints it; *ours* in the same unit, to six digits.
- *from*: **print**, the value was read in the source; **memory**, it was recalled from the source without having it at
  hand; **formula**, the source gives the formula, and the value was computed from it independently, with 50 digits;
  **identity**, it follows exactly.
- *within*: the tolerance of the check, against print half a unit of the last digit unless there is a reason for
  another. Where a *computed* value stands beside, ours agrees with it too, as a rule to 1e-10 of it or its last digit.
)";

std::string letters_of(std::string_view id) {
  const auto end = std::ranges::find_if_not(id, [](unsigned char c) { return std::isalpha(c) != 0; });
  return {id.begin(), end};
}

const Chapter* chapter_of(const Case& entry) {
  const auto* found = std::ranges::find(chapters, letters_of(entry.id), &Chapter::letters);
  if (found == chapters.end())
    throw std::invalid_argument("no chapter of the validation document for " + entry.id);
  return found;
}

/// F2 before F10, RT-3 before RT-14.
auto place(const Case& entry) {
  const auto digits = entry.id.find_first_of("0123456789");
  const int number = digits == std::string::npos ? 0 : std::stoi(entry.id.substr(digits));
  return std::tuple{chapter_of(entry), number, entry.id};
}

std::string cell(const std::string& text) {
  if (text.empty())
    return "–";
  std::string escaped;
  for (const char letter : text)
    escaped += letter == '|' ? std::string{"\\|"} : std::string{letter};
  return escaped;
}

std::string section(const Case& entry) {
  std::string text = fmt::format("\n### {} {}\n\nSource: {}\n\n"
                                 "| quantity | published | from | computed | ours | within | test |\n"
                                 "| --- | --- | --- | --- | --- | --- | --- |\n",
                                 entry.id, entry.title, entry.source);
  for (const Row& row : entry.rows)
    text +=
        fmt::format("| {} | {} | {} | {} | {} | {} | {} |\n", cell(row.quantity), cell(row.published),
                    cell(row.origin), cell(row.computed), cell(row.ours), cell(row.within), cell(row.test));
  return text;
}

std::string content_of(const std::filesystem::path& path) {
  std::ifstream file{path, std::ios::binary};
  return {std::istreambuf_iterator<char>{file}, {}};
}

/// Leaves a file that is already right untouched, and never a half-written one.
void write_if_changed(const std::filesystem::path& path, const std::string& text) {
  if (content_of(path) == text)
    return;
  std::filesystem::create_directories(path.parent_path());
  std::filesystem::path draft = path;
  draft += ".draft";
  std::ofstream{draft, std::ios::binary} << text;
  std::filesystem::rename(draft, path);
}

/// Whether this run made every check of the program, once and in its order, and all of them passed.
bool complete() {
  const testing::UnitTest& run = *testing::UnitTest::GetInstance();
  return run.Passed() && run.test_to_run_count() == run.total_test_count() &&
         run.successful_test_count() == run.total_test_count() && !GTEST_FLAG_GET(shuffle);
}

/// Collects the rows of one run of the program.
class Validation : public testing::Environment {
public:
  void SetUp() override { m_cases.clear(); }

  void TearDown() override {
    if (complete())
      write_if_changed(LIGHTLEDGER_SOURCE_DIR "/docs/validation.md", validation_document(m_cases));
  }

  Case& open(const std::string& id, const std::string& title, const std::string& source) {
    const auto found = std::ranges::find(m_cases, id, &Case::id);
    return found == m_cases.end() ? m_cases.emplace_back(Case{id, title, source, {}}) : *found;
  }

private:
  std::vector<Case> m_cases;
};

Validation* const validation = [] {
  auto* environment = new Validation;
  testing::AddGlobalTestEnvironment(environment); // which owns it from here on
  return environment;
}();

} // namespace

void enter(const std::string& id, const std::string& title, const std::string& source, Row row) {
  Case& entry = validation->open(id, title, source);
  EXPECT_EQ(entry.title, title) << id << " has two titles";
  EXPECT_EQ(entry.source, source) << id << " has two sources";
  entry.rows.push_back(std::move(row));
}

std::string validation_document(std::vector<Case> cases) {
  std::ranges::sort(cases, {}, place);
  std::string text{head};
  const Chapter* chapter = nullptr;
  for (const Case& entry : cases) {
    if (chapter_of(entry) != chapter) {
      chapter = chapter_of(entry);
      text += fmt::format("\n## {}\n", chapter->title);
    }
    text += section(entry);
  }
  return text;
}

} // namespace lightledger::published
