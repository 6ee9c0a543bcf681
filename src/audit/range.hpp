// Ranges of numbers as printed allow them, and functions of ranges.
#pragma once

#include <algorithm>
#include <array>
#include <cmath>
#include <cstddef>
#include <limits>

#include "steelyard/study.hpp"

namespace steelyard::auditing {

struct Range {
  double low = 0.0;
  double high = 0.0;
};

inline constexpr double infinity = std::numeric_limits<double>::infinity();

/// The values that an honest author may have had before printing: rounded half up or half to even, or cut
/// off (2.10 may stand for 2.109). A bound is taken as it stands.
[[nodiscard]] Range honest(const Printed& printed);

/// Whether two ranges meet, but for the rounding of our own arithmetic.
[[nodiscard]] inline bool meet(const Range& a, const Range& b) {
  const double slack = 1e-9 * (1.0 + std::min(std::abs(a.low), std::abs(b.low)));
  return a.low <= b.high + slack && b.low <= a.high + slack;
}

[[nodiscard]] inline Range join(const Range& a, const Range& b) {
  return {std::min(a.low, b.low), std::max(a.high, b.high)};
}
[[nodiscard]] inline Range times(const Range& a, double factor) {
  return factor < 0.0 ? Range{a.high * factor, a.low * factor} : Range{a.low * factor, a.high * factor};
}
[[nodiscard]] inline Range negate(const Range& a) { return {-a.high, -a.low}; }
/// |x| for x in the range.
[[nodiscard]] inline Range size(const Range& a) {
  if (a.low >= 0.0) return a;
  if (a.high <= 0.0) return negate(a);
  return {0.0, std::max(-a.low, a.high)};
}

/// Range of f over a box, for an f that is monotone in each argument while the others stand still: its
/// extremes lie at corners. Corners where f isn't finite count as an open end.
template <std::size_t N, class F>
[[nodiscard]] Range over(const std::array<Range, N>& box, F f) {
  Range result{infinity, -infinity};
  for (std::size_t corner = 0; corner < (std::size_t{1} << N); ++corner) {
    std::array<double, N> x{};
    for (std::size_t i = 0; i < N; ++i) x[i] = (corner >> i & 1U) != 0 ? box[i].high : box[i].low;
    const double value = f(x);
    if (std::isnan(value)) return {-infinity, infinity};
    result = {std::min(result.low, value), std::max(result.high, value)};
  }
  return result;
}

}  // namespace steelyard::auditing
