#include "clear.hpp"

#include "mapping.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <limits>

namespace lightledger::assembly {

namespace {

constexpr std::string_view forms = "{diameter: 28}, {radius: 14}, {width: 40, height: 30} or {ellipse: [40, "
                                   "28]}, each with hole: and at: [x, y]";
constexpr std::string_view hole_forms = "{diameter: 6} or {radius: 3}";

/// A mapping, where a bare number is answered by asking which length it is.
std::optional<Mapping> read_lengths(Reader& reader, Value value, std::string_view what,
                                    std::string_view accepted) {
  const Node& node = reader.node(value);
  if (node.kind != Node::Kind::scalar || !read_quantity(node.scalar, node.quoted, Unit::millimetres))
    return Mapping::read(reader, value, what, accepted);
  reader.fault(node.mark, fmt::format("'{}' is a bare number: is it a diameter or a radius?", value.label),
               std::string(accepted));
  return std::nullopt;
}

double length(Mapping& mapping, std::string_view key) {
  return mapping.number_or(1.0, key, Unit::millimetres, Bound::positive);
}

Clear::Rectangle read_rectangle(Mapping& clear) {
  const double width = clear.need_number("width", Unit::millimetres, Bound::positive).value_or(1.0);
  const double height = clear.need_number("height", Unit::millimetres, Bound::positive).value_or(1.0);
  return {width / 2.0, height / 2.0};
}

decltype(Clear::opening) read_opening(Reader& reader, Mapping& clear) {
  auto form = clear.one_of({"diameter", "radius", "width", "ellipse"}, forms);
  const auto height = clear.take("height");
  if (!form && height && !clear.has("diameter") && !clear.has("radius") && !clear.has("ellipse"))
    form = "width";
  if (height && form && form != "width")
    reader.fault(clear.key_mark("height"), fmt::format("'{}' and 'height' exclude each other", *form),
                 std::string(forms));
  if (form == "diameter")
    return Clear::Disc{length(clear, "diameter") / 2.0};
  if (form == "radius")
    return Clear::Disc{length(clear, "radius")};
  if (form == "width")
    return read_rectangle(clear);
  if (form == "ellipse") {
    const auto axes = clear.tuple_or_zero<2>("ellipse", Unit::millimetres, Bound::positive);
    return Clear::Ellipse{axes[0] / 2.0, axes[1] / 2.0};
  }
  return Clear::Unlimited{};
}

double read_hole(Reader& reader, Value value) {
  auto hole = read_lengths(reader, value, "a hole", hole_forms);
  if (!hole)
    return 0.0;
  const auto form = hole->need_one_of({"diameter", "radius"}, hole_forms);
  hole->finish();
  if (!form)
    return 0.0;
  const auto size = hole->number(*form, Unit::millimetres, Bound::positive).value_or(0.0);
  return form == "diameter" ? size / 2.0 : size;
}

/// Distance of the opening's furthest point from its centre: a hole of that radius leaves nothing.
double reach(const Clear::Unlimited& /*opening*/) {
  return std::numeric_limits<double>::infinity();
}
double reach(const Clear::Disc& opening) {
  return opening.radius;
}
double reach(const Clear::Rectangle& opening) {
  return std::hypot(opening.half_width, opening.half_height);
}
double reach(const Clear::Ellipse& opening) {
  return std::max(opening.semi_x, opening.semi_y);
}

} // namespace

Clear read_clear(Reader& reader, Value value) {
  Clear result;
  auto clear = read_lengths(reader, value, "a clear area", forms);
  if (!clear)
    return result;
  const std::size_t before = reader.fault_count();
  result.opening = read_opening(reader, *clear);
  if (const auto hole = clear->take("hole"))
    result.hole_radius = read_hole(reader, *hole);
  result.at = clear->tuple_or_zero<2>("at", Unit::millimetres);
  clear->finish();
  if (reader.fault_count() != before)
    return result;
  const double furthest = std::visit([](const auto& opening) { return reach(opening); }, result.opening);
  if (result.hole_radius >= furthest)
    reader.fault(clear->key_mark("hole"), "'hole' covers the whole opening");
  if (std::isinf(furthest) && result.hole_radius == 0.0)
    reader.fault(clear->mark(), "'clear' does not say how large it is", std::string(forms));
  return result;
}

} // namespace lightledger::assembly
