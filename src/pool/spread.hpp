// The outer integral: over the spread τ, in a coordinate u with τ = scale·sinh(u).
#pragma once

#include <functional>
#include <span>
#include <vector>

#include "numeric/chebyshev.hpp"
#include "pool/field.hpp"
#include "pool/row.hpp"
#include "steelyard/model.hpp"

namespace steelyard::pool_room {

/// √(1+nτ²) has its singularities at τ = ±i/√n. In u, with `scale` the smallest standard error, they lie
/// no nearer than i·π/2 to the axis for every study, and the axis is logarithmic for large τ.
struct SpreadAxis {
  double scale = 1.0;
  [[nodiscard]] double spread(double u) const;
  [[nodiscard]] double coordinate(double spread) const;
  /// log dτ/du.
  [[nodiscard]] double log_slope(double u) const;
};

/// The value that the inner integral (or the likelihood at a fixed mean) takes at a spread.
struct Inner {
  double log_value = 0.0;
  double error = 0.0;
};

/// What an outer integral is made of.
struct SpreadProblem {
  SpreadAxis axis;
  SpreadPrior prior;
  double largest_estimate = 1.0;  ///< the scale beyond which spreads only get less likely
  double noise = 0.0;
  /// Cheap log inner value, for exploring.
  std::function<double(double spread)> explore;
  /// Exact inner values at 16 spreads.
  std::function<void(std::span<const double> spreads, std::span<Inner> out)> exact;
};

/// A panel of the outer integral: 16 nodes in u, and what the posterior of u weighs them with.
struct SpreadPanel {
  double low, high;    ///< in u
  std::size_t sample;  ///< which call of `exact` gave its values
  /// ω_j = ∫ posterior(u)·l_j(u) du over the panel, l_j the Lagrange polynomials of its nodes: the
  /// expectation of any smooth function of u is Σ ω_j·h(u_j). Sums to the panel's posterior mass.
  numeric::ChebyshevArray weight;
};

struct SpreadIntegral {
  double log_value = 0.0;   ///< log ∫ prior(τ)·exp(inner(τ)) dτ
  double error = 0.0;       ///< bound on its absolute error, without rounding
  numeric::LogCurve curve;  ///< log inner value over u
  std::vector<SpreadPanel> panels;
  std::vector<double> breaks;  ///< of the quadrature in u, where the posterior's features are
};

[[nodiscard]] SpreadIntegral integrate_spread(const SpreadProblem& problem);

/// log posterior density of u, not normalized: curve + log prior + log dτ/du.
[[nodiscard]] double log_outer(const SpreadProblem& problem, const numeric::LogCurve& curve, double u);

}  // namespace steelyard::pool_room
