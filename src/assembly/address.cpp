#include "address.hpp"

#include <lightledger/assembly/document.hpp>

#include <charconv>

namespace lightledger::assembly {

namespace {

/// The place of a key among the entries of a mapping; of equal ones the first.
std::optional<std::size_t> slot_of(const Node& mapping, std::string_view key) {
  for (std::size_t slot = 0; slot < mapping.entries.size(); ++slot)
    if (mapping.entries[slot].key == key)
      return slot;
  return std::nullopt;
}

/// A name that the address begins with, followed by its end, a dot or a bracket.
bool leads(std::string_view name, std::string_view address) {
  if (!address.starts_with(name))
    return false;
  return address.size() == name.size() || address[name.size()] == '.' || address[name.size()] == '[';
}

std::optional<std::size_t> index_of(std::string_view digits) {
  std::size_t index = 0;
  const auto result = std::from_chars(digits.data(), digits.data() + digits.size(), index);
  if (digits.empty() || result.ec != std::errc{} || result.ptr != digits.data() + digits.size())
    return std::nullopt;
  return index;
}

/// Of the names that lead an address, the place of the longest.
template <typename Names>
std::optional<std::size_t> longest_leading(std::size_t count, Names name, std::string_view address) {
  std::optional<std::size_t> longest;
  for (std::size_t i = 0; i < count; ++i)
    if (leads(name(i), address) && !name(i).empty() && (!longest || name(i).size() > name(*longest).size()))
      longest = i;
  return longest;
}

std::string station_name(const Document& document, const Node& station) {
  const auto text = [&](std::size_t slot) { return document.node(station.entries[slot].value).scalar; };
  if (const auto name = slot_of(station, "name"))
    return text(*name);
  if (const auto again = slot_of(station, "again"))
    return text(*again) + " again";
  return {};
}

} // namespace

std::vector<std::string> station_names(const Document& document) {
  const Node& root = document.node(*document.root());
  const auto train = slot_of(root, "train");
  std::vector<std::string> names;
  if (!train)
    return names;
  for (const NodeId id : document.node(root.entries[*train].value).items)
    names.push_back(station_name(document, document.node(id)));
  return names;
}

AddressWalk::AddressWalk(const Document& document, std::string_view address)
    : m_document(document), m_rest(address) {
  if (!document.root())
    return;
  m_path.push_back({*document.root()});
  bool moved = step_to_station() || step_to_key();
  while (moved && !m_rest.empty())
    moved = m_rest[0] == '[' ? step_to_item() : step_past_dot();
}

bool AddressWalk::step_past_dot() {
  if (m_rest[0] != '.')
    return false;
  const std::string_view with_dot = m_rest;
  m_rest.remove_prefix(1);
  if (step_to_key())
    return true;
  m_rest = with_dot;
  return false;
}

bool AddressWalk::step_to_key() {
  const auto& entries = here().entries;
  const auto name = [&entries](std::size_t i) { return std::string_view(entries[i].key); };
  const auto slot = longest_leading(entries.size(), name, m_rest);
  if (!slot)
    return false;
  m_rest.remove_prefix(entries[*slot].key.size());
  m_path.push_back({entries[*slot].value, *slot});
  return true;
}

bool AddressWalk::step_to_station() {
  const auto names = station_names(m_document);
  const auto station = longest_leading(
      names.size(), [&names](std::size_t i) { return std::string_view(names[i]); }, m_rest);
  if (!station || slot_of(here(), names[*station]))
    return false;
  const std::size_t train = *slot_of(here(), "train");
  m_path.push_back({here().entries[train].value, train});
  m_path.push_back({here().items[*station], *station});
  m_rest.remove_prefix(names[*station].size());
  return true;
}

bool AddressWalk::step_to_item() {
  const std::size_t end = m_rest.find(']');
  if (end == std::string_view::npos)
    return false;
  const auto index = index_of(m_rest.substr(1, end - 1));
  if (!index || *index >= here().items.size())
    return false;
  m_path.push_back({here().items[*index], *index});
  m_rest.remove_prefix(end + 1);
  return true;
}

std::optional<NodeId> Document::find(std::string_view address) const {
  const AddressWalk walk(*this, address);
  if (!walk.arrived())
    return std::nullopt;
  return walk.path().back().node;
}

Mark Document::locate(std::string_view address) const {
  const AddressWalk walk(*this, address);
  return walk.path().empty() ? Mark{} : walk.here().mark;
}

} // namespace lightledger::assembly
