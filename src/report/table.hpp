#pragma once

#include <string>
#include <utility>
#include <vector>

namespace lightledger::report {

enum class Align { left, right };

struct Column {
  std::string heading;
  Align align = Align::right;
  int at_least = 0; ///< columns of the terminal
};

struct Cell {
  Cell(std::string content, bool is_strong = false) : text(std::move(content)), strong(is_strong) {}
  Cell(const char* content, bool is_strong = false) : Cell(std::string(content), is_strong) {}

  std::string text;
  bool strong; ///< bold where emphasis is allowed
};

/// Bold and red, for the one thing on the screen that asks for attention.
[[nodiscard]] std::string strong(const std::string& text);

/// A table in plain text: a line of headings, then the rows, columns two blanks apart.
class Table {
public:
  explicit Table(std::vector<Column> columns) : m_columns(std::move(columns)) {}

  /// As many cells as there are columns.
  void add(std::vector<Cell> row) { m_rows.push_back(std::move(row)); }

  /// The lines, each with its line break; `emphasis` allows strong cells to stand out.
  [[nodiscard]] std::string text(bool emphasis) const;

private:
  [[nodiscard]] std::vector<int> widths() const;

  std::vector<Column> m_columns;
  std::vector<std::vector<Cell>> m_rows;
};

} // namespace lightledger::report
