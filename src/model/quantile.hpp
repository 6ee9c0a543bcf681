// Inverts a distribution function that has no closed inverse.
#pragma once

#include <cmath>

namespace steelyard::model {

/// The x in [low, high] at which the growing function `deviation` changes sign: a bracket around
/// [start − step, start + step], widened by doubling, then bisection down to neighbouring doubles.
/// Ends may be infinite.
template <class Deviation>
double invert(Deviation deviation, double low, double high, double start, double step) {
  double a = start - step > low ? start - step : low;
  double b = start + step < high ? start + step : high;
  for (double reach = 2.0 * step; a > low && deviation(a) > 0.0; reach *= 2.0) {
    b = a;
    a = start - reach > low ? start - reach : low;
    if (std::isinf(reach)) break;
  }
  for (double reach = 2.0 * step; b < high && deviation(b) < 0.0; reach *= 2.0) {
    a = b;
    b = start + reach < high ? start + reach : high;
    if (std::isinf(reach)) break;
  }
  for (int i = 0; i < 1100; ++i) {
    const double middle = a + 0.5 * (b - a);
    if (middle <= a || middle >= b) break;
    if (deviation(middle) < 0.0) {
      a = middle;
    } else {
      b = middle;
    }
  }
  return b;
}

}  // namespace steelyard::model
