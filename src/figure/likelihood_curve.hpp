// The shape of one study's likelihood as a curve.
#pragma once

#include "steelyard/figure.hpp"

namespace steelyard::figure {

/// Where a study's likelihood lives: the value it peaks at and how wide it is there.
struct Extent {
  double low = 0.0;
  double high = 0.0;
  std::vector<double> centres;  ///< where to look closely (two for an unknown sign)
  double width = 1.0;           ///< one standard error or so
};
[[nodiscard]] Extent extent(const Evidence& evidence);

/// exp(log likelihood) over [low, high], 1 at its highest point, with more points where it is steep.
[[nodiscard]] Curve likelihood_curve(const Study& study, double low, double high);

/// Any non-negative function over [low, high] in the same way.
template <class Function>
[[nodiscard]] Curve sampled(const Function& function, const std::vector<double>& at) {
  Curve out;
  double peak = 0.0;
  for (const double x : at) {
    out.push_back({x, function(x)});
    if (out.back().y > peak) peak = out.back().y;
  }
  if (!(peak > 0)) return {};
  for (Point& point : out) point.y /= peak;
  return out;
}

/// Evenly spread points and, around each centre, closer ones; ascending, all inside [low, high].
[[nodiscard]] std::vector<double> sample_points(double low, double high, const std::vector<double>& centres,
                                                double width);

}  // namespace steelyard::figure
