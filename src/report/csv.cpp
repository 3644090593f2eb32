#include "csv.hpp"

#include <fmt/format.h>

#include <cmath>

namespace lightledger::report {

Csv& Csv::cell(std::string_view text) {
  separate();
  if (text.find_first_of(",\"\r\n") == std::string_view::npos) {
    m_text += text;
    return *this;
  }
  m_text += '"';
  for (const char c : text)
    m_text.append(c == '"' ? 2 : 1, c);
  m_text += '"';
  return *this;
}

Csv& Csv::cell(std::optional<double> number) {
  separate();
  if (number && std::isfinite(*number))
    m_text += fmt::format("{}", *number + 0.0);
  return *this;
}

void Csv::end_row() {
  m_text += "\r\n";
  m_row_started = false;
}

void Csv::separate() {
  if (m_row_started)
    m_text += ',';
  m_row_started = true;
}

} // namespace lightledger::report
