#pragma once

#include <optional>
#include <string>
#include <vector>

namespace lightledger::report {

/// A line of a chart. Where y is not finite the line is broken.
struct ChartSeries {
  std::string name;
  std::vector<double> x, y; ///< of equal length
};

struct ChartAxis {
  std::string title;
  std::string unit; ///< empty: none is written
  bool logarithmic = false;
  std::optional<double> from{}, to{}; ///< none: what the series need
};

/// A thin line across the whole chart with its words, as a limit or the light's wavelength.
struct ChartMark {
  double at;
  std::string label;
};

struct LineChart {
  std::string title;
  std::string description; ///< for those who cannot see it
  ChartAxis x, y;
  std::vector<ChartSeries> series;
  std::vector<ChartMark> marks_x, marks_y; ///< at a place on the x axis, on the y axis
  double width = 720.0, height = 420.0;    ///< of its view box, in px
};

/// The chart as an SVG document that follows the reader's light or dark setting. Text is text; series differ
/// by the colours of Okabe & Ito (2008) and by their dashes, and carry their names at their right ends.
[[nodiscard]] std::string svg(const LineChart& chart);

} // namespace lightledger::report
