#pragma once

#include "drawing_sheet.hpp"

namespace lightledger::report {

/// The name of a station on the drawing.
struct StationLabel {
  std::string number; ///< `3`, or `1, 3` of a surface met again
  std::string name;   ///< empty where it stands in the key
  Vector2d foot;      ///< where the text starts, on its foot line
  double turn_deg;    ///< anticlockwise
  std::vector<Vector2d> leader;
  Box box; ///< around the text
};

struct Labels {
  std::vector<std::optional<StationLabel>> stations; ///< none for a surface met again
  bool keyed = false; ///< names did not find room: a key beside the drawing tells them
};

/// Places numbers and names of all stations of a view so that none covers another: above a train that runs
/// straight across the paper in a row, else each near its station.
[[nodiscard]] Labels label(const analysis::DrawnView& view, const Sheet& sheet);

} // namespace lightledger::report
