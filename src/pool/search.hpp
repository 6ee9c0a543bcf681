// Finding where a log integrand lives: its peaks, and the interval outside which it doesn't count.
#pragma once

#include <functional>
#include <limits>
#include <span>
#include <vector>

namespace steelyard::pool_room {

/// The part of the axis that an integral needs, and where its integrand is largest.
struct Window {
  double low = 0.0;
  double high = 0.0;
  double best = 0.0;  ///< where the integrand is largest (to a fraction of its width)
  double log_best = -std::numeric_limits<double>::infinity();
  double width = 1.0;  ///< standard deviation of the Normal shape that fits the peak
  std::size_t evaluations = 0;
};

/// What a search needs to know.
struct SearchSpace {
  double low = -std::numeric_limits<double>::infinity();  ///< the integrand is −infinity outside
  double high = std::numeric_limits<double>::infinity();
  std::vector<double> start;  ///< points to look at first: every feature must have one within reach
  double drop = 36.0;         ///< nats below the peak beyond which the integrand doesn't count
  std::function<void(std::span<const double>, std::span<double>)> log_integrand;
};

/// Looks at the starting points, widens until the integrand has fallen on both sides (counting its distance
/// from the peak, so that algebraic tails are followed far enough), closes in on every peak that matters,
/// and trims. Works for several peaks as long as each is seen from a starting point.
[[nodiscard]] Window find_window(const SearchSpace& space);

}  // namespace steelyard::pool_room
