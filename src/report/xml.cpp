#include "xml.hpp"

#include "utf8.hpp"

#include <fmt/format.h>

#include <cmath>

namespace lightledger::report {
namespace {

/// What XML 1.0 allows in a document, beside line breaks and tabs, which become blanks.
bool allowed(char32_t code) {
  return code >= 0x20 && !(0x7F <= code && code < 0xA0) && !(0xD800 <= code && code < 0xE000) &&
         (code & 0xFFFEU) != 0xFFFEU && code < 0x110000;
}

} // namespace

std::string xml_text(std::string_view text) {
  std::string safe;
  while (!text.empty()) {
    const Character next = first_character(text);
    switch (next.code) {
    case '&':
      safe += "&amp;";
      break;
    case '<':
      safe += "&lt;";
      break;
    case '>':
      safe += "&gt;";
      break;
    case '"':
      safe += "&quot;";
      break;
    default:
      if (!next.valid)
        safe += "\xEF\xBF\xBD";
      else
        safe += allowed(next.code) ? text.substr(0, next.bytes) : std::string_view(" ");
    }
    text.remove_prefix(next.bytes);
  }
  return safe;
}

std::string coordinate(double value) {
  if (!std::isfinite(value))
    return "0";
  std::string digits = fmt::format("{:.2f}", value);
  digits.erase(digits.find_last_not_of('0') + 1);
  if (digits.back() == '.')
    digits.pop_back();
  return digits == "-0" ? "0" : digits;
}

void Xml::begin(std::string_view name, std::initializer_list<Attribute> attributes) {
  m_text.append("<").append(name);
  for (const Attribute& attribute : attributes)
    m_text.append(" ").append(attribute.name).append("=\"").append(xml_text(attribute.value)).append("\"");
}

Xml& Xml::open(std::string_view name, std::initializer_list<Attribute> attributes) {
  begin(name, attributes);
  m_text += ">\n";
  m_open.emplace_back(name);
  return *this;
}

Xml& Xml::close() {
  m_text.append("</").append(m_open.back()).append(">\n");
  m_open.pop_back();
  return *this;
}

Xml& Xml::leaf(std::string_view name, std::initializer_list<Attribute> attributes) {
  begin(name, attributes);
  m_text += "/>\n";
  return *this;
}

Xml& Xml::words(std::string_view name, std::initializer_list<Attribute> attributes, std::string_view words) {
  begin(name, attributes);
  m_text.append(">").append(xml_text(words)).append("</").append(name).append(">\n");
  return *this;
}

Xml& Xml::raw(std::string_view markup) {
  m_text += markup;
  return *this;
}

} // namespace lightledger::report
