#pragma once

#include <cstddef>
#include <string>
#include <string_view>
#include <vector>

namespace lightledger::assembly {

/// Walks through comma-separated values row by row (RFC 4180: quoted cells may hold commas, line ends and
/// doubled quotes; lines end in LF, CRLF or CR). A byte order mark and blank rows are passed over.
class CsvRows {
public:
  static constexpr std::size_t most_cells = 1000; ///< of a row; what goes beyond is left out

  explicit CsvRows(std::string_view text);

  /// The cells of the next row, good until the next call; null at the end and where quotes do not match.
  const std::vector<std::string>* next();
  /// The number of the row last asked for, from 1; blank ones count.
  [[nodiscard]] std::size_t row() const { return m_row; }
  /// Whether the rows ended at a quote that does not close, or one with text behind it.
  [[nodiscard]] bool broken() const { return m_broken; }

private:
  void read_row();
  std::string read_cell();
  std::string read_quoted();
  bool take(std::string_view text);

  std::string_view m_rest;
  std::vector<std::string> m_cells;
  std::size_t m_row = 0;
  bool m_broken = false;
};

} // namespace lightledger::assembly
