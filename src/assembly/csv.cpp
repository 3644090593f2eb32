#include "csv.hpp"

#include <algorithm>
#include <utility>

namespace lightledger::assembly {

CsvRows::CsvRows(std::string_view text) : m_rest(text) {
  take("\xef\xbb\xbf");
}

const std::vector<std::string>* CsvRows::next() {
  while (!m_rest.empty() && !m_broken) {
    ++m_row;
    read_row();
    const bool blank = m_cells.size() == 1 && m_cells[0].find_first_not_of(" \t") == std::string::npos;
    if (!m_broken && !blank)
      return &m_cells;
  }
  return nullptr;
}

void CsvRows::read_row() {
  m_cells.clear();
  do {
    std::string cell = read_cell();
    if (m_cells.size() < most_cells)
      m_cells.push_back(std::move(cell));
  } while (take(","));
  const bool ended = m_rest.empty() || take("\r\n") || take("\n") || take("\r");
  m_broken = m_broken || !ended;
}

std::string CsvRows::read_cell() {
  if (take("\""))
    return read_quoted();
  const std::size_t length = std::min(m_rest.find_first_of(",\r\n"), m_rest.size());
  std::string cell(m_rest.substr(0, length));
  m_rest.remove_prefix(length);
  return cell;
}

std::string CsvRows::read_quoted() {
  std::string cell;
  while (true) {
    const std::size_t length = m_rest.find('"');
    if (length == std::string_view::npos) {
      m_broken = true;
      return cell;
    }
    cell += m_rest.substr(0, length);
    m_rest.remove_prefix(length + 1);
    if (!take("\""))
      return cell;
    cell += '"';
  }
}

bool CsvRows::take(std::string_view text) {
  if (!m_rest.starts_with(text))
    return false;
  m_rest.remove_prefix(text.size());
  return true;
}

} // namespace lightledger::assembly
