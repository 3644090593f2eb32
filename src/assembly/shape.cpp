#include "shape.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cmath>
#include <limits>

namespace lightledger::assembly {

namespace {

/// A picometre in mm: below it there are no surfaces, and curvatures overflow.
constexpr double least_radius = 1e-9;

using Terms = decltype(Asphere::terms);

constexpr std::array<std::string_view, std::tuple_size_v<Terms>> term_keys{
    "A3",  "A4",  "A5",  "A6",  "A7",  "A8",  "A9",  "A10", "A11",
    "A12", "A13", "A14", "A15", "A16", "A17", "A18", "A19", "A20"};

Terms read_terms(Reader& reader, Value value) {
  Terms terms{};
  auto asphere =
      Mapping::read(reader, value, "an asphere", "{A4: 1.0e-6, …}, from A3 to A20 in mm^(1-power)");
  if (!asphere)
    return terms;
  for (std::size_t i = 0; i < terms.size(); ++i)
    terms[i] = asphere->moderate_number(term_keys[i]).value_or(0.0);
  asphere->finish();
  return terms;
}

} // namespace

Shape read_shape(Reader& reader, Mapping& station) {
  const auto radius = station.number("radius", Unit::millimetres, Bound::far);
  const auto conic = station.moderate_number("conic");
  const auto asphere = station.take("asphere");
  const Terms terms = asphere ? read_terms(reader, *asphere) : Terms{};
  if (radius == 0.0)
    reader.fault(station.key_mark("radius"), "'radius' is 0; a plane has no 'radius' at all");
  else if (radius && std::abs(*radius) < least_radius)
    reader.fault(station.key_mark("radius"), "'radius' is less than a picometre");
  if (conic && !station.has("radius"))
    reader.fault(station.key_mark("conic"), "'conic' says nothing without 'radius'");
  if (std::any_of(terms.begin(), terms.end(), [](double term) { return term != 0.0; }))
    return Asphere{radius.value_or(std::numeric_limits<double>::infinity()), conic.value_or(0.0), terms};
  if (!radius)
    return Plane{};
  if (conic && *conic != 0.0)
    return Conic{*radius, *conic};
  return Sphere{*radius};
}

} // namespace lightledger::assembly
