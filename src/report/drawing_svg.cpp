#include "display_width.hpp"
#include "drawing_labels.hpp"
#include "drawing_words.hpp"
#include "figures.hpp"
#include "svg_style.hpp"
#include "xml.hpp"

#include <lightledger/report/drawing.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace lightledger::report {
namespace {

using analysis::Drawing;
using analysis::DrawnRay;
using analysis::DrawnStation;
using analysis::DrawnView;
using analysis::RayEnd;

constexpr double paper_width = 1080.0;
constexpr double margin = 30.0;
constexpr double most_height = 480.0;         ///< of one view
constexpr double most_height_of_many = 330.0; ///< of each of several
constexpr double line_height = 18.0;

/// Markup and the room that it takes.
struct Panel {
  std::string markup;
  Extent extent;
};

/// Draws one view at a scale.
class ViewPainter {
public:
  ViewPainter(const DrawnView& view, double px_per_mm, std::string id_prefix)
      : m_view(view), m_sheet(view, px_per_mm), m_id_prefix(std::move(id_prefix)) {
    m_extent.add(m_sheet.frame());
  }

  Panel paint() {
    open_frame();
    paint_axis();
    for (const analysis::DrawnGlass& body : m_view.glass)
      line(kind_of(body), m_sheet(body.contour), true);
    paint_rays();
    m_xml.close();
    const Labels labels = label(m_view, m_sheet);
    for (std::size_t i = 0; i < m_view.stations.size(); ++i)
      paint_station(i, labels.stations[i]);
    if (labels.keyed)
      paint_key();
    return {m_xml.text(), m_extent};
  }

private:
  /// The group of all that must not leave the frame of a view that is cropped.
  void open_frame() {
    if (!m_sheet.cropped()) {
      m_xml.open("g", {{"class", "light"}});
      return;
    }
    const Box frame = m_sheet.frame();
    const Vector2d size = frame.high - frame.low;
    const std::string id = fmt::format("{}frame", m_id_prefix);
    m_xml.open("clipPath", {{"id", id}});
    m_xml.leaf("rect", {{"x", coordinate(frame.low[0])},
                        {"y", coordinate(frame.low[1])},
                        {"width", coordinate(size[0])},
                        {"height", coordinate(size[1])}});
    m_xml.close();
    m_xml.open("g", {{"class", "light"}, {"clip-path", fmt::format("url(#{})", id)}});
  }

  void line(const std::string& kind, const std::vector<Vector2d>& points, bool closed = false) {
    if (points.empty())
      return;
    const Box frame = m_sheet.frame();
    for (const Vector2d& point : points)
      m_extent.add(m_sheet.cropped() ? Vector2d(point.cwiseMax(frame.low).cwiseMin(frame.high)) : point);
    m_xml.leaf("path", {{"class", kind}, {"d", path_of(points, closed)}});
  }

  void paint_axis() {
    std::vector<Vector2d> points;
    for (const DrawnStation& station : m_view.stations)
      points.push_back(m_sheet(station.axis_point));
    line("axis", points);
  }

  void paint_rays() {
    m_xml.open("g", {{"class", m_view.ghost_rays.empty() ? "rays" : "rays dimmed"}});
    for (const DrawnRay& ray : m_view.rays)
      paint_ray(fmt::format("ray field{}", ray.field % line_kinds), ray);
    m_xml.close();
    if (m_view.ghost_rays.empty())
      return;
    m_xml.open("g", {{"class", "ghost-rays"}});
    for (const DrawnRay& ray : m_view.ghost_rays)
      if (ray.end == RayEnd::arrived)
        paint_ray("ghost", ray);
    m_xml.close();
  }

  /// A ray that ends before its time ends in a cross.
  void paint_ray(const std::string& kind, const DrawnRay& ray) {
    line(kind, m_sheet(ray.points));
    if (ray.end == RayEnd::arrived)
      return;
    constexpr double arm = 3.0;
    const Vector2d end = m_sheet(ray.points.back());
    line("end", {end + Vector2d(-arm, -arm), end + Vector2d(arm, arm)});
    line("end", {end + Vector2d(-arm, arm), end + Vector2d(arm, -arm)});
  }

