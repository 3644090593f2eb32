#pragma once

#include <initializer_list>
#include <string>
#include <string_view>
#include <vector>

namespace lightledger::report {

struct Attribute {
  std::string_view name;
  std::string value;
};

/// Text as it stands between tags or in a quoted value: signs of the markup escaped, control characters as
/// blanks, bytes that are no UTF-8 replaced.
[[nodiscard]] std::string xml_text(std::string_view text);

/// A coordinate with at most two decimals; 0 where it is not finite.
[[nodiscard]] std::string coordinate(double value);

/// Elements one after the other, a line each; what is opened must be closed.
class Xml {
public:
  Xml& open(std::string_view name, std::initializer_list<Attribute> attributes = {});
  Xml& close();
  /// An element without content, or with words alone.
  Xml& leaf(std::string_view name, std::initializer_list<Attribute> attributes);
  Xml& words(std::string_view name, std::initializer_list<Attribute> attributes, std::string_view words);
  /// Markup as it stands.
  Xml& raw(std::string_view markup);

  [[nodiscard]] const std::string& text() const { return m_text; }

private:
  void begin(std::string_view name, std::initializer_list<Attribute> attributes);

  std::string m_text;
  std::vector<std::string> m_open;
};

} // namespace lightledger::report
