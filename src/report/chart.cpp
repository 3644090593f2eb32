#include "display_width.hpp"
#include "svg_style.hpp"
#include "ticks.hpp"
#include "xml.hpp"

#include <lightledger/report/chart.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <numeric>
#include <span>

namespace lightledger::report {
namespace {

constexpr double character_width = 7.2; ///< of 13 px text, on the wide side
constexpr double line_height = 17.0;
constexpr double top_room = 34.0;
constexpr double bottom_room = 52.0;
constexpr double left_room = 74.0;
constexpr double most_label_room = 210.0;
constexpr double swatch = 20.0;
constexpr int most_label_characters = 24;

bool shown(double value, bool logarithmic) {
  return std::isfinite(value) && (!logarithmic || value > 0.0);
}

/// From values on an axis to places along it.
class Mapping {
public:
  /// `room` is left free beyond the values at both ends, as a share of their range.
  Mapping(const ChartAxis& axis, std::span<const double> values, double start, double end, double room)
      : m_logarithmic(axis.logarithmic), m_range(range_of(axis, values, room)), m_start(start), m_end(end) {}

  [[nodiscard]] double operator()(double value) const {
    const double share = m_logarithmic ? std::log(value / m_range.from) / std::log(m_range.to / m_range.from)
                                       : (value - m_range.from) / m_range.length();
    return m_start + share * (m_end - m_start);
  }
  [[nodiscard]] bool holds(double value) const { return value >= m_range.from && value <= m_range.to; }
  [[nodiscard]] std::vector<Tick> ticks(double spacing) const {
    const int about = std::max(2, static_cast<int>(std::abs(m_end - m_start) / spacing));
    return m_logarithmic ? decade_ticks(m_range, about) : linear_ticks(m_range, about);
  }

private:
  static Interval range_of(const ChartAxis& axis, std::span<const double> values, double room) {
    Interval range{INFINITY, -INFINITY};
    for (const double value : values)
      if (shown(value, axis.logarithmic))
        range = {std::min(range.from, value), std::max(range.to, value)};
    if (range.from > range.to)
      range = {0.1, 1.0};
    if (axis.logarithmic)
      return decades(axis, range);
    range = drawable(range);
    const double free = room * range.length();
    return drawable({axis.from.value_or(range.from - free), axis.to.value_or(range.to + free)});
  }

  static Interval decades(const ChartAxis& axis, Interval range) {
    const double first = std::max(std::floor(std::log10(range.from) + 1e-9), -300.0);
    const double last = std::max(std::ceil(std::log10(range.to) - 1e-9), first + 1.0);
    const double from = axis.from.value_or(std::pow(10.0, first));
    const double to = axis.to.value_or(std::pow(10.0, last));
    return from > 0.0 && to > from ? Interval{from, to} : Interval{0.1, 1.0};
  }

  bool m_logarithmic;
  Interval m_range;
  double m_start, m_end;
};

std::string words_of(const ChartAxis& axis) {
  return axis.unit.empty() ? axis.title : fmt::format("{}, {}", axis.title, axis.unit);
}

std::vector<double> all_values(const LineChart& chart, std::vector<double> ChartSeries::*values) {
  std::vector<double> all;
  for (const ChartSeries& series : chart.series)
    all.insert(all.end(), (series.*values).begin(), (series.*values).end());
  return all;
}

double label_room(const LineChart& chart) {
  int longest = 0;
  for (const ChartSeries& series : chart.series)
    longest = std::max(longest, std::min(display_width(on_one_line(series.name)), most_label_characters));
  return std::min(most_label_room, swatch + 16.0 + character_width * longest);
}

class Drawing {
public:
  explicit Drawing(const LineChart& chart)
      : m_chart(chart), m_left(left_room), m_right(chart.width - label_room(chart)), m_top(top_room),
        m_bottom(chart.height - bottom_room),
        m_x(chart.x, all_values(chart, &ChartSeries::x), m_left, m_right, 0.0),
        m_y(chart.y, all_values(chart, &ChartSeries::y), m_bottom, m_top, 0.04) {}

  std::string svg() {
    m_xml.open("svg",
               {{"xmlns", "http://www.w3.org/2000/svg"},
                {"viewBox", fmt::format("0 0 {} {}", coordinate(m_chart.width), coordinate(m_chart.height))},
                {"class", "chart"},
                {"role", "img"}});
    m_xml.words("title", {}, m_chart.title).words("desc", {}, m_chart.description);
    m_xml.raw("<style>\n").raw(chart_style()).raw("</style>\n");
    m_xml.leaf("rect", {{"class", "paper"}, {"width", "100%"}, {"height", "100%"}});
    m_xml.words("text", {{"class", "title"}, {"x", coordinate(m_left)}, {"y", "20"}}, m_chart.title);
    draw_axes();
    draw_marks();
    for (std::size_t i = 0; i < m_chart.series.size(); ++i)
      draw_series(i);
    draw_names();
    m_xml.close();
    return m_xml.text();
  }

private:
  void line(const char* kind, double x1, double y1, double x2, double y2) {
    m_xml.leaf("line", {{"class", kind},
                        {"x1", coordinate(x1)},
                        {"y1", coordinate(y1)},
                        {"x2", coordinate(x2)},
                        {"y2", coordinate(y2)}});
  }

