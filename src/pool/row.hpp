// One spread: the log likelihood over the mean as a curve, and its integral against the effect prior.
#pragma once

#include <optional>
#include <span>
#include <vector>

#include "numeric/chebyshev.hpp"
#include "pool/field.hpp"
#include "pool/prior_block.hpp"
#include "pool/search.hpp"

namespace steelyard::pool_room {

/// A quadrature node of the conditional posterior of the mean; masses of a row sum to 1.
struct Node {
  double x;
  double mass;
};

/// Everything about the mean at one spread.
struct Row {
  double spread = 0.0;
  Window window;              ///< of prior × likelihood
  numeric::LogCurve curve;    ///< Σ log L(mean, spread) over the window
  double log_integral = 0.0;  ///< log ∫ prior(mean)·L(mean, spread) d mean
  double error = 0.0;         ///< bound on its absolute error, without rounding
  double mean = 0.0;          ///< of the conditional posterior
  double sd = 0.0;
  std::vector<Node> nodes;      ///< empty unless asked for
  std::size_t evaluations = 0;  ///< nodes at which all studies were evaluated

  /// out[j] = log conditional posterior density of the mean at x[j]; −infinity outside the window.
  void log_density(const PriorBlock& prior, std::span<const double> x, std::span<double> out) const;
};

/// The row's curve with one study's log likelihood taken out.
[[nodiscard]] numeric::LogCurve curve_without(const Row& row, const Field& field, std::size_t study);

/// Where a neighbouring row found its mass.
struct Hint {
  double best = 0.0;
  double width = 1.0;
};

/// The window alone: cheap, for exploring. Its Laplace approximation to log_integral is
/// log_best + log(width·√(2π)).
[[nodiscard]] Window row_window(const Field& field, const PriorBlock& prior, double spread,
                                const std::optional<Hint>& hint);

[[nodiscard]] Row make_row(const Field& field, const PriorBlock& prior, double spread,
                           const std::optional<Hint>& hint, double noise, bool keep_nodes);

}  // namespace steelyard::pool_room
