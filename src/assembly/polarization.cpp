#include "light.hpp"
#include "mapping.hpp"
#include "plain_text.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace lightledger::assembly {

namespace {

constexpr std::string_view forms = "unpolarized, {linear: A}, {circular: right|left}, {ellipse: {azimuth: A, "
                                   "ellipticity: E}} or {stokes: [S0, S1, S2, S3]}";

optics::State read_linear(Reader& reader, Value value) {
  const auto azimuth = reader.number(value, Unit::degrees, Bound::any);
  return azimuth ? optics::linear(*azimuth) : optics::State{};
}

/// Right and left as in IEEE Std 145 (contract §2).
optics::State read_circular(Reader& reader, Value value) {
  const auto hand = reader.word(value, {"right", "left"});
  return {0.0, 0.0, hand == "left" ? -1.0 : 1.0};
}

optics::State read_ellipse(Reader& reader, Value value) {
  auto ellipse = Mapping::read(reader, value, "an ellipse of polarization", "{azimuth: A, ellipticity: E}");
  if (!ellipse)
    return {};
  const auto azimuth = ellipse->need_number("azimuth", Unit::degrees, Bound::any);
  const auto ellipticity = ellipse->need_number("ellipticity", Unit::degrees, Bound::any);
  ellipse->finish();
  if (!azimuth || !ellipticity)
    return {};
  if (std::abs(*ellipticity) > 45.0)
    reader.fault(ellipse->key_mark("ellipticity"), fmt::format("'ellipticity' is {} degrees", *ellipticity),
                 "-45 to 45 degrees, positive for right-handed (IEEE)");
  return optics::elliptical(*azimuth, *ellipticity);
}

optics::State read_stokes(Reader& reader, Value value) {
  const auto stokes = reader.tuple<4>(value, Unit::none, Bound::any);
  if (!stokes)
    return {};
  const auto [s0, s1, s2, s3] = *stokes;
  if (s0 <= 0.0) {
    reader.fault(reader.mark(value), "'stokes' has no power: S0 must be above 0");
    return {};
  }
  constexpr double rounding = 1e-12;
  const double degree = std::hypot(s1 / s0, s2 / s0, s3 / s0);
  if (!(degree <= 1.0 + rounding))
    reader.fault(reader.mark(value), "'stokes' is no state of light: S1² + S2² + S3² exceeds S0²");
  const double scale = 1.0 / std::max(degree, 1.0);
  return {s1 / s0 * scale, s2 / s0 * scale, s3 / s0 * scale};
}

} // namespace

optics::State read_polarization(Reader& reader, Value value) {
  const Node& node = reader.node(value);
  if (node.kind == Node::Kind::scalar) {
    if (node.scalar != "unpolarized")
      reader.fault(node.mark, fmt::format("'polarization' is {}", quoted(node.scalar)), std::string(forms),
                   reader.suggest(node.scalar, {"unpolarized"}));
    return {};
  }
  auto mapping = Mapping::read(reader, value, "a polarization", forms);
  if (!mapping)
    return {};
  const auto kind = mapping->need_one_of({"linear", "circular", "ellipse", "stokes"}, forms);
  mapping->finish();
  if (!kind)
    return {};
  const Value inner = *mapping->take(*kind);
  if (kind == "linear")
    return read_linear(reader, inner);
  if (kind == "circular")
    return read_circular(reader, inner);
  return kind == "ellipse" ? read_ellipse(reader, inner) : read_stokes(reader, inner);
}

} // namespace lightledger::assembly
