#pragma once

#include "colour.hpp"
#include "ticks.hpp"

#include <lightledger/report/picture.hpp>

#include <span>
#include <vector>

namespace lightledger::report {

/// The way from values to colours, fitted to the finite ones among them.
class ColourScale {
public:
  ColourScale(Scale scale, std::span<const double> values);

  [[nodiscard]] Interval range() const { return m_range; }
  /// The place of a finite value on the colour bar, 0 at its foot, 1 at its head.
  [[nodiscard]] double place(double value) const;
  [[nodiscard]] Colour at_place(double place) const { return m_map->at(place); }
  [[nodiscard]] std::vector<Tick> ticks(int about) const;

private:
  Scale m_scale;
  Interval m_range;
  const ColourMap* m_map;
};

} // namespace lightledger::report
