#include "svg_style.hpp"

#include <fmt/format.h>

#include <array>

namespace lightledger::report {
namespace {

/// A line on light and on dark paper, and its dashes.
struct LineStyle {
  const char* on_light;
  const char* on_dark;
  const char* dashes;
};

/// The colours of Okabe & Ito (2008), those that would fade shifted in lightness alone.
constexpr std::array<LineStyle, line_kinds> lines{{{"#0072b2", "#56b4e9", "none"},
                                                   {"#d55e00", "#ff8c42", "7 3"},
                                                   {"#009e73", "#2cc79b", "2 3"},
                                                   {"#b0568a", "#e79cc5", "10 3 2 3"},
                                                   {"#b87d00", "#e69f00", "5 2 1 2 1 2"},
                                                   {"#2d88bd", "#9ad1f3", "14 4"},
                                                   {"#857b00", "#f0e442", "1 2"},
                                                   {"#333333", "#dddddd", "4 4"}}};

constexpr const char* chart_on_light = R"(.chart{font:13px system-ui,"DejaVu Sans",sans-serif}
.chart text{fill:#1c2431}
.chart .title{font-size:15px;font-weight:600}
.chart .paper{fill:#ffffff}
.chart .frame{fill:none;stroke:#1c2431}
.chart .grid{stroke:#dfe3ea}
.chart .mark{stroke:#5b6676;stroke-dasharray:2 2}
.chart .marked{font-size:11px}
.chart .series{fill:none;stroke-width:2;stroke-linejoin:round}
)";

constexpr const char* chart_on_dark = R"(.chart text{fill:#e7eaf0}
.chart .paper{fill:#141922}
.chart .frame{stroke:#e7eaf0}
.chart .grid{stroke:#323b4a}
.chart .mark{stroke:#a3adbd}
)";

constexpr const char* drawing_on_light = R"(.drawing{font:12px system-ui,"DejaVu Sans",sans-serif}
.drawing text{fill:#1c2431}
.drawing .station text{paint-order:stroke;stroke:#ffffff;stroke-width:3px;stroke-linejoin:round}
.drawing .title{font-size:15px;font-weight:600}
.drawing .number{font-weight:600}
.drawing .paper{fill:#ffffff}
.drawing .glass{fill:#cfe1ef;fill-opacity:.72;stroke:#7d93a6;stroke-width:.8;stroke-linejoin:round}
.drawing .surface{fill:none;stroke:#3c5266;stroke-width:1.4;stroke-linecap:round}
.drawing .outline{fill:none;stroke:#3c5266;stroke-width:.6;stroke-dasharray:3 2}
.drawing .mirror,.drawing .stop,.drawing .sensor{fill:none;stroke:#1c2431;stroke-width:2.4;stroke-linecap:round}
.drawing .hatch{fill:none;stroke:#1c2431;stroke-width:.8}
.drawing .element{fill:none;stroke:#6b4e8e;stroke-width:2.6;stroke-dasharray:6 2}
.drawing .leader{fill:none;stroke:#8a95a3;stroke-width:.7}
.drawing .axis{fill:none;stroke:#8a95a3;stroke-width:.7;stroke-dasharray:12 3 2 3}
.drawing .ray{fill:none;stroke-width:1;stroke-linejoin:round}
.drawing .end{fill:none;stroke:#1c2431;stroke-width:1.1}
.drawing .ghost{fill:none;stroke:#d55e00;stroke-width:1.5}
.drawing .dimmed .ray{stroke-opacity:.3}
.drawing .scale{fill:none;stroke:#1c2431;stroke-width:1.4}
)";

constexpr const char* drawing_on_dark = R"(.drawing text{fill:#e7eaf0}
.drawing .station text{stroke:#141922}
.drawing .paper{fill:#141922}
.drawing .glass{fill:#2b4358;stroke:#7d93a6}
.drawing .surface,.drawing .outline{stroke:#a9c0d4}
.drawing .mirror,.drawing .stop,.drawing .sensor,.drawing .hatch,.drawing .end,.drawing .scale{stroke:#e7eaf0}
.drawing .element{stroke:#c3a6e8}
.drawing .leader,.drawing .axis{stroke:#76818f}
.drawing .ghost{stroke:#ff8c42}
)";

/// The rules of one kind of picture, `picture` its class and `line` that of its numbered lines.
std::string style(const char* picture, const char* line, std::string light, std::string dark) {
  for (std::size_t i = 0; i < lines.size(); ++i) {
    light += fmt::format(".{} .{}{}{{stroke:{};stroke-dasharray:{}}}\n", picture, line, i, lines[i].on_light,
                         lines[i].dashes);
    dark += fmt::format(".{} .{}{}{{stroke:{}}}\n", picture, line, i, lines[i].on_dark);
  }
  return light + "@media screen and (prefers-color-scheme:dark){\n" + dark + "}\n";
}

} // namespace

std::string chart_style() {
  return style("chart", "series", chart_on_light, chart_on_dark);
}

std::string drawing_style() {
  return style("drawing", "field", drawing_on_light, drawing_on_dark);
}

} // namespace lightledger::report
