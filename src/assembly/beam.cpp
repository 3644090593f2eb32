#include "light.hpp"
#include "mapping.hpp"

#include <fmt/format.h>

#include <cmath>

namespace lightledger::assembly {

namespace {

constexpr std::string_view beam_forms =
    "{radius: 12.5} or {gaussian: 6, radius: 12.5}, both with inner: 3, at: [x, y]; or fill_stop";
constexpr std::string_view sampling_forms =
    "{accuracy: 1e-4}, {pattern: rings, rings: 8, spokes: 24}, "
    "{pattern: grid, across: 64} or {pattern: scattered, count: 4096}";
/// In 1/e² radii: what the hole may reach, for exp(−2 · 18²) is about the least number there is; and the
/// beam, for most rays would carry nothing.
constexpr double farthest_hole = 18.0;
constexpr double farthest_edge = 100.0;
constexpr std::uint64_t most_rings = 10'000;
constexpr std::uint64_t most_across = 65'536;

std::uint64_t count_of(Mapping& mapping, std::string_view key, std::uint64_t most) {
  return mapping.need_count(key, most).value_or(1);
}

Rings read_rings(Reader& reader, Mapping& mapping) {
  const Rings rings{count_of(mapping, "rings", most_rings), count_of(mapping, "spokes", largest_count)};
  if (rings.rings * rings.spokes > largest_count)
    reader.fault(mapping.key_mark("spokes"), fmt::format("rings × spokes is {} rays; at most {} are followed",
                                                         rings.rings * rings.spokes, largest_count));
  return rings;
}

Sampling read_pattern(Reader& reader, Mapping& mapping, Value pattern) {
  const auto word = reader.word(pattern, {"rings", "grid", "scattered"});
  if (word == "rings") {
    mapping.call("a pattern of rings");
    return read_rings(reader, mapping);
  }
  if (word == "grid") {
    mapping.call("a grid");
    return Grid{count_of(mapping, "across", most_across)};
  }
  if (word == "scattered") {
    mapping.call("a scattered pattern");
    return Scattered{count_of(mapping, "count", largest_count)};
  }
  for (const std::string_view key : {"rings", "spokes", "across", "count"})
    mapping.take(key);
  return ToAccuracy{};
}

ToAccuracy read_accuracy(Reader& reader, Value value) {
  const auto accuracy = reader.number(value, Unit::fraction, Bound::positive);
  if (accuracy && *accuracy > 1.0)
    reader.fault(reader.mark(value), "'accuracy' is above 1; it is a standard error of a fraction");
  return {accuracy.value_or(1e-4)};
}

/// Whether a centre of one of across × across cells lies in the disc and not in the hole: in each row of one
/// quadrant the outermost centre within the disc is the one to ask.
bool grid_meets_ring(std::uint64_t across, const Beam& beam) {
  const double cell = 2.0 / static_cast<double>(across);
  const double inner = beam.inner / beam.radius;
  for (std::uint64_t row = across / 2; row < across; ++row) {
    const double y = (static_cast<double>(row) + 0.5) * cell - 1.0;
    const double reach = std::sqrt(std::max(0.0, 1.0 - y * y));
    const double column = std::floor((reach + 1.0) / cell - 0.5);
    const double x = (column + 0.5) * cell - 1.0;
    if (x * x + y * y <= 1.0 && x * x + y * y > inner * inner)
      return true;
  }
  return false;
}

void check_gaussian(Reader& reader, Mapping& mapping, const Beam& beam) {
  if (beam.inner > farthest_hole * *beam.gaussian)
    reader.fault(mapping.key_mark("gaussian"),
                 fmt::format("'inner' leaves no light: it is more than {} times 'gaussian'", farthest_hole));
  else if (beam.radius > farthest_edge * *beam.gaussian)
    reader.fault(mapping.key_mark("gaussian"),
                 fmt::format("'radius' is more than {} times 'gaussian'; hardly a ray would carry light",
                             farthest_edge),
                 "a smaller 'radius', where the beam is cut; beyond 3 times 'gaussian' there is 1e-8 of it");
}

} // namespace

Beam read_beam(Reader& reader, Value value) {
  Beam beam;
  const Node& node = reader.node(value);
  if (node.kind == Node::Kind::scalar && node.scalar == "fill_stop") {
    beam.fill_stop = true;
    return beam;
  }
  auto mapping = Mapping::read(reader, value, "a beam", beam_forms);
  if (!mapping)
    return beam;
  const auto radius = mapping->need_number("radius", Unit::millimetres, Bound::positive);
  const auto inner = mapping->number("inner", Unit::millimetres, Bound::not_negative);
  if (radius && inner && *inner >= *radius)
    reader.fault(mapping->key_mark("inner"), "'inner' leaves nothing of the beam: it is not below 'radius'");
  beam.radius = radius.value_or(beam.radius);
  beam.inner = inner.value_or(beam.inner);
  beam.gaussian = mapping->number("gaussian", Unit::millimetres, Bound::positive);
  if (radius && beam.gaussian)
    check_gaussian(reader, *mapping, beam);
  beam.at = mapping->tuple_or_zero<2>("at", Unit::millimetres);
  mapping->finish();
  return beam;
}

Sampling read_sampling(Reader& reader, Value value) {
  auto mapping = Mapping::read(reader, value, "rays", sampling_forms);
  if (!mapping)
    return ToAccuracy{};
  Sampling sampling = ToAccuracy{};
  const auto kind = mapping->need_one_of({"accuracy", "pattern"}, sampling_forms);
  if (kind == "accuracy")
    sampling = read_accuracy(reader, *mapping->take("accuracy"));
  else if (kind == "pattern")
    sampling = read_pattern(reader, *mapping, *mapping->take("pattern"));
  mapping->finish();
  return sampling;
}

void check_pattern(Reader& reader, Value value, const Sampling& sampling, const Beam& beam) {
  const auto* const grid = std::get_if<Grid>(&sampling);
  if (grid != nullptr && !grid_meets_ring(grid->across, beam))
    reader.fault(
        reader.mark(value),
        fmt::format("none of the {0} × {0} cells has its centre between 'inner' and 'radius'", grid->across),
        "more cells across");
}

} // namespace lightledger::assembly
