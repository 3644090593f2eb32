#include "address.hpp"
#include "change_lines.hpp"
#include "document_builder.hpp"
#include "plain_text.hpp"

#include <lightledger/assembly/document.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <utility>

namespace lightledger::assembly {

namespace {

constexpr std::array<std::string_view, 6> sections{"title",    "light", "media",
                                                   "coatings", "train", "requirements"};

/// What may follow the part of an address that was found: keys, and at the root the stations.
std::vector<std::string_view> continuations(const AddressWalk& walk,
                                            const std::vector<std::string>& stations) {
  std::vector<std::string_view> words;
  for (const Node::Entry& entry : walk.here().entries)
    words.emplace_back(entry.key);
  if (walk.path().size() == 1) {
    words.insert(words.end(), sections.begin(), sections.end());
    words.insert(words.end(), stations.begin(), stations.end());
  }
  return words;
}

/// The address with the word at which it fails replaced by the nearest that leads on.
std::string nearest_address(const Document& document, std::string_view address, const AddressWalk& walk) {
  if (walk.path().empty())
    return {};
  std::string_view word = walk.rest();
  if (word.starts_with('.'))
    word.remove_prefix(1);
  const std::string_view before = address.substr(0, address.size() - word.size());
  const std::size_t end = std::min(word.find_first_of(".["), word.size());
  const auto stations = station_names(document);
  const std::string_view better = nearest(word.substr(0, end), continuations(walk, stations));
  if (better.empty())
    return {};
  return fmt::format("{}{}{}", before, better, word.substr(end));
}

/// A key that may be added where the walk ends: the last one of the address, in a mapping.
std::optional<std::string_view> new_key(const AddressWalk& walk) {
  if (walk.path().empty() || walk.here().kind != Node::Kind::mapping)
    return std::nullopt;
  std::string_view key = walk.rest();
  if (walk.path().size() == 1)
    return std::find(sections.begin(), sections.end(), key) != sections.end() ? std::optional(key)
                                                                              : std::nullopt;
  if (!key.starts_with('.'))
    return std::nullopt;
  key.remove_prefix(1);
  if (key.empty() || key.find_first_of(".[]") != std::string_view::npos)
    return std::nullopt;
  return key;
}

std::string one_line(std::string_view text) {
  std::string line(text);
  std::replace_if(
      line.begin(), line.end(), [](char letter) { return letter >= 0 && letter < ' '; }, ' ');
  return line;
}

} // namespace

/// Puts values into a document. An anchor's node may have several parents: everything along the path is
/// copied, so that only the addressed place changes.
class DocumentEditor {
public:
  explicit DocumentEditor(Document& document) : m_document(document) {}

  NodeId make_null(Mark mark) {
    m_document.m_nodes.emplace_back().mark = mark;
    return static_cast<NodeId>(m_document.m_nodes.size() - 1);
  }

  NodeId with_entry(NodeId mapping, std::string key, Mark mark, NodeId value) {
    const NodeId copy = copy_of(mapping);
    m_document.m_nodes[copy].entries.push_back({std::move(key), mark, value});
    return copy;
  }

  void replace(std::vector<AddressStep> path, NodeId value) {
    for (; path.size() > 1; path.pop_back()) {
      const NodeId parent = copy_of(path[path.size() - 2].node);
      Node& node = m_document.m_nodes[parent];
      const std::size_t slot = path.back().slot;
      (node.kind == Node::Kind::sequence ? node.items[slot] : node.entries[slot].value) = value;
      value = parent;
    }
    m_document.m_root = value;
  }

private:
  NodeId copy_of(NodeId id) {
    m_document.m_nodes.push_back(Node(m_document.m_nodes[id]));
    return static_cast<NodeId>(m_document.m_nodes.size() - 1);
  }

  Document& m_document;
};

void Document::set(std::string_view address, std::string_view value, Faults& faults) {
  const std::string where = one_line(address);
  const std::string what = one_line(value);
  m_text += fmt::format("\n{}{}={}", change_line_start, where, what);
  const Mark key_mark{static_cast<int>(std::count(m_text.begin(), m_text.end(), '\n')) + 1, 1};

  const AddressWalk walk(*this, where);
  const auto key = walk.arrived() ? std::nullopt : new_key(walk);
  if (!walk.arrived() && !key) {
    faults.add({key_mark,
                fmt::format("nothing has the address {}", quoted(where)),
                {},
                nearest_address(*this, where, walk)});
    return;
  }
  const std::size_t faults_before = faults.count();
  const int shift = static_cast<int>(where.size()) + 1;
  std::optional<NodeId> fresh = DocumentBuilder(*this, faults, Origin{key_mark.line, shift}).build(what);
  if (faults.count() != faults_before)
    return;
  DocumentEditor editor(*this);
  if (!fresh)
    fresh = editor.make_null({key_mark.line, shift + 1});
  if (key)
    fresh = editor.with_entry(walk.path().back().node, std::string(*key), key_mark, *fresh);
  editor.replace(walk.path(), *fresh);
}

} // namespace lightledger::assembly
