#pragma once

#include "colour.hpp"

#include <cstddef>
#include <string>
#include <string_view>
#include <vector>

namespace lightledger::report {

enum class Anchor { start, middle, end };

/// A raster picture, white at first; x to the right, y downward. What falls outside is not drawn.
class Canvas {
public:
  Canvas(int width, int height);

  [[nodiscard]] int width() const { return m_width; }
  [[nodiscard]] int height() const { return m_height; }
  [[nodiscard]] Colour at(int x, int y) const;

  void dot(int x, int y, Colour colour);
  void fill(int x, int y, int width, int height, Colour colour);
  /// The one-dot outline around a rectangle, outside of it.
  void outline(int x, int y, int width, int height, Colour colour);

  /// A line of UTF-8 text, its foot line at `y`, each dot of the typeface `size` dots wide.
  void text(int x, int y, std::string_view words, int size, Anchor anchor, Colour colour);
  /// The same running upward, its foot line at `x`.
  void text_upward(int x, int y, std::string_view words, int size, Anchor anchor, Colour colour);

  /// The bytes of a PNG file.
  [[nodiscard]] std::string png() const;

private:
  template <typename Place>
  void write(std::string_view words, int size, Anchor anchor, Place place);

  int m_width, m_height;
  std::vector<Colour> m_dots;
};

} // namespace lightledger::report
