#include "manual.hpp"

#include <sstream>
#include <string_view>

namespace lightledger::schema {

namespace {

constexpr std::string_view plain_light = "light: {wavelengths: [532], beam: {radius: 1}}\n";
constexpr std::string_view plain_train = "train:\n";
constexpr std::string_view detector = "  - {name: end of the example, does: detect}\n";

bool has_section(std::string_view text, std::string_view section) {
  return text.starts_with(section) || text.find('\n' + std::string(section)) != std::string_view::npos;
}

/// A train stands last in a part, and without its detector.
std::string completed(const std::string& part) {
  std::string text = part;
  if (!has_section(text, "light:"))
    text.insert(0, plain_light);
  if (!has_section(text, "train:"))
    text += plain_train;
  return text + std::string(detector);
}

} // namespace

std::multimap<std::string, std::string> manual_blocks() {
  constexpr std::string_view fence = "```";
  std::multimap<std::string, std::string> blocks;
  std::istringstream lines(content(project("docs/assembly-file.md")));
  auto open = blocks.end();
  for (std::string line; std::getline(lines, line);) {
    if (open == blocks.end() && line.starts_with(fence))
      open = blocks.emplace(line.substr(fence.size()), "");
    else if (line == fence)
      open = blocks.end();
    else if (open != blocks.end())
      open->second += line + '\n';
  }
  return blocks;
}

std::vector<Sample> manual_examples() {
  const auto folder = project("tests/unit/schema/forms"); // its curves.csv is the manual's
  std::vector<Sample> samples;
  for (const auto& [fence, text] : manual_blocks()) {
    const std::string name = "manual " + std::to_string(samples.size() + 1);
    if (fence == "yaml")
      samples.push_back({name, text, folder});
    if (fence == "yaml part")
      samples.push_back({name, completed(text), folder});
  }
  return samples;
}

std::vector<assembly::Change> manual_values() {
  constexpr std::string_view language = "yaml ";
  std::vector<assembly::Change> changes;
  for (const auto& [fence, text] : manual_blocks()) {
    if (!fence.starts_with(language) || fence == "yaml part")
      continue;
    std::istringstream lines(text);
    for (std::string line; std::getline(lines, line);)
      changes.push_back({fence.substr(language.size()), line.substr(0, line.find(" #"))});
  }
  return changes;
}

} // namespace lightledger::schema