  void paint_station(std::size_t number, const std::optional<StationLabel>& label) {
    const DrawnStation& station = m_view.stations[number];
    m_xml.open("g", {{"id", fmt::format("{}{}", m_id_prefix, number + 1)},
                     {"class", fmt::format("station does-{}", station.does)}});
    m_xml.words("title", {}, fmt::format("{} {}", number + 1, station.name));
    if (m_sheet.shows(number))
      paint_surface(station);
    if (label)
      paint_label(*label);
    m_xml.close();
  }

  void paint_surface(const DrawnStation& station) {
    if (seen_obliquely(station))
      line("outline", m_sheet(station.outline));
    if (station.does == "stop")
      return paint_stop(station);
    for (const analysis::Polyline& piece : station.section)
      line(kind_of(station), m_sheet(piece));
    for (const analysis::Polyline& piece : station.rear)
      line("surface", m_sheet(piece));
    if (station.does == "reflect" && station.rear.empty())
      for (const analysis::Polyline& piece : station.section)
        paint_hatch(m_sheet(piece), m_sheet(station.normal).normalized());
  }

  [[nodiscard]] bool seen_obliquely(const DrawnStation& station) const {
    constexpr double edge_on = 0.14;
    return std::abs(station.normal[static_cast<int>(m_view.along)]) > edge_on;
  }

  static std::string kind_of(const analysis::DrawnGlass& body) {
    return body.front == body.rear ? fmt::format("glass plate-{}", body.front + 1)
                                   : fmt::format("glass between-{}-{}", body.front + 1, body.rear + 1);
  }

  static const char* kind_of(const DrawnStation& station) {
    if (station.does == "reflect")
      return "mirror";
    if (station.does == "detect")
      return "sensor";
    return station.does == "refract" ? "surface" : "element";
  }

  /// Jaws outside the opening, and what stands in its middle.
  void paint_stop(const DrawnStation& station) {
    constexpr double jaw = 15.0;
    if (station.section.empty() || station.section.front().empty())
      return;
    const Vector2d low = m_sheet(station.section.front().front());
    const Vector2d high = m_sheet(station.section.back().back());
    const Vector2d outward = (high - low).normalized();
    if (!station.outline.empty()) {
      line("stop", {high, high + jaw * outward});
      line("stop", {low, low - jaw * outward});
    }
    if (station.section.size() > 1)
      line("stop", {m_sheet(station.section.front().back()), m_sheet(station.section.back().front())});
  }

  /// Short strokes behind a mirror.
  void paint_hatch(const std::vector<Vector2d>& points, const Vector2d& behind) {
    constexpr double spacing = 7.0;
    constexpr double length = 6.0;
    constexpr double longest = 1e4;
    std::string strokes;
    double next = 0.5 * spacing;
    for (std::size_t i = 1; i < points.size(); ++i) {
      const Vector2d step = points[i] - points[i - 1];
      if (!(step.norm() < longest))
        return;
      const int count = std::max(0, static_cast<int>(std::floor((step.norm() - next) / spacing)) + 1);
      for (int stroke = 0; stroke < count; ++stroke) {
        const Vector2d foot = points[i - 1] + (next + stroke * spacing) * step.normalized();
        strokes += path_of({foot, foot + length * (behind + 0.7 * step.normalized())});
      }
      next += count * spacing - step.norm();
    }
    if (!strokes.empty())
      m_xml.leaf("path", {{"class", "hatch"}, {"d", strokes}});
  }

