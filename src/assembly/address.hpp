#pragma once

#include <lightledger/assembly/document.hpp>

#include <cstddef>
#include <string>
#include <string_view>
#include <vector>

namespace lightledger::assembly {

/// A node and its place among the items or entries of the node before it on the way.
struct AddressStep {
  NodeId node;
  std::size_t slot = 0;
};

/// The names of the train's stations, by their place, those included that `again` gives; empty for stations
/// without. Nothing where there is no train.
[[nodiscard]] std::vector<std::string> station_names(const Document& document);

/// The way from the root along an address, as far as there is one. Names may hold dots, blanks and brackets:
/// of all that fit, the longest is taken.
class AddressWalk {
public:
  AddressWalk(const Document& document, std::string_view address);

  [[nodiscard]] bool arrived() const { return m_path.size() > 1 && m_rest.empty(); }
  [[nodiscard]] const std::vector<AddressStep>& path() const {
    return m_path;
  }                                                              ///< root first; empty without one
  [[nodiscard]] std::string_view rest() const { return m_rest; } ///< what led nowhere
  [[nodiscard]] const Node& here() const {
    return m_document.node(m_path.back().node);
  } ///< where the path ends

private:
  bool step_past_dot();
  bool step_to_station();
  bool step_to_key();
  bool step_to_item();

  const Document& m_document;
  std::string_view m_rest;
  std::vector<AddressStep> m_path;
};

} // namespace lightledger::assembly
