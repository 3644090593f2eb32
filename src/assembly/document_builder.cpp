#include "document_builder.hpp"

#include "plain_text.hpp"
#include "yaml_words.hpp"

#include <fmt/format.h>
#include <yaml-cpp/exceptions.h>
#include <yaml-cpp/parser.h>

#include <algorithm>
#include <numeric>
#include <sstream>
#include <utility>

namespace lightledger::assembly {

namespace {

constexpr std::string_view core_tags = "tag:yaml.org,2002:";

/// The core schema's name of a tag: "str" of `!!str`; empty for plain values, "!" for quoted ones.
std::string_view short_tag(std::string_view tag) {
  if (tag == "?")
    return {};
  if (tag.starts_with(core_tags))
    tag.remove_prefix(core_tags.size());
  return tag;
}

bool is_scalar_tag(std::string_view tag) {
  return tag.empty() || tag == "!" || tag == "str" || tag == "int" || tag == "float" || tag == "bool" ||
         tag == "null";
}

/// Where the text ends but for blanks and line ends.
std::size_t end_of_content(std::string_view text) {
  return text.find_last_not_of(" \t\r\n") + 1;
} // npos + 1 is 0

} // namespace

DocumentBuilder::DocumentBuilder(Document& document, Faults& faults, Origin origin)
    : m_document(document), m_faults(faults), m_origin(origin),
      m_first(static_cast<NodeId>(document.m_nodes.size())) {}

std::optional<NodeId> DocumentBuilder::build(const std::string& text) {
  try {
    // The parser overlooks that text in quotes has no end where a line end comes last; a comment comes later.
    std::istringstream stream(text + "\n#");
    YAML::Parser parser(stream);
    while (parser.HandleNextDocument(*this)) {
    }
    return m_root;
  } catch (const Abandoned&) {
  } catch (const YAML::Exception& error) {
    refuse_syntax(text, error);
  }
  return std::nullopt;
}

void DocumentBuilder::refuse_syntax(std::string_view text, const YAML::Exception& error) {
  const std::size_t end = end_of_content(text);
  const auto at = error.mark.is_null() ? end : static_cast<std::size_t>(error.mark.pos);
  Mark mark = place(error.mark);
  if (at >= end) {
    mark = mark_at(text, end);
    mark = {mark.line - 1 + m_origin.line, mark.column + (mark.line == 1 ? m_origin.column_shift : 0)};
  }
  const std::size_t split = std::min(at, end);
  m_faults.add(syntax_fault(error.msg, mark, text.substr(0, split), text.substr(split)));
}

Mark DocumentBuilder::place(const YAML::Mark& mark) const {
  return {m_origin.line + mark.line, mark.column + 1 + (mark.line == 0 ? m_origin.column_shift : 0)};
}

void DocumentBuilder::abandon(Mark mark, std::string message, std::string accepted) {
  m_faults.add({mark, std::move(message), std::move(accepted), {}});
  throw Abandoned{};
}

bool DocumentBuilder::key_is_due() const {
  return !m_open.empty() && !m_open.back().key &&
         m_document.m_nodes[m_open.back().id].kind == Node::Kind::mapping;
}

void DocumentBuilder::OnDocumentStart(const YAML::Mark& mark) {
  if (std::exchange(m_started, true))
    abandon(place(mark), "what stands here does not belong to the value before it", "one YAML document");
}

NodeId DocumentBuilder::make(Node::Kind kind, const YAML::Mark& mark, YAML::anchor_t anchor) {
  const auto id = static_cast<NodeId>(m_document.m_nodes.size());
  if (id - m_first >= most_nodes)
    abandon(place(mark), fmt::format("the file holds more than {} values", most_nodes));
  Node& node = m_document.m_nodes.emplace_back();
  node.kind = kind;
  node.mark = place(mark);
  m_extents.emplace_back();
  if (anchor != YAML::NullAnchor) {
    m_anchored.resize(std::max<std::size_t>(m_anchored.size(), anchor + 1));
    m_anchored[anchor] = id;
  }
  return id;
}

void DocumentBuilder::OnNull(const YAML::Mark& mark, YAML::anchor_t anchor) {
  if (key_is_due())
    abandon(place(mark), "a key is missing here", "key: value");
  attach(make(Node::Kind::null, mark, anchor), place(mark));
}

void DocumentBuilder::OnScalar(const YAML::Mark& mark, const std::string& tag, YAML::anchor_t anchor,
                               const std::string& value) {
  const std::string_view kind = short_tag(tag);
  if (!is_scalar_tag(kind))
    abandon(place(mark), fmt::format("the tag {} does not fit here", quoted(kind)), "values without tags");
  if (key_is_due() && anchor == YAML::NullAnchor)
    return take_key({value, place(mark)});
  const NodeId id = make(kind == "null" ? Node::Kind::null : Node::Kind::scalar, mark, anchor);
  m_document.m_nodes[id].scalar = value;
  m_document.m_nodes[id].quoted = kind == "!" || kind == "str";
  if (key_is_due())
    return take_key({value, place(mark)});
  attach(id, place(mark));
}

void DocumentBuilder::OnAlias(const YAML::Mark& mark, YAML::anchor_t anchor) {
  const NodeId id = anchor < m_anchored.size() ? m_anchored[anchor] : m_first;
  const auto same = [id](const Open& open) { return open.id == id; };
  if (std::any_of(m_open.begin(), m_open.end(), same))
    abandon(place(mark), "this alias stands inside the value that it names, so the value has no end");
  const Node& node = m_document.m_nodes[id];
  if (!key_is_due())
    return attach(id, place(mark));
  if (node.kind != Node::Kind::scalar)
    abandon(place(mark), "this key is not a word", "key: value");
  take_key({node.scalar, place(mark)});
}

void DocumentBuilder::OnSequenceStart(const YAML::Mark& mark, const std::string& tag, YAML::anchor_t anchor,
                                      YAML::EmitterStyle::value /*style*/) {
  open(Node::Kind::sequence, mark, tag, anchor);
}

void DocumentBuilder::OnMapStart(const YAML::Mark& mark, const std::string& tag, YAML::anchor_t anchor,
                                 YAML::EmitterStyle::value /*style*/) {
  open(Node::Kind::mapping, mark, tag, anchor);
}

void DocumentBuilder::open(Node::Kind kind, const YAML::Mark& mark, const std::string& tag,
                           YAML::anchor_t anchor) {
  const std::string_view wanted = kind == Node::Kind::mapping ? "map" : "seq";
  if (const std::string_view own = short_tag(tag); !own.empty() && own != "!" && own != wanted)
    abandon(place(mark), fmt::format("the tag {} does not fit here", quoted(own)), "values without tags");
  if (m_open.size() == deepest)
    abandon(place(mark), fmt::format("lists and mappings stand more than {} deep in each other", deepest));
  m_open.push_back({make(kind, mark, anchor), std::nullopt});
  m_extents.back().height = 1;
}

void DocumentBuilder::close() {
  const NodeId id = m_open.back().id;
  m_open.pop_back();
  m_expanded -= m_extents[id - m_first].nodes - 1; // attach counts all of them
  attach(id, m_document.m_nodes[id].mark);
}

void DocumentBuilder::OnMapEnd() {
  refuse_equal_keys(m_document.m_nodes[m_open.back().id]);
  close();
}

void DocumentBuilder::take_key(Key key) {
  m_open.back().key = std::move(key);
}

void DocumentBuilder::attach(NodeId id, Mark mark) {
  // Only now, as the parser takes an unfinished collection for a key before it notices that the end is
  // missing.
  if (key_is_due())
    abandon(mark, "this key is a list or a mapping; a key is a word", "key: value");
  const Extent extent = m_extents[id - m_first];
  m_expanded += extent.nodes;
  if (m_expanded > most_nodes)
    abandon(mark, fmt::format("the file holds more than {} values, aliases written out", most_nodes));
  if (m_open.empty()) {
    m_root = id;
    return;
  }
  if (static_cast<int>(m_open.size()) + extent.height > deepest)
    abandon(mark, fmt::format("lists and mappings stand more than {} deep in each other", deepest));
  Open& parent = m_open.back();
  Node& node = m_document.m_nodes[parent.id];
  Extent& around = m_extents[parent.id - m_first];
  around.nodes += extent.nodes;
  around.height = std::max(around.height, extent.height + 1);
  if (node.kind == Node::Kind::sequence)
    node.items.push_back(id);
  else
    node.entries.push_back({std::move(parent.key->text), parent.key->mark, id});
  parent.key.reset();
}

void DocumentBuilder::refuse_equal_keys(const Node& mapping) {
  std::vector<std::size_t> order(mapping.entries.size());
  std::iota(order.begin(), order.end(), std::size_t{0});
  const auto key = [&mapping](std::size_t i) -> const std::string& { return mapping.entries[i].key; };
  std::stable_sort(order.begin(), order.end(), [&](std::size_t a, std::size_t b) { return key(a) < key(b); });
  for (std::size_t i = 1; i < order.size(); ++i)
    if (key(order[i - 1]) == key(order[i]))
      m_faults.add({mapping.entries[order[i]].key_mark,
                    fmt::format("the key {} stands here a second time", quoted(key(order[i]))),
                    {},
                    {}});
}

} // namespace lightledger::assembly
