// Extremes and zeros of functions of one number.
#pragma once

#include <array>
#include <cmath>
#include <cstddef>

namespace steelyard::weighing {

struct Extreme {
  double at = 0.0;
  double value = 0.0;
};

/// The largest value of `function` on [low, high]: a scan, then golden section around the best point. The
/// function must have one peak within two steps of the scan around its largest value.
template <class Function>
Extreme largest(Function&& function, double low, double high, int scan, int refinements) {
  const double step = (high - low) / scan;
  Extreme best{low, function(low)};
  for (int i = 1; i <= scan; ++i) {
    const double x = i == scan ? high : low + i * step;
    const double value = function(x);
    if (value > best.value) best = {x, value};
  }
  constexpr double golden = 0.61803398874989484820;
  double a = best.at - step > low ? best.at - step : low;
  double b = best.at + step < high ? best.at + step : high;
  Extreme left{b - golden * (b - a), 0.0};
  Extreme right{a + golden * (b - a), 0.0};
  left.value = function(left.at);
  right.value = function(right.at);
  for (int i = 0; i < refinements; ++i) {
    if (left.value < right.value) {
      a = left.at;
      left = right;
      right.at = a + golden * (b - a);
      right.value = function(right.at);
    } else {
      b = right.at;
      right = left;
      left.at = b - golden * (b - a);
      left.value = function(left.at);
    }
  }
  if (left.value > best.value) best = left;
  if (right.value > best.value) best = right;
  return best;
}

/// The zero of `function` between a and b, where it has opposite signs: Illinois' false position, at most
/// 60 steps, until the bracket is narrower than `tolerance`.
template <class Function>
double zero(Function&& function, double a, double fa, double b, double fb, double tolerance) {
  int side = 0;
  double x = b;
  for (int i = 0; i < 60 && std::abs(b - a) > tolerance; ++i) {
    x = std::abs(fb - fa) > 0.0 ? (fb * a - fa * b) / (fb - fa) : 0.5 * (a + b);
    const double fx = function(x);
    if (fx == 0.0) return x;
    if ((fx > 0.0) == (fb > 0.0)) {
      if (std::abs(x - b) < 0.25 * tolerance) return x;
      b = x;
      fb = fx;
      if (side == -1) fa *= 0.5;
      side = -1;
    } else {
      if (std::abs(x - a) < 0.25 * tolerance) return x;
      a = x;
      fa = fx;
      if (side == 1) fb *= 0.5;
      side = 1;
    }
  }
  return x;
}

}  // namespace steelyard::weighing