  void text(double x, double y, const char* anchor, std::string_view words, const char* kind = "label") {
    m_xml.words("text",
                {{"class", kind}, {"x", coordinate(x)}, {"y", coordinate(y)}, {"text-anchor", anchor}},
                words);
  }

  void draw_axes() {
    for (const Tick& tick : m_x.ticks(80.0)) {
      line("grid", m_x(tick.value), m_top, m_x(tick.value), m_bottom);
      if (!tick.label.empty())
        text(m_x(tick.value), m_bottom + line_height, "middle", tick.label);
    }
    for (const Tick& tick : m_y.ticks(48.0)) {
      line("grid", m_left, m_y(tick.value), m_right, m_y(tick.value));
      if (!tick.label.empty())
        text(m_left - 7.0, m_y(tick.value) + 4.5, "end", tick.label);
    }
    m_xml.leaf("rect", {{"class", "frame"},
                        {"x", coordinate(m_left)},
                        {"y", coordinate(m_top)},
                        {"width", coordinate(m_right - m_left)},
                        {"height", coordinate(m_bottom - m_top)}});
    text(0.5 * (m_left + m_right), m_bottom + 2.2 * line_height, "middle", words_of(m_chart.x));
    const double middle = 0.5 * (m_top + m_bottom);
    m_xml.words("text",
                {{"x", "16"},
                 {"y", coordinate(middle)},
                 {"text-anchor", "middle"},
                 {"transform", fmt::format("rotate(-90 16 {})", coordinate(middle))}},
                words_of(m_chart.y));
  }

  void draw_marks() {
    for (const ChartMark& mark : m_chart.marks_x) {
      if (!m_x.holds(mark.at))
        continue;
      line("mark", m_x(mark.at), m_top, m_x(mark.at), m_bottom);
      text(m_x(mark.at) + 3.0, m_top + 11.0, "start", mark.label, "marked");
    }
    for (const ChartMark& mark : m_chart.marks_y) {
      if (!m_y.holds(mark.at))
        continue;
      line("mark", m_left, m_y(mark.at), m_right, m_y(mark.at));
      text(m_left + 4.0, m_y(mark.at) - 4.0, "start", mark.label, "marked");
    }
  }

  /// A path command for each point, a new start behind each gap.
  [[nodiscard]] std::string path_of(const ChartSeries& series) const {
    std::string path;
    bool running = false;
    for (std::size_t i = 0; i < std::min(series.x.size(), series.y.size()); ++i) {
      const bool here =
          shown(series.x[i], m_chart.x.logarithmic) && shown(series.y[i], m_chart.y.logarithmic);
      if (here)
        path += fmt::format("{}{} {}", running ? "L" : "M", coordinate(m_x(series.x[i])),
                            coordinate(std::clamp(m_y(series.y[i]), m_top - 1.0, m_bottom + 1.0)));
      running = here;
    }
    return path;
  }

  void draw_series(std::size_t number) {
    m_xml.leaf("path", {{"class", kind_of(number)}, {"d", path_of(m_chart.series[number])}});
  }

  [[nodiscard]] static std::string kind_of(std::size_t number) {
    return fmt::format("series series{}", number % line_kinds);
  }

  /// The height at which a series ends; in the middle for one without points.
  [[nodiscard]] double end_of(const ChartSeries& series) const {
    for (std::size_t i = std::min(series.x.size(), series.y.size()); i-- > 0;)
      if (shown(series.y[i], m_chart.y.logarithmic))
        return std::clamp(m_y(series.y[i]), m_top, m_bottom);
    return 0.5 * (m_top + m_bottom);
  }

  /// Heights of the names: near the ends of their lines, a line of text apart.
  [[nodiscard]] std::vector<double> heights_of_names(const std::vector<std::size_t>& order) const {
    std::vector<double> heights;
    double lowest = m_top;
    for (const std::size_t number : order) {
      heights.push_back(std::max(end_of(m_chart.series[number]), lowest));
      lowest = heights.back() + line_height;
    }
    double highest = m_bottom;
    for (std::size_t i = heights.size(); i-- > 0; highest -= line_height) {
      heights[i] = std::min(heights[i], highest);
      highest = heights[i];
    }
    return heights;
  }

  void draw_names() {
    std::vector<std::size_t> order(m_chart.series.size());
    std::iota(order.begin(), order.end(), std::size_t{0});
    std::ranges::stable_sort(order, {}, [&](std::size_t i) { return end_of(m_chart.series[i]); });
    const std::vector<double> heights = heights_of_names(order);
    for (std::size_t i = 0; i < order.size(); ++i) {
      line(kind_of(order[i]).c_str(), m_right + 6.0, heights[i], m_right + 6.0 + swatch, heights[i]);
      text(m_right + 12.0 + swatch, heights[i] + 4.5, "start",
           shortened(on_one_line(m_chart.series[order[i]].name), most_label_characters));
    }
  }

  const LineChart& m_chart;
  double m_left, m_right, m_top, m_bottom;
  Mapping m_x, m_y;
  Xml m_xml;
};

} // namespace

std::string svg(const LineChart& chart) {
  return Drawing(chart).svg();
}

} // namespace lightledger::report