  void paint_label(const StationLabel& label) {
    line("leader", label.leader);
    for (const Vector2d& point : label.leader)
      m_extent.add(point);
    m_extent.add(label.box);
    const std::string place =
        fmt::format("translate({} {})", coordinate(label.foot[0]), coordinate(label.foot[1]));
    const std::string turn =
        label.turn_deg == 0.0 ? std::string() : fmt::format(" rotate({})", coordinate(-label.turn_deg));
    m_xml.open("text", {{"transform", place + turn}});
    m_xml.words("tspan", {{"class", "number"}}, label.number);
    if (!label.name.empty())
      m_xml.words("tspan", {{"dx", "4"}}, label.name);
    m_xml.close();
  }

  /// Numbers with their names, in columns below the view.
  void paint_key() {
    constexpr double column_width = 240.0;
    const int columns = static_cast<int>((paper_width - 2.0 * margin) / column_width);
    const Box above = m_extent.box;
    const int rows = (static_cast<int>(m_view.stations.size()) + columns - 1) / columns;
    for (std::size_t i = 0; i < m_view.stations.size(); ++i) {
      const int column = static_cast<int>(i) / rows;
      const int row = static_cast<int>(i) % rows;
      const Vector2d foot(above.low[0] + column_width * column, above.high[1] + line_height * (2 + row));
      m_extent.add(Box{foot - Vector2d(0.0, text_height), foot + Vector2d(column_width, 4.0)});
      m_xml.open("text", {{"x", coordinate(foot[0])}, {"y", coordinate(foot[1])}});
      m_xml.words("tspan", {{"class", "number"}}, std::to_string(i + 1));
      m_xml.words("tspan", {{"dx", "4"}}, shortened(on_one_line(m_view.stations[i].name), 30));
      m_xml.close();
    }
  }

  const DrawnView& m_view;
  Sheet m_sheet;
  std::string m_id_prefix;
  Xml m_xml;
  Extent m_extent;
};

double scale_for(const Drawing& drawing) {
  const double height = drawing.views.size() > 1 ? most_height_of_many : most_height;
  double scale = INFINITY;
  for (const DrawnView& view : drawing.views) {
    const Vector2d size = framing(view).extent.size();
    scale = std::min(
        {scale, (paper_width - 4.0 * margin) / std::max(size[0], 1e-6), height / std::max(size[1], 1e-6)});
  }
  return std::clamp(scale, 1e-12, 1e12);
}

/// The longest of 1, 2, 5 times a power of ten that takes no more than some px.
double scale_bar_mm(double px_per_mm) {
  constexpr double most_px = 180.0;
  const double power = std::pow(10.0, std::floor(std::log10(most_px / px_per_mm)));
  for (const double multiple : {5.0, 2.0})
    if (multiple * power * px_per_mm <= most_px)
      return multiple * power;
  return power;
}

class Painter {
public:
  Painter(const std::string& title, const Drawing& drawing)
      : m_title(title), m_drawing(drawing), m_scale(scale_for(drawing)) {}

  std::string svg() {
    text(margin, 26.0, m_title, "title");
    m_height = 36.0;
    for (const DrawnView& view : m_drawing.views)
      paint_view(view);
    paint_legend();
    return document();
  }

private:
  void text(double x, double y, std::string_view words, const char* kind = "note") {
    m_xml.words("text", {{"class", kind}, {"x", coordinate(x)}, {"y", coordinate(y)}}, words);
  }

  void paint_view(const DrawnView& view) {
    const std::string prefix = m_drawing.views.size() > 1 ? fmt::format("{}-", name_of(view.along)) : "";
    const Panel panel = ViewPainter(view, m_scale, prefix).paint();
    const Box& box = panel.extent.box;
    m_width = std::max(m_width, panel.extent.size()[0] + 2.0 * margin);
    const double x = 0.5 * (m_width - panel.extent.size()[0]) - box.low[0];
    m_xml.open("g", {{"class", fmt::format("view along-{}", name_of(view.along))},
                     {"transform",
                      fmt::format("translate({} {})", coordinate(x), coordinate(m_height - box.low[1]))}});
    m_xml.raw(panel.markup).close();
    m_height += panel.extent.size()[1] + 1.5 * line_height;
    text(margin, m_height, describe_view(view.along));
    m_height += line_height;
  }

