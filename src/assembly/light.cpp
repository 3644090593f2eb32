#include "light.hpp"

#include "mapping.hpp"
#include "plain_text.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <unordered_set>

namespace lightledger::assembly {

namespace {

constexpr std::string_view object_forms = "infinity, or {distance: 1200}";
constexpr std::string_view field_forms = "a list of [x, y] or {at: [x, y], weight: w, name: n}";

std::optional<double> read_object(Reader& reader, Value value) {
  const Node& node = reader.node(value);
  if (node.kind == Node::Kind::scalar) {
    if (node.scalar != "infinity")
      reader.fault(node.mark, fmt::format("'object' is {}", quoted(node.scalar)), std::string(object_forms),
                   reader.suggest(node.scalar, {"infinity"}));
    return std::nullopt;
  }
  if (node.kind != Node::Kind::mapping) {
    reader.wrong_kind(value, object_forms);
    return std::nullopt;
  }
  Mapping object(reader, value, "an object");
  const auto mm = object.need_number("distance", Unit::millimetres, Bound::far);
  object.finish();
  if (mm == 0.0)
    reader.fault(object.key_mark("distance"), "'distance' is 0, which puts the object onto the first station",
                 "a distance above 0, or below for converging light");
  return mm;
}

Field read_field(Reader& reader, Value value, Unit unit) {
  Field field;
  if (reader.node(value).kind != Node::Kind::mapping) {
    field.at = reader.tuple<2>(value, unit, Bound::far).value_or(field.at);
    return field;
  }
  Mapping mapping(reader, value, "a field");
  if (const auto at = mapping.need("at"))
    field.at = reader.tuple<2>(*at, unit, Bound::far).value_or(field.at);
  field.weight = mapping.number_or(1.0, "weight", Unit::none, Bound::positive);
  if (const auto name = mapping.take("name"))
    field.name = reader.name(*name);
  mapping.finish();
  return field;
}

/// [0, 0.4] where [[0, 0.4]] is meant.
bool is_flat_pair(Reader& reader, Value value) {
  const auto& items = reader.node(value).items;
  return items.size() == 2 && std::all_of(items.begin(), items.end(), [&reader](NodeId id) {
           return reader.document().node(id).kind == Node::Kind::scalar;
         });
}

std::string flat_pair_in_list(Reader& reader, Value value) {
  const auto& items = reader.node(value).items;
  const auto word = [&](std::size_t i) { return printable(reader.document().node(items[i]).scalar, 16); };
  return fmt::format("[[{}, {}]]", word(0), word(1));
}

bool below_right_angle(const Field& field) {
  return std::abs(field.at[0]) < 90.0 && std::abs(field.at[1]) < 90.0;
}

/// A finite sum of weights is what the others are shares of.
template <typename Weighted>
void check_weights(Reader& reader, Value value, const std::vector<Weighted>& all) {
  double sum = 0.0;
  for (const Weighted& one : all)
    sum += one.weight;
  if (!std::isfinite(sum))
    reader.fault(reader.mark(value),
                 fmt::format("the weights of '{}' add up to more than any number", value.label));
}

MediumId medium_of_light(Media& media, std::optional<Value> value) {
  const auto named = value ? media.named(*value) : std::nullopt;
  return named ? *named : media.builtin("air");
}

} // namespace

std::vector<Field> read_fields(Reader& reader, Value value, bool at_infinity) {
  std::vector<Field> fields;
  std::unordered_set<std::string> names;
  if (is_flat_pair(reader, value)) {
    reader.fault(reader.mark(value), "'fields' is one pair of numbers, not a list of them",
                 std::string(field_forms), flat_pair_in_list(reader, value));
    return fields;
  }
  const auto items = reader.items(value, field_forms);
  for (const Value item : items.value_or(std::vector<Value>{})) {
    const std::size_t before = reader.fault_count();
    const Field field = read_field(reader, item, at_infinity ? Unit::degrees : Unit::millimetres);
    if (reader.fault_count() == before && at_infinity && !below_right_angle(field))
      reader.fault(reader.mark(item), "a field at infinity stands 90 degrees or more off the axis",
                   "angles between -90 and 90 degrees");
    if (field.name && !names.insert(*field.name).second)
      reader.fault(reader.mark(item), fmt::format("a field called {} stands before", quoted(*field.name)));
    fields.push_back(field);
  }
  check_weights(reader, value, fields);
  return fields;
}

Light read_light(Reader& reader, Value section, Media& media, LightMarks& marks) {
  Light light;
  auto mapping = Mapping::read(reader, section, "light", "{wavelengths: [532], beam: {radius: 5}}, and more");
  const auto medium = mapping ? mapping->take("medium") : std::nullopt;
  light.medium = medium_of_light(media, medium);
  if (!mapping)
    return light;
  marks.medium = medium ? reader.mark(*medium) : mapping->mark();
  if (const auto wavelengths = mapping->need("wavelengths")) {
    light.wavelengths = read_wavelengths(reader, *wavelengths);
    check_weights(reader, *wavelengths, light.wavelengths);
  }
  if (const auto polarization = mapping->take("polarization"))
    light.polarization = read_polarization(reader, *polarization);
  if (const auto object = mapping->take("object"))
    light.object_distance = read_object(reader, *object);
  if (const auto fields = mapping->take("fields"))
    light.fields = read_fields(reader, *fields, !light.object_distance);
  const std::size_t before = reader.fault_count();
  if (const auto beam = mapping->need("beam")) {
    light.beam = read_beam(reader, *beam);
    marks.beam = reader.mark(*beam);
  }
  if (const auto rays = mapping->take("rays")) {
    light.sampling = read_sampling(reader, *rays);
    if (reader.fault_count() == before)
      check_pattern(reader, *rays, light.sampling, light.beam);
  }
  mapping->finish();
  return light;
}

} // namespace lightledger::assembly
