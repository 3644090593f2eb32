#include "elements.hpp"

#include "mapping.hpp"

#include <cmath>

namespace lightledger::assembly {

namespace {

constexpr std::string_view polarizer_forms = "{axis: 0} or {axis: 0, pass: 0.9, block: 1e-4}";
constexpr std::string_view retarder_forms = "{axis: 45, waves: 0.25, at: 532} or {axis: 45, degrees: 90}";
constexpr std::string_view rotator_forms = "{angle: 45, kind: active} or {angle: 45, kind: faraday}";
constexpr double degrees_in_wave = 360.0;

} // namespace

Polarizer read_polarizer(Reader& reader, Value value) {
  Polarizer polarizer{};
  auto mapping = Mapping::read(reader, value, "'polarize'", polarizer_forms);
  if (!mapping)
    return polarizer;
  polarizer.axis_deg = mapping->need_number("axis", Unit::degrees, Bound::any).value_or(0.0);
  polarizer.pass = mapping->number_or(1.0, "pass", Unit::fraction, Bound::share);
  polarizer.block = mapping->number_or(0.0, "block", Unit::fraction, Bound::share);
  mapping->finish();
  return polarizer;
}

Retarder read_retarder(Reader& reader, Value value) {
  Retarder retarder{};
  auto mapping = Mapping::read(reader, value, "'retard'", retarder_forms);
  if (!mapping)
    return retarder;
  retarder.axis_deg = mapping->need_number("axis", Unit::degrees, Bound::any).value_or(0.0);
  const auto form = mapping->need_one_of({"waves", "degrees"}, retarder_forms);
  if (form == "waves")
    retarder.retardance_deg = degrees_in_wave * mapping->number_or(0.0, "waves", Unit::none, Bound::any);
  else if (form == "degrees")
    retarder.retardance_deg = mapping->number_or(0.0, "degrees", Unit::degrees, Bound::any);
  if (!std::isfinite(retarder.retardance_deg))
    reader.fault(mapping->key_mark("waves"), "'waves' is more than any plate retards", "waves, as 0.25");
  retarder.at_nm = mapping->number("at", Unit::nanometres, Bound::positive);
  mapping->finish();
  return retarder;
}

Rotator read_rotator(Reader& reader, Value value) {
  Rotator rotator{};
  auto mapping = Mapping::read(reader, value, "'rotate'", rotator_forms);
  if (!mapping)
    return rotator;
  rotator.angle_deg = mapping->need_number("angle", Unit::degrees, Bound::any).value_or(0.0);
  const auto kind = mapping->need("kind");
  if (kind && reader.word(*kind, {"active", "faraday"}) == "faraday")
    rotator.kind = Rotator::Kind::faraday;
  mapping->finish();
  return rotator;
}

} // namespace lightledger::assembly