  /// The scale bar, and which line is which field.
  void paint_legend() {
    const double length = scale_bar_mm(m_scale);
    const double px = length * m_scale;
    m_xml.leaf("path", {{"class", "scale"},
                        {"d", fmt::format("M{0} {1}v8m0 -4h{2}m0 -4v8", coordinate(margin),
                                          coordinate(m_height), coordinate(px))}});
    text(margin + px + 8.0, m_height + 8.0, fmt::format("{} mm", plain(length)));
    double x = margin + px + 90.0;
    const auto entry = [&](const std::string& kind, const std::string& words) {
      if (x + 40.0 + text_width(words) > m_width - margin) {
        x = margin;
        m_height += line_height;
      }
      m_xml.leaf("path", {{"class", kind},
                          {"d", fmt::format("M{} {}h28", coordinate(x), coordinate(m_height + 4.0))}});
      text(x + 34.0, m_height + 8.0, words);
      x += 34.0 + text_width(words) + 20.0;
    };
    for (std::size_t i = 0; i < m_drawing.fields.size(); ++i)
      entry(fmt::format("ray field{}", i % line_kinds), field_words(i));
    if (has_ghost())
      entry("ghost", "ghost");
    if (ends_early()) {
      m_xml.leaf("path", {{"class", "end"},
                          {"d", fmt::format("M{} {}l6 6m0 -6l-6 6", coordinate(x + 10.0),
                                            coordinate(m_height + 1.0))}});
      text(x + 22.0, m_height + 8.0, "does not get through");
    }
    m_height += line_height;
  }

  [[nodiscard]] std::string field_words(std::size_t field) const {
    std::string words = m_drawing.fields[field]
                            ? fmt::format("field {}", on_one_line(*m_drawing.fields[field]))
                            : fmt::format("field {}", field + 1);
    if (field == 0)
      words += fmt::format(", {} nm", plain(m_drawing.wavelength_nm));
    return words;
  }

  [[nodiscard]] bool has_ghost() const {
    return std::ranges::any_of(m_drawing.views,
                               [](const DrawnView& view) { return !view.ghost_rays.empty(); });
  }

  [[nodiscard]] bool ends_early() const {
    return std::ranges::any_of(m_drawing.views, [](const DrawnView& view) {
      return std::ranges::any_of(view.rays, [](const DrawnRay& ray) { return ray.end != RayEnd::arrived; });
    });
  }

  [[nodiscard]] std::string document() const {
    Xml xml;
    xml.open("svg", {{"xmlns", "http://www.w3.org/2000/svg"},
                     {"viewBox", fmt::format("0 0 {} {}", coordinate(m_width), coordinate(m_height + 6.0))},
                     {"class", "drawing"},
                     {"role", "img"}});
    xml.words("title", {}, fmt::format("{}: the train to scale", m_title));
    xml.words("desc", {},
              fmt::format("{} stations with rays of {} fields", m_drawing.views.front().stations.size(),
                          m_drawing.fields.size()));
    xml.raw("<style>\n").raw(drawing_style()).raw("</style>\n");
    xml.leaf("rect", {{"class", "paper"}, {"width", "100%"}, {"height", "100%"}});
    xml.raw(m_xml.text()).close();
    return xml.text();
  }

  const std::string& m_title;
  const Drawing& m_drawing;
  double m_scale;
  double m_width = paper_width;
  double m_height = 0.0;
  Xml m_xml;
};

} // namespace

std::string ray_path(const Drawing& drawing, const DrawnView& view, const DrawnRay& ray) {
  return path_of(Sheet(view, scale_for(drawing))(ray.points));
}

std::string drawing_svg(const std::string& title, const Drawing& drawing) {
  return Painter(title, drawing).svg();
}

} // namespace lightledger::report
