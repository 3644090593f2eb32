#include "table.hpp"

#include "display_width.hpp"

#include <algorithm>
#include <cstddef>

namespace lightledger::report {
namespace {

std::string aligned(const Cell& cell, Align align, int width, bool emphasis) {
  const auto blanks = static_cast<std::size_t>(std::max(0, width - display_width(cell.text)));
  const std::string padding(blanks, ' ');
  const std::string shown = emphasis && cell.strong ? strong(cell.text) : cell.text;
  return align == Align::left ? shown + padding : padding + shown;
}

void end_line(std::string& text) {
  text.erase(text.find_last_not_of(' ') + 1);
  text += '\n';
}

} // namespace

std::string strong(const std::string& text) {
  return "\x1b[1;31m" + text + "\x1b[0m";
}

std::string Table::text(bool emphasis) const {
  const std::vector<int> width = widths();
  std::string lines;
  const auto add_line = [&](const auto& cell_at) {
    std::string line;
    for (std::size_t i = 0; i < m_columns.size(); ++i)
      line.append(i == 0 ? "" : "  ").append(aligned(cell_at(i), m_columns[i].align, width[i], emphasis));
    end_line(line);
    lines += line;
  };
  add_line([&](std::size_t i) { return Cell(m_columns[i].heading); });
  for (const std::vector<Cell>& row : m_rows)
    add_line([&](std::size_t i) { return row[i]; });
  return lines;
}

std::vector<int> Table::widths() const {
  std::vector<int> widths;
  for (std::size_t i = 0; i < m_columns.size(); ++i) {
    widths.push_back(std::max(m_columns[i].at_least, display_width(m_columns[i].heading)));
    for (const std::vector<Cell>& row : m_rows)
      widths[i] = std::max(widths[i], display_width(row[i].text));
  }
  return widths;
}

} // namespace lightledger::report
