#include "chart_style.hpp"

#include <fmt/format.h>

#include <array>

namespace lightledger::report {
namespace {

/// A series on light and on dark paper, and its dashes.
struct SeriesStyle {
  const char* on_light;
  const char* on_dark;
  const char* dashes;
};

/// The colours of Okabe & Ito (2008), those that would fade shifted in lightness alone.
constexpr std::array<SeriesStyle, series_kinds> series{{{"#0072b2", "#56b4e9", "none"},
                                                        {"#d55e00", "#ff8c42", "7 3"},
                                                        {"#009e73", "#2cc79b", "2 3"},
                                                        {"#b0568a", "#e79cc5", "10 3 2 3"},
                                                        {"#b87d00", "#e69f00", "5 2 1 2 1 2"},
                                                        {"#2d88bd", "#9ad1f3", "14 4"},
                                                        {"#857b00", "#f0e442", "1 2"},
                                                        {"#333333", "#dddddd", "4 4"}}};

constexpr const char* on_light = R"(.chart{font:13px system-ui,"DejaVu Sans",sans-serif}
.chart text{fill:#1c2431}
.chart .title{font-size:15px;font-weight:600}
.chart .paper{fill:#ffffff}
.chart .frame{fill:none;stroke:#1c2431}
.chart .grid{stroke:#dfe3ea}
.chart .mark{stroke:#5b6676;stroke-dasharray:2 2}
.chart .marked{font-size:11px}
.chart .series{fill:none;stroke-width:2;stroke-linejoin:round}
)";

constexpr const char* on_dark = R"(.chart text{fill:#e7eaf0}
.chart .paper{fill:#141922}
.chart .frame{stroke:#e7eaf0}
.chart .grid{stroke:#323b4a}
.chart .mark{stroke:#a3adbd}
)";

} // namespace

std::string chart_style() {
  std::string light = on_light;
  std::string dark = on_dark;
  for (std::size_t i = 0; i < series.size(); ++i) {
    light += fmt::format(".chart .series{}{{stroke:{};stroke-dasharray:{}}}\n", i, series[i].on_light,
                         series[i].dashes);
    dark += fmt::format(".chart .series{}{{stroke:{}}}\n", i, series[i].on_dark);
  }
  return light + "@media screen and (prefers-color-scheme:dark){\n" + dark + "}\n";
}

} // namespace lightledger::report
