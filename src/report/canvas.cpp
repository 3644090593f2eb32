#include "canvas.hpp"

#include "bitmap_font.hpp"
#include "utf8.hpp"

#include <algorithm>
#include <stdexcept>

#define STB_IMAGE_WRITE_IMPLEMENTATION
#define STB_IMAGE_WRITE_STATIC
#include <stb/stb_image_write.h>

namespace lightledger::report {
namespace {

constexpr Colour white{255, 255, 255};

void append(void* bytes, void* data, int size) {
  static_cast<std::string*>(bytes)->append(static_cast<const char*>(data), static_cast<std::size_t>(size));
}

} // namespace

Canvas::Canvas(int width, int height)
    : m_width(width), m_height(height),
      m_dots(static_cast<std::size_t>(width) * static_cast<std::size_t>(height), white) {}

Colour Canvas::at(int x, int y) const {
  return m_dots[static_cast<std::size_t>(y) * static_cast<std::size_t>(m_width) +
                static_cast<std::size_t>(x)];
}

void Canvas::dot(int x, int y, Colour colour) {
  if (x >= 0 && x < m_width && y >= 0 && y < m_height)
    m_dots[static_cast<std::size_t>(y) * static_cast<std::size_t>(m_width) + static_cast<std::size_t>(x)] =
        colour;
}

void Canvas::fill(int x, int y, int width, int height, Colour colour) {
  for (int row = y; row < y + height; ++row)
    for (int column = x; column < x + width; ++column)
      dot(column, row, colour);
}

void Canvas::outline(int x, int y, int width, int height, Colour colour) {
  fill(x - 1, y - 1, width + 2, 1, colour);
  fill(x - 1, y + height, width + 2, 1, colour);
  fill(x - 1, y - 1, 1, height + 2, colour);
  fill(x + width, y - 1, 1, height + 2, colour);
}

/// Calls `place(along, above)` for every dot, in steps of `size` from the anchor and up from the foot line.
template <typename Place>
void Canvas::write(std::string_view words, int size, Anchor anchor, Place place) {
  const int length = dots_across(words);
  int along = anchor == Anchor::start ? 0 : anchor == Anchor::middle ? -length / 2 : -length;
  while (!words.empty()) {
    const Character next = first_character(words);
    const Glyph& shape = glyph(next.code);
    for (int row = 0; row < Glyph::height; ++row)
      for (int column = 0; column < shape.width; ++column)
        if ((shape.rows[static_cast<std::size_t>(row)] >> (shape.width - 1 - column)) & 1)
          place(size * (along + column), size * (Glyph::above_line - row));
    along += shape.width + 1;
    words.remove_prefix(next.bytes);
  }
}

void Canvas::text(int x, int y, std::string_view words, int size, Anchor anchor, Colour colour) {
  write(words, size, anchor, [&](int along, int above) { fill(x + along, y - above, size, size, colour); });
}

void Canvas::text_upward(int x, int y, std::string_view words, int size, Anchor anchor, Colour colour) {
  write(words, size, anchor,
        [&](int along, int above) { fill(x - above, y - along - size, size, size, colour); });
}

std::string Canvas::png() const {
  static_assert(sizeof(Colour) == 3);
  std::string bytes;
  if (stbi_write_png_to_func(append, &bytes, m_width, m_height, 3, m_dots.data(), 3 * m_width) == 0)
    throw std::runtime_error("a picture could not be encoded");
  return bytes;
}

} // namespace lightledger::report
