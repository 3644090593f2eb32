#include "bitmap_font.hpp"
#include "canvas.hpp"
#include "colour_scale.hpp"
#include "display_width.hpp"

#include <lightledger/report/picture.hpp>

#include <algorithm>
#include <cmath>
#include <limits>

namespace lightledger::report {
namespace {

constexpr Colour ink{34, 34, 34};
constexpr Colour faint{200, 200, 200};

constexpr int text_size = 2;
constexpr int line_height = 24;
constexpr int margin = 20;
constexpr int tick_length = 6;
constexpr int longest_side = 560;
constexpr int shortest_side = 140;
constexpr int bar_width = 22;
constexpr int gap_to_number = tick_length + 6;
constexpr std::size_t most_cells = 1024;

/// The map with no more cells than a picture can show.
struct Grid {
  std::size_t columns, rows;
  std::vector<double> values;
};

double mean_of_cells(const MapPicture& map, std::size_t column, std::size_t row, std::size_t size) {
  double sum = 0.0;
  std::size_t count = 0;
  for (std::size_t y = row; y < std::min(row + size, map.rows); ++y)
    for (std::size_t x = column; x < std::min(column + size, map.columns); ++x) {
      const std::size_t place = y * map.columns + x;
      if (place >= map.values.size() || !std::isfinite(map.values[place]))
        continue;
      sum += map.values[place];
      ++count;
    }
  return count > 0 ? sum / static_cast<double>(count) : std::numeric_limits<double>::quiet_NaN();
}

Grid thinned(const MapPicture& map) {
  const std::size_t size = (std::max(map.columns, map.rows) + most_cells - 1) / most_cells;
  if (size == 0 || map.columns == 0 || map.rows == 0)
    return {1, 1, {std::numeric_limits<double>::quiet_NaN()}};
  Grid grid{(map.columns + size - 1) / size, (map.rows + size - 1) / size, {}};
  for (std::size_t row = 0; row < grid.rows; ++row)
    for (std::size_t column = 0; column < grid.columns; ++column)
      grid.values.push_back(mean_of_cells(map, size * column, size * row, size));
  return grid;
}

std::vector<Tick> x_ticks(Interval x, int width) {
  return linear_ticks(x, width / 90);
}

std::vector<Tick> y_ticks(Interval y, int height) {
  return linear_ticks(y, height / 70);
}

/// The rectangle of the data on the canvas.
struct Area {
  int left, top, width, height;

  [[nodiscard]] int right() const { return left + width; }
  [[nodiscard]] int bottom() const { return top + height; }
};

int room_for(const std::vector<Tick>& ticks) {
  int widest = 0;
  for (const Tick& tick : ticks)
    widest = std::max(widest, text_size * dots_across(tick.label));
  return gap_to_number + widest;
}

/// Sides true to scale where that is not too slender, else as near as it may be.
Area area_of(Interval x, Interval y) {
  const double ratio = std::clamp(y.length() / x.length(), 0.25, 4.0);
  const double wide = ratio > 1.0 ? longest_side / ratio : longest_side;
  const int width = std::max(static_cast<int>(std::lround(wide)), shortest_side);
  const int height = std::max(static_cast<int>(std::lround(wide * ratio)), shortest_side);
  return {margin + line_height + room_for(y_ticks(y, height)), margin + 2 * line_height, width, height};
}

class Drawing {
public:
  explicit Drawing(const MapPicture& map)
      : m_map(map), m_x(drawable({map.x_from, map.x_to})), m_y(drawable({map.y_from, map.y_to})),
        m_grid(thinned(map)), m_scale(map.scale, m_grid.values), m_area(area_of(m_x, m_y)),
        m_bar_ticks(m_scale.ticks(m_area.height / 60)),
        m_canvas(m_area.right() + 3 * margin + bar_width + room_for(m_bar_ticks) + line_height,
                 m_area.bottom() + margin + 3 * line_height) {}

  std::string png() {
    draw_cells();
    draw_title();
    draw_x_axis();
    draw_y_axis();
    draw_bar();
    return m_canvas.png();
  }

private:
  void draw_cells() {
    for (int y = 0; y < m_area.height; ++y)
      for (int x = 0; x < m_area.width; ++x) {
        const double value = value_under(x, y);
        m_canvas.dot(m_area.left + x, m_area.top + y,
                     std::isfinite(value) ? m_scale.at_place(m_scale.place(value)) : nothing_at(x, y));
      }
    m_canvas.outline(m_area.left, m_area.top, m_area.width, m_area.height, ink);
  }

