#pragma once

#include <lightledger/assembly/diagnostics.hpp>

#include <cstdint>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace lightledger::assembly {

using NodeId = std::uint32_t;

/// One value of the file: a scalar, a sequence or a mapping, with the place where it stands.
struct Node {
  enum class Kind { null, scalar, sequence, mapping };
  struct Entry {
    std::string key;
    Mark key_mark;
    NodeId value;
  };

  Kind kind = Kind::null;
  Mark mark;
  std::string scalar;
  bool quoted = false; ///< a quoted or block scalar: text, whatever it looks like
  std::vector<NodeId> items;
  std::vector<Entry> entries;
};

/// The parsed file as a tree in one array of nodes (an alias shares its anchor's node), with its text.
class Document {
public:
  /// Parses YAML text. On any fault of syntax (also equal keys, an alias to a value that is still open,
  /// nesting or aliases beyond all sense, a second document) adds to `faults`. Equal keys leave the first in
  /// force; after any other fault there is no root. Columns of marks count bytes.
  static Document parse(std::string file, std::string text, Faults& faults);

  [[nodiscard]] const std::string& file() const { return m_file; }
  /// The file's text without a byte order mark; behind it, a line each that begins with a zero byte, the
  /// changes made by `set`, so that marks lead there too.
  [[nodiscard]] const std::string& text() const { return m_text; }
  [[nodiscard]] const Node& node(NodeId id) const { return m_nodes[id]; }
  [[nodiscard]] std::optional<NodeId> root() const { return m_root; }

  /// The node at an address: keys joined by dots, `[i]` for the items of a sequence. The first key is a
  /// section (title, light, media, coatings, train, requirements) or the name of a station: `fold.tilt[0]`,
  /// `light.wavelengths[1].weight`, `train[2].gap`. None where there is nothing.
  [[nodiscard]] std::optional<NodeId> find(std::string_view address) const;

  /// The place of the value at an address, or of the nearest value around it that exists.
  [[nodiscard]] Mark locate(std::string_view address) const;

  /// Puts the YAML flow text `value` at an address (`--set`): an existing value is replaced, a missing last
  /// key of an existing mapping is added. An address that leads nowhere adds a fault with the nearest one.
  void set(std::string_view address, std::string_view value, Faults& faults);

private:
  friend class DocumentBuilder;
  friend class DocumentEditor;

  std::string m_file;
  std::string m_text;
  std::vector<Node> m_nodes;
  std::optional<NodeId> m_root;
};

} // namespace lightledger::assembly
