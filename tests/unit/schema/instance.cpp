#include "instance.hpp"

#include <assembly/scalar.hpp>

#include <cmath>

namespace lightledger::schema {

namespace {

using assembly::Document;
using assembly::Node;
using assembly::NodeId;

Json scalar(const Node& node) {
  if (node.quoted)
    return node.scalar;
  if (const auto number = assembly::core_number(node.scalar))
    return std::isfinite(*number) ? Json(*number) : Json(node.scalar);
  if (assembly::core_boolean(node.scalar))
    return node.scalar[0] == 't' || node.scalar[0] == 'T';
  return node.scalar;
}

Json value(const Document& document, NodeId id) {
  const Node& node = document.node(id);
  if (node.kind == Node::Kind::null)
    return {};
  if (node.kind == Node::Kind::scalar)
    return scalar(node);
  Json result = node.kind == Node::Kind::sequence ? Json::array() : Json::object();
  for (const NodeId item : node.items)
    result.push_back(value(document, item));
  for (const Node::Entry& entry : node.entries)
    result[entry.key] = value(document, entry.value);
  return result;
}

} // namespace

Json instance(const Document& document) {
  return document.root() ? value(document, *document.root()) : Json();
}

} // namespace lightledger::schema
