// How far the printed digits let the evidence move.
#pragma once

#include <optional>

#include "rebuild/route.hpp"

namespace steelyard::rebuilding {

struct Corners {
  std::optional<Evidence> low, high;
};

/// The evidence of the smallest and of the largest test statistic among the corners of the rounding bands of
/// the cells that the route used. A statistic is monotone in each input while the others stand still, so its
/// extremes over the box lie at corners. Absent when nothing is rounded, or at an open end.
[[nodiscard]] Corners corners(const Route& route, Numbers& x, const Solution& middle);

}  // namespace steelyard::rebuilding
