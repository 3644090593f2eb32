#pragma once

#include <array>
#include <cstdint>
#include <span>

namespace lightledger::report {

/// sRGB, eight bits a channel.
struct Colour {
  std::uint8_t red, green, blue;
  friend bool operator==(const Colour&, const Colour&) = default;
};

/// A colour by its lightness L and its place on the green–red (a) and blue–yellow (b) axes of Oklab
/// (Ottosson, "A perceptual color space for image processing", 2020), in which equal distances look about
/// equal.
struct Oklab {
  double lightness, a, b;
};

[[nodiscard]] Colour to_srgb(const Oklab& colour);
[[nodiscard]] Oklab to_oklab(const Colour& colour);

/// Colours on a smooth curve through Oklab, walked at even speed.
class ColourMap {
public:
  static constexpr std::size_t steps = 256;

  /// A Catmull–Rom curve through the anchors.
  explicit ColourMap(std::span<const Oklab> anchors);

  /// The colour at a place from 0 to 1, ends held.
  [[nodiscard]] Colour at(double place) const;

private:
  std::array<Colour, steps> m_colours;
};

/// From dark blue over rose to pale straw; two hues about a light zero; a ring. Of our own making.
[[nodiscard]] const ColourMap& sequential_map();
[[nodiscard]] const ColourMap& diverging_map();
[[nodiscard]] const ColourMap& cyclic_map();

} // namespace lightledger::report
