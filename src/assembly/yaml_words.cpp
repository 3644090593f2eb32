#include "yaml_words.hpp"

#include "plain_text.hpp"

#include <fmt/format.h>
#include <yaml-cpp/exceptions.h>

#include <array>

namespace lightledger::assembly {

namespace {

struct Words {
  std::string_view complaint; ///< how the parser's message begins
  std::string_view message;
  std::string_view accepted;
};

namespace said = YAML::ErrorMsg;

const std::array<Words, 29> all_words{{
    {said::TAB_IN_INDENTATION, "a tab indents this line", "blanks"},
    {said::END_OF_MAP_FLOW, "a mapping in braces ends before it is complete", "{key: value, key: value}"},
    {said::END_OF_SEQ_FLOW, "a list in brackets ends before it is complete", "[value, value]"},
    {said::END_OF_MAP, "this line does not belong to the mapping before it: look at its indentation",
     "key: value, each key of a mapping in the same column"},
    {said::END_OF_SEQ, "this line does not belong to the list before it: look at its indentation",
     "- value, each dash of a list in the same column"},
    {said::FLOW_END, "a bracket or brace closes what was not opened", ""},
    {said::BLOCK_ENTRY, "a list with dashes cannot begin here", "a new line, or a list in brackets"},
    {said::MAP_KEY, "a key cannot stand here", "a new line, or a mapping in braces"},
    {said::MAP_VALUE, "a second colon stands here, or a key is not in the column of its neighbours",
     "one key: value a line; text with a colon in quotes"},
    {said::UNKNOWN_TOKEN, "no value can begin with this character", "text in quotes"},
    {said::EOF_IN_SCALAR, "text in quotes begins above and has no end", ""},
    {said::DOC_IN_SCALAR, "text in quotes has no end before the document's", ""},
    {said::CHAR_IN_SCALAR, "this character cannot stand in text without quotes", "text in quotes"},
    {said::INVALID_ESCAPE, "this backslash begins no known escape", "text in single quotes, or \\\\"},
    {said::INVALID_HEX, "this escape is not made of hexadecimal digits", ""},
    {said::INVALID_UNICODE, "this escape names no character", ""},
    {said::UNKNOWN_ANCHOR, "this alias names nothing that stands before it", "*name after &name"},
    {said::ALIAS_NOT_FOUND, "a star begins an alias, but no name follows", "text in quotes"},
    {said::ANCHOR_NOT_FOUND, "an ampersand begins an anchor, but no name follows", "text in quotes"},
    {said::CHAR_IN_ALIAS, "this character cannot stand in the name of an alias", "text in quotes"},
    {said::CHAR_IN_ANCHOR, "this character cannot stand in the name of an anchor", "text in quotes"},
    {said::ALIAS_CONTENT, "an alias cannot have a tag or an anchor", ""},
    {said::MULTIPLE_ANCHORS, "two anchors stand before one value", ""},
    {said::MULTIPLE_TAGS, "two tags stand before one value", ""},
    {said::ZERO_INDENT_IN_BLOCK, "a block of text cannot be indented by nothing", ""},
    {said::CHAR_IN_BLOCK, "only a line end may follow the sign of a block of text", ""},
    {said::YAML_MAJOR_VERSION, "the file asks for a YAML that is not known", "YAML 1.2"},
    {said::YAML_VERSION, "the file asks for a YAML that is not known", "YAML 1.2"},
    {said::BAD_FILE, "lists and mappings stand too deep in each other", ""},
}};

Fault in_words(std::string_view complaint, Mark mark) {
  for (const Words& words : all_words)
    if (complaint.starts_with(words.complaint))
      return {mark, std::string(words.message), std::string(words.accepted), {}};
  return {mark, fmt::format("this is not YAML: {}", printable(complaint, 120)), {}, {}};
}

/// The parser notices some tabs only by what they lead to, later in the line.
bool indented_by_tab(std::string_view before, std::string_view after) {
  std::string_view line = before.substr(before.rfind('\n') + 1); // npos + 1 is 0
  if (line.find_first_not_of(" \t") == std::string_view::npos && line.find('\t') == std::string_view::npos)
    line = after;
  return line.substr(0, line.find_first_not_of(" \t")).find('\t') != std::string_view::npos;
}

} // namespace

Fault syntax_fault(std::string_view complaint, Mark mark, std::string_view before, std::string_view after) {
  if (indented_by_tab(before, after))
    return in_words(said::TAB_IN_INDENTATION, {mark.line, 1});
  if (complaint.starts_with(said::END_OF_MAP_FLOW) && before.ends_with(':'))
    return {mark, "a blank is missing after the colon", "key: value", {}};
  return in_words(complaint, mark);
}

} // namespace lightledger::assembly
