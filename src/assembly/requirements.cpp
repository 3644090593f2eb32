#include "requirements.hpp"

#include "mapping.hpp"

namespace lightledger::assembly {

namespace {

constexpr std::string_view form = "{quantity: delivered, at_least: 0.80} or {quantity: …, at_most: …}";

/// The unit of a quantity stands at the end of its name, or of the name of the group it belongs to.
Unit unit_of(std::string_view quantity) {
  const auto speaks_of = [quantity](std::string_view unit) {
    const std::size_t at = quantity.rfind(unit);
    return at != std::string_view::npos &&
           (at + unit.size() == quantity.size() || quantity[at + unit.size()] == '.');
  };
  if (speaks_of("_mm"))
    return Unit::millimetres;
  if (speaks_of("_deg"))
    return Unit::degrees;
  return speaks_of("_nm") ? Unit::nanometres : Unit::fraction;
}

Requirement read_requirement(Reader& reader, Value value) {
  Requirement requirement{};
  auto mapping = Mapping::read(reader, value, "a requirement", form);
  if (!mapping)
    return requirement;
  const auto quantity = mapping->need("quantity");
  const auto sense = mapping->need_one_of({"at_least", "at_most"}, form);
  mapping->finish();
  if (quantity)
    requirement.quantity = reader.name(*quantity).value_or("");
  if (!sense)
    return requirement;
  requirement.sense = sense == "at_least" ? Sense::at_least : Sense::at_most;
  requirement.limit = mapping->number_or(0.0, *sense, unit_of(requirement.quantity), Bound::any);
  return requirement;
}

} // namespace

std::vector<Requirement> read_requirements(Reader& reader, Value section) {
  std::vector<Requirement> requirements;
  const Node& list = reader.node(section);
  if (list.kind == Node::Kind::sequence)
    for (const NodeId id : list.items)
      requirements.push_back(read_requirement(reader, {id, "requirement"}));
  else
    reader.wrong_kind(section, "a list of requirements");
  return requirements;
}

} // namespace lightledger::assembly
