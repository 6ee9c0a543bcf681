// Adaptive Gauss-Kronrod quadrature of exp(g) for a log integrand g given in blocks.
#pragma once

#include <array>
#include <boost/math/quadrature/gauss_kronrod.hpp>
#include <cmath>
#include <cstddef>
#include <limits>
#include <span>
#include <vector>

#include "numeric/chebyshev.hpp"

namespace steelyard::numeric {

/// The outcome of a quadrature: all three are in units of exp(log_scale).
struct Quadrature {
  double value = 0.0;
  double error = 0.0;  ///< sum over panels of |31-point Kronrod − 15-point Gauss|: a bound in practice,
                       ///< because it is the error of the lower rule
  std::size_t evaluations = 0;
};

inline constexpr std::size_t kronrod_points = 31;
using KronrodArray = std::array<double, kronrod_points>;

struct KronrodRule {
  KronrodArray x;
  KronrodArray weight;
  KronrodArray gauss_weight;  ///< of the embedded 15-point rule; 0 at the other nodes
};

/// Nodes ascending on [−1, 1], from Boost.Math's tables.
[[nodiscard]] const KronrodRule& kronrod_rule();

/// ∫ exp(g(x) − log_scale) dx between the first and last break, panels split at the breaks and wherever
/// the two rules differ by more than `tolerance` of the whole.
///   g(panel index of the break interval, x (31), out (31)): log integrand, −infinity allowed
///   accept(panel index, x (31), mass (31)): called for each final panel; mass = weight·exp(g − scale)
template <class LogIntegrand, class Accept>
Quadrature integrate_log(std::span<const double> breaks, double log_scale, double tolerance, LogIntegrand&& g,
                         Accept&& accept) {
  struct Panel {
    double low, high;
    std::size_t index;
    KronrodArray x, mass;
    double value, error;
  };
  const KronrodRule& rule = kronrod_rule();
  Quadrature out;
  const auto measure = [&](double low, double high, std::size_t index) {
    Panel panel;
    panel.low = low;
    panel.high = high;
    panel.index = index;
    const double middle = low + 0.5 * (high - low);
    const double half = 0.5 * (high - low);
    for (std::size_t j = 0; j < kronrod_points; ++j) panel.x[j] = middle + half * rule.x[j];
    g(index, panel.x, panel.mass);
    exp_shifted(panel.mass.data(), log_scale, kronrod_points);
    double kronrod = 0.0;
    double gauss = 0.0;
    for (std::size_t j = 0; j < kronrod_points; ++j) {
      gauss += rule.gauss_weight[j] * panel.mass[j];
      panel.mass[j] *= half * rule.weight[j];
      kronrod += panel.mass[j];
    }
    panel.value = kronrod;
    panel.error = std::fabs(kronrod - half * gauss);
    out.evaluations += kronrod_points;
    return panel;
  };
  constexpr std::size_t most_panels = 600;
  std::vector<Panel> waiting;
  double guess = 0.0;
  for (std::size_t i = breaks.size() - 1; i > 0; --i) {
    waiting.push_back(measure(breaks[i - 1], breaks[i], i - 1));
    guess += waiting.back().value;
  }
  std::size_t done = 0;
  while (!waiting.empty()) {
    const Panel panel = waiting.back();
    waiting.pop_back();
    const double middle = panel.low + 0.5 * (panel.high - panel.low);
    if (panel.error > tolerance * guess && done + waiting.size() < most_panels && middle > panel.low &&
        middle < panel.high) {
      waiting.push_back(measure(middle, panel.high, panel.index));
      const double right = waiting.back().value;
      waiting.push_back(measure(panel.low, middle, panel.index));
      guess = std::max(guess, right + waiting.back().value);
      continue;
    }
    ++done;
    out.value += panel.value;
    out.error += panel.error;
    accept(panel.index, panel.x, panel.mass);
  }
  return out;
}

}  // namespace steelyard::numeric
