#pragma once

#include <optional>
#include <string>
#include <string_view>

namespace lightledger::report {

/// A table of comma-separated values (RFC 4180): CRLF line ends; text that holds a comma, a quote or a line
/// break is quoted.
class Csv {
public:
  Csv& cell(std::string_view text);
  /// Full double precision; empty where the number is none or not finite.
  Csv& cell(std::optional<double> number);
  void end_row();

  [[nodiscard]] const std::string& text() const { return m_text; }

private:
  void separate();

  std::string m_text;
  bool m_row_started = false;
};

} // namespace lightledger::report
