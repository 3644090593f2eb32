#pragma once

#include <cstddef>
#include <string>
#include <vector>

namespace lightledger::report {

/// How the values of a map become colours.
///
/// `linear` covers the values from least to greatest, from zero where they are positive and reach down
/// towards it; `logarithmic` covers whole decades, at most nine below the greatest, and shows what is
/// smaller, zero too, in its lowest colour; `diverging` is symmetric about a light zero; `cyclic` closes on
/// itself over ±90, ±180 or 0 to 360, the first that holds all values.
enum class Scale { linear, logarithmic, diverging, cyclic };

/// A quantity over a rectangle, as one colour a cell.
struct MapPicture {
  std::string title;
  std::string quantity, unit; ///< of the values; both may be empty
  std::string x_label, y_label;
  double x_from = 0.0, x_to = 1.0; ///< outer edges of the first and last column
  double y_from = 0.0, y_to = 1.0; ///< outer edges of the first and last row
  std::size_t columns = 0, rows = 0;
  std::vector<double> values; ///< row by row, the row at y_from first; NaN where there is nothing
  Scale scale = Scale::linear;
};

/// The map as the bytes of a PNG file: true to scale up to a ratio of sides of 4, y upward, with title, axes,
/// the outline of the data, and a colour bar. Cells where nothing is are hatched. Maps of more than 1024
/// columns or rows show the mean over squares of cells. The colours are even steps to the eye, their
/// lightness is monotone (of the cyclic one on each half), and they run between blue and yellow, so that
/// colour-blind readers tell them apart.
[[nodiscard]] std::string png(const MapPicture& map);

} // namespace lightledger::report
