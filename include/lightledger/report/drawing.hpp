#pragma once

#include <lightledger/analysis/drawing.hpp>
#include <lightledger/assembly/assembly.hpp>
#include <lightledger/report/envelope.hpp>
#include <lightledger/report/text_style.hpp>

#include <string>
#include <vector>

namespace lightledger::report {

/// The drawing as an SVG document, true to scale, with a scale bar; several views stand below each other. It
/// follows the reader's light or dark setting, text is text. What belongs to a station is a group whose id is
/// its number (with several views `x-1`, `y-1`, …), of the class `station`; the glass between stations 3 and
/// 4 has the class `between-3-4`, that of a plate `plate-3`, rays of the first field `field0`.
[[nodiscard]] std::string drawing_svg(const std::string& title, const analysis::Drawing& drawing);

/// A ray as an SVG path in the coordinates of the group of its view that holds all rays, `g.light`.
[[nodiscard]] std::string ray_path(const analysis::Drawing& drawing, const analysis::DrawnView& view,
                                   const analysis::DrawnRay& ray);

/// The lines of the drawing in bench coordinates, as a JSON document.
[[nodiscard]] std::string drawing_json(const Envelope& envelope, const analysis::Drawing& drawing);

/// One row a point (RFC 4180): view, kind, number, name, x_mm, y_mm, z_mm.
[[nodiscard]] std::string drawing_csv(const analysis::Drawing& drawing);

/// What was drawn, for a person: where it went, which view, which rays do not get through, warnings last.
[[nodiscard]] std::string drawing_text(const assembly::Assembly& assembly, const analysis::Drawing& drawing,
                                       const std::string& path, const std::vector<std::string>& warnings,
                                       const TextStyle& style);

} // namespace lightledger::report
