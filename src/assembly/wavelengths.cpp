#include "light.hpp"
#include "mapping.hpp"
#include "plain_text.hpp"
#include "scalar.hpp"

#include <fmt/format.h>

namespace lightledger::assembly {

namespace {

constexpr std::string_view forms = "[532], [{at: 532, weight: 2}, …] or {from: 480, to: 660, count: 9}";
constexpr std::uint64_t most_wavelengths = 10'000;

std::optional<Wavelength> read_one(Reader& reader, Value value) {
  if (reader.node(value).kind != Node::Kind::mapping) {
    const auto nm = reader.number(value, Unit::nanometres, Bound::positive);
    return nm ? std::optional(Wavelength{*nm, 1.0}) : std::nullopt;
  }
  Mapping mapping(reader, value, "a wavelength");
  const auto nm = mapping.need_number("at", Unit::nanometres, Bound::positive);
  const double weight = mapping.number_or(1.0, "weight", Unit::none, Bound::positive);
  mapping.finish();
  return nm ? std::optional(Wavelength{*nm, weight}) : std::nullopt;
}

/// Even steps; both ends are met to the last bit.
std::vector<Wavelength> spread(double from, double to, std::uint64_t count) {
  std::vector<Wavelength> wavelengths;
  for (std::uint64_t i = 0; i < count; ++i) {
    const double along = count == 1 ? 0.0 : static_cast<double>(i) / static_cast<double>(count - 1);
    wavelengths.push_back({(1.0 - along) * from + along * to, 1.0});
  }
  return wavelengths;
}

std::vector<Wavelength> read_spread(Reader& reader, Value value) {
  Mapping mapping(reader, value, "a spread of wavelengths");
  const auto from = mapping.need_number("from", Unit::nanometres, Bound::positive);
  const auto to = mapping.need_number("to", Unit::nanometres, Bound::positive);
  const auto count = mapping.need_count("count", most_wavelengths);
  mapping.finish();
  if (!from || !to || !count)
    return {};
  if (*count == 1 && *from != *to)
    reader.fault(mapping.key_mark("count"), "one wavelength cannot stand at both ends", "a count from 2 on");
  return spread(*from, *to, *count);
}

} // namespace

std::vector<Wavelength> read_wavelengths(Reader& reader, Value value) {
  if (reader.node(value).kind == Node::Kind::mapping)
    return read_spread(reader, value);
  std::vector<Wavelength> wavelengths;
  if (const Node& node = reader.node(value); node.kind == Node::Kind::scalar && core_number(node.scalar)) {
    reader.fault(node.mark, "'wavelengths' is a number, not a list", std::string(forms),
                 fmt::format("[{}]", printable(node.scalar, 24)));
    return wavelengths;
  }
  const auto items = reader.items(value, forms);
  if (!items)
    return wavelengths;
  if (items->size() > most_wavelengths) {
    reader.fault(reader.mark(value), fmt::format("'wavelengths' has {} of them; at most {} are followed",
                                                 items->size(), most_wavelengths));
    return wavelengths;
  }
  for (const Value item : *items)
    if (const auto wavelength = read_one(reader, item))
      wavelengths.push_back(*wavelength);
  return wavelengths;
}

} // namespace lightledger::assembly
