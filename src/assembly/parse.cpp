#include "document_builder.hpp"
#include "plain_text.hpp"

#include <lightledger/assembly/document.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <utility>

namespace lightledger::assembly {

namespace {

constexpr std::string_view byte_order_mark = "\xEF\xBB\xBF";

bool is_utf16(std::string_view text) {
  return text.starts_with("\xFF\xFE") || text.starts_with("\xFE\xFF");
}

bool may_stand_in_text(Character character) {
  const char32_t code = character.code;
  return character.length != 0 && (code >= 0x20 || code == '\t' || code == '\n' || code == '\r') &&
         code != 0x7F;
}

/// What keeps these bytes from being text at all; the parser would take some of them for the end of the file.
std::optional<Fault> not_text(std::string_view text) {
  if (is_utf16(text))
    return Fault{{}, "the file is UTF-16 text", "UTF-8 text", {}};
  if (text.find('\0') != std::string_view::npos)
    return Fault{{}, "the file is binary, not text", "a YAML file, as UTF-8 text", {}};
  for (std::size_t at = 0; at < text.size();) {
    const Character character = first_character(text.substr(at));
    if (character.length == 0)
      return Fault{mark_at(text, at), "these bytes are no UTF-8 text", "a YAML file, as UTF-8 text", {}};
    if (!may_stand_in_text(character))
      return Fault{
          mark_at(text, at),
          fmt::format("the control character 0x{:02x} stands here", static_cast<unsigned>(character.code)),
          "visible text",
          {}};
    at += character.length;
  }
  return std::nullopt;
}

} // namespace

Document Document::parse(std::string file, std::string text, Faults& faults) {
  Document document;
  document.m_file = std::move(file);
  document.m_text = std::move(text);
  if (document.m_text.starts_with(byte_order_mark))
    document.m_text.erase(0, byte_order_mark.size());
  if (auto fault = not_text(document.m_text)) {
    faults.add(std::move(*fault));
    return document;
  }
  const std::size_t before = faults.count();
  document.m_root = DocumentBuilder(document, faults, Origin{}).build(document.m_text);
  if (faults.count() == before &&
      (!document.m_root || document.node(*document.m_root).kind == Node::Kind::null)) {
    document.m_root.reset();
    faults.add({{}, "the file is empty", "an assembly: light, train and what they need", {}});
  }
  return document;
}

} // namespace lightledger::assembly
