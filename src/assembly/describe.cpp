#include "change_lines.hpp"
#include "plain_text.hpp"

#include <lightledger/assembly/diagnostics.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <iterator>

namespace lightledger::assembly {

namespace {

// In bytes: twenty faults of these lengths stay below 40 kB.
constexpr std::size_t longest_file = 120;
constexpr std::size_t longest_message = 500;
constexpr std::size_t longest_accepted = 400;
constexpr std::size_t longest_suggestion = 120;
// In characters, of up to four bytes each.
constexpr std::size_t longest_excerpt = 100;
constexpr std::size_t furthest_caret = 80;

/// The end of a path says more than its beginning.
std::string short_path(std::string_view file) {
  if (file.size() <= longest_file)
    return printable(file, longest_file);
  std::size_t start = file.size() - longest_file;
  while (start < file.size() && first_character(file.substr(start)).length == 0)
    ++start;
  return "…" + printable(file.substr(start), longest_file);
}

std::string cut(std::string_view text, std::size_t bytes) {
  return printable(text.substr(0, bytes), bytes);
}

/// Walks forward through the text, so that all lines are found in one pass.
class Lines {
public:
  explicit Lines(std::string_view text) : m_rest(text) {}

  /// The line of this number, which is not below that of the last call; without its end.
  std::string_view at(int number) {
    for (; m_number < number && !m_rest.empty(); ++m_number) {
      const std::size_t end = m_rest.find('\n');
      m_rest.remove_prefix(end == std::string_view::npos ? m_rest.size() : end + 1);
    }
    std::string_view line = m_rest.substr(0, m_rest.find('\n'));
    if (line.ends_with('\r'))
      line.remove_suffix(1);
    return line;
  }

private:
  std::string_view m_rest;
  int m_number = 1;
};

/// The first byte of the character that stands `count` characters before `offset`.
std::size_t characters_back(std::string_view line, std::size_t offset, std::size_t count) {
  while (offset > 0 && count > 0) {
    --offset;
    if ((static_cast<unsigned char>(line[offset]) & 0xC0U) != 0x80U)
      --count;
  }
  return offset;
}

/// The line, cut around the column where it is long, and a caret under the column.
std::string excerpt(std::string_view line, std::size_t column_bytes) {
  const std::size_t caret = std::min(column_bytes - 1, line.size());
  const bool cut_before = count_characters(line.substr(0, caret)) > furthest_caret;
  const std::size_t start = cut_before ? characters_back(line, caret, furthest_caret / 2) : 0;
  const std::string_view ahead = line.substr(start, caret - start);
  const std::size_t margin = count_characters(printable(ahead, ahead.size())) + (cut_before ? 1 : 0);
  return fmt::format("    {}{}\n    {:{}}^\n", cut_before ? "…" : "",
                     printable(line.substr(start), longest_excerpt), "", margin);
}

void describe_place(std::string& report, const Fault& fault, std::string_view file, Lines& lines) {
  const auto out = std::back_inserter(report);
  const std::string message = cut(fault.message, longest_message);
  if (fault.mark.line <= 0) {
    fmt::format_to(out, "{}  {}\n", file, message);
    return;
  }
  std::string_view line = lines.at(fault.mark.line);
  const std::size_t bytes = static_cast<std::size_t>(std::max(fault.mark.column, 1));
  const std::size_t column = count_characters(line.substr(0, bytes - 1)) + 1;
  if (is_change_line(line)) {
    line.remove_prefix(1);
    fmt::format_to(out, "--set  {}\n{}", message, excerpt(line, bytes));
  } else {
    fmt::format_to(out, "{}:{}:{}  {}\n{}", file, fault.mark.line, column, message, excerpt(line, bytes));
  }
}

void describe_remedy(std::string& report, const Fault& fault) {
  const auto out = std::back_inserter(report);
  if (!fault.accepted.empty())
    fmt::format_to(out, "    accepted: {}\n", cut(fault.accepted, longest_accepted));
  if (!fault.suggestion.empty())
    fmt::format_to(out, "    did you mean '{}'?\n", cut(fault.suggestion, longest_suggestion));
}

void describe_count(std::string& report, const Faults& faults) {
  const auto out = std::back_inserter(report);
  if (faults.count() > faults.kept().size())
    fmt::format_to(out, "the first {} of {} faults are shown; nothing was written\n", faults.kept().size(),
                   faults.count());
  else if (faults.count() > 1)
    fmt::format_to(out, "{} faults; nothing was written\n", faults.count());
}

} // namespace

std::string describe(const Faults& faults, std::string_view file, std::string_view text) {
  std::vector<Fault> in_order = faults.kept();
  std::stable_sort(in_order.begin(), in_order.end(), [](const Fault& a, const Fault& b) {
    return std::pair(a.mark.line, a.mark.column) < std::pair(b.mark.line, b.mark.column);
  });
  const std::string path = short_path(file);
  std::string report;
  Lines lines(text);
  for (const Fault& fault : in_order) {
    describe_place(report, fault, path, lines);
    describe_remedy(report, fault);
  }
  describe_count(report, faults);
  return report;
}

} // namespace lightledger::assembly
