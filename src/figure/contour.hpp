// Lines of equal height through values on a grid.
#pragma once

#include <vector>

#include "steelyard/figure.hpp"

namespace steelyard::figure {

/// Values at the crossings of `xs` and `ys` (each ascending, at least two); y runs fastest.
struct Grid {
  std::vector<double> xs, ys;
  std::vector<double> values;

  [[nodiscard]] double at(std::size_t i, std::size_t j) const { return values[i * ys.size() + j]; }
};

/// Where the values cross `level`: marching squares with straight pieces, joined to lines; a closed line
/// repeats its first point. Values must not be NaN.
[[nodiscard]] std::vector<Curve> contour_lines(const Grid& grid, double level);

/// Closed rings around the values above `level`; where the region meets the edge of the grid the ring runs
/// along it.
[[nodiscard]] std::vector<Curve> contour_rings(const Grid& grid, double level);

}  // namespace steelyard::figure
