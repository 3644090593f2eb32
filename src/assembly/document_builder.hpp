#pragma once

#include <lightledger/assembly/document.hpp>

#include <yaml-cpp/eventhandler.h>
#include <yaml-cpp/exceptions.h>
#include <yaml-cpp/mark.h>

#include <cstdint>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace lightledger::assembly {

/// Where the parsed text stands: columns of its first line are shifted, lines counted from `line`.
struct Origin {
  int line = 1;
  int column_shift = 0;
};

/// Thrown through the parser where reading on makes no sense; the fault is already added.
struct Abandoned {};

/// Puts the events of one YAML document into the nodes of a Document.
class DocumentBuilder final : public YAML::EventHandler {
public:
  static constexpr int deepest = 64;
  static constexpr std::uint64_t most_nodes = 1'000'000; ///< of the tree, with every alias written out

  DocumentBuilder(Document& document, Faults& faults, Origin origin);

  /// Parses the text as one document. The root node, or none where the text holds no value or was abandoned.
  std::optional<NodeId> build(const std::string& text);

  void OnDocumentStart(const YAML::Mark& mark) override;
  void OnDocumentEnd() override {}
  void OnNull(const YAML::Mark& mark, YAML::anchor_t anchor) override;
  void OnAlias(const YAML::Mark& mark, YAML::anchor_t anchor) override;
  void OnScalar(const YAML::Mark& mark, const std::string& tag, YAML::anchor_t anchor,
                const std::string& value) override;
  void OnSequenceStart(const YAML::Mark& mark, const std::string& tag, YAML::anchor_t anchor,
                       YAML::EmitterStyle::value style) override;
  void OnSequenceEnd() override { close(); }
  void OnMapStart(const YAML::Mark& mark, const std::string& tag, YAML::anchor_t anchor,
                  YAML::EmitterStyle::value style) override;
  void OnMapEnd() override;

private:
  struct Key {
    std::string text;
    Mark mark;
  };
  /// A collection whose end has not come yet.
  struct Open {
    NodeId id;
    std::optional<Key> key; ///< of a mapping: the key whose value comes next
  };
  /// What an alias to a node brings with it.
  struct Extent {
    std::uint32_t nodes = 1;
    int height = 0; ///< levels of collections, its own included
  };

  [[nodiscard]] Mark place(const YAML::Mark& mark) const;
  [[noreturn]] void abandon(Mark mark, std::string message, std::string accepted = {});
  [[nodiscard]] bool key_is_due() const;
  NodeId make(Node::Kind kind, const YAML::Mark& mark, YAML::anchor_t anchor);
  void open(Node::Kind kind, const YAML::Mark& mark, const std::string& tag, YAML::anchor_t anchor);
  void close();
  void take_key(Key key);
  void attach(NodeId id, Mark mark);
  void refuse_syntax(std::string_view text, const YAML::Exception& error);
  void refuse_equal_keys(const Node& mapping);

  Document& m_document;
  Faults& m_faults;
  Origin m_origin;
  bool m_started = false;
  std::optional<NodeId> m_root;
  std::uint64_t m_expanded = 0;
  std::vector<Open> m_open;
  std::vector<Extent> m_extents; ///< of the nodes from m_first on
  NodeId m_first;
  std::vector<NodeId> m_anchored; ///< by anchor, which the parser counts from 1
};

} // namespace lightledger::assembly
