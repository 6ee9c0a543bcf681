// How far the printed digits let a Bayes factor move.
#pragma once

#include <functional>
#include <optional>

#include "steelyard/weigh.hpp"

namespace steelyard::weighing {

/// Smallest and largest value of `log_bf` over what the study's printed digits allow, stationary points
/// inside included: along the line between its two corners, or over the exact t values inside its bands.
/// Nothing when no digit is rounded.
[[nodiscard]] std::optional<LogRange> rounding_range(const Study& study, Direction direction,
                                                     const std::function<double(const Evidence&)>& log_bf);

}  // namespace steelyard::weighing