  [[nodiscard]] double value_under(int x, int y) const {
    const auto cell = [](int dot, int dots, std::size_t cells) {
      return std::min(static_cast<std::size_t>(dot) * cells / static_cast<std::size_t>(dots), cells - 1);
    };
    const std::size_t column = cell(x, m_area.width, m_grid.columns);
    const std::size_t row = cell(m_area.height - 1 - y, m_area.height, m_grid.rows);
    return m_grid.values[row * m_grid.columns + column];
  }

  [[nodiscard]] static Colour nothing_at(int x, int y) {
    constexpr int spacing = 8;
    return (x + y) % spacing == 0 ? faint : Colour{255, 255, 255};
  }

  void draw_title() {
    const int room = (m_canvas.width() - 2 * margin) / (6 * text_size);
    m_canvas.text(margin, margin + line_height - 6, shortened(on_one_line(m_map.title), room), text_size,
                  Anchor::start, ink);
  }

  void draw_x_axis() {
    const int foot = m_area.bottom() + tick_length + line_height - 4;
    for (const Tick& tick : x_ticks(m_x, m_area.width)) {
      const int x = m_area.left + dots((tick.value - m_x.from) / m_x.length(), m_area.width);
      m_canvas.fill(x, m_area.bottom() + 1, 1, tick_length, ink);
      m_canvas.text(x, foot, tick.label, text_size, Anchor::middle, ink);
    }
    m_canvas.text(m_area.left + m_area.width / 2, foot + line_height, on_one_line(m_map.x_label), text_size,
                  Anchor::middle, ink);
  }

  void draw_y_axis() {
    for (const Tick& tick : y_ticks(m_y, m_area.height)) {
      const int y = m_area.bottom() - 1 - dots((tick.value - m_y.from) / m_y.length(), m_area.height);
      m_canvas.fill(m_area.left - 1 - tick_length, y, tick_length, 1, ink);
      m_canvas.text(m_area.left - gap_to_number, y + 7, tick.label, text_size, Anchor::end, ink);
    }
    m_canvas.text_upward(margin + 16, m_area.top + m_area.height / 2, on_one_line(m_map.y_label), text_size,
                         Anchor::middle, ink);
  }

  void draw_bar() {
    const Area bar{m_area.right() + 2 * margin, m_area.top, bar_width, m_area.height};
    for (int y = 0; y < bar.height; ++y)
      m_canvas.fill(bar.left, bar.bottom() - 1 - y, bar.width, 1,
                    m_scale.at_place(static_cast<double>(y) / (bar.height - 1)));
    m_canvas.outline(bar.left, bar.top, bar.width, bar.height, ink);
    for (const Tick& tick : m_bar_ticks) {
      const double place = (tick.value == m_scale.range().to) ? 1.0 : m_scale.place(tick.value);
      const int y = bar.bottom() - 1 - dots(place, bar.height);
      m_canvas.fill(bar.right() + 1, y, tick.label.empty() ? tick_length / 2 : tick_length, 1, ink);
      m_canvas.text(bar.right() + gap_to_number, y + 7, tick.label, text_size, Anchor::start, ink);
    }
    m_canvas.text_upward(m_canvas.width() - margin, bar.top + bar.height / 2, words_of_bar(), text_size,
                         Anchor::middle, ink);
  }

  [[nodiscard]] std::string words_of_bar() const {
    std::string words = on_one_line(m_map.quantity);
    if (!m_map.unit.empty())
      words.append(words.empty() ? "" : ", ").append(on_one_line(m_map.unit));
    return words;
  }

  [[nodiscard]] static int dots(double share, int all) {
    return static_cast<int>(std::lround(share * (all - 1)));
  }

  const MapPicture& m_map;
  Interval m_x, m_y;
  Grid m_grid;
  ColourScale m_scale;
  Area m_area;
  std::vector<Tick> m_bar_ticks;
  Canvas m_canvas;
};

} // namespace

std::string png(const MapPicture& map) {
  return Drawing(map).png();
}

} // namespace lightledger::report
