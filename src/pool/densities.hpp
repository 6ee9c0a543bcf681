// Posterior densities of the single quantities as curves.
#pragma once

#include <cstddef>
#include <optional>
#include <span>
#include <vector>

#include "numeric/chebyshev.hpp"
#include "pool/marginal.hpp"

namespace steelyard::pool_room {

/// Mean effect under the same-effect model.
[[nodiscard]] numeric::DensityCurve effect_density_fixed(const Row& row, const PriorBlock& prior);

/// Mean effect under varying effects: rows weighed by the posterior of the spread.
[[nodiscard]] numeric::DensityCurve effect_density_random(const RandomMarginal& random,
                                                          const PriorBlock& prior);

/// The coordinate u of the spread.
[[nodiscard]] numeric::DensityCurve spread_density(const RandomMarginal& random, const SpreadPrior& prior);

/// The effect in a new study (no `study`), or a study's own effect, under varying effects:
/// ∫∫ Normal(x; μ, τ²)·posterior, or L_i(x)·∫∫ Normal(x; μ, τ²)·posterior/L_i(μ, τ).
[[nodiscard]] numeric::DensityCurve own_effect_density(const RandomMarginal& random, const PriorBlock& prior,
                                                       const Field& field, std::optional<std::size_t> study);

/// Where a density may live, and points from which every feature of it can be found.
struct Neighbourhood {
  double low, high;
  std::vector<double> look;
};

/// A density that is dear to evaluate: its logarithm is interpolated on few points, the curve made from that.
[[nodiscard]] numeric::DensityCurve through_logarithm(const numeric::BlockFunction& density,
                                                      const Neighbourhood& where);

/// A finite mixture of densities.
class Mixture {
 public:
  void add(double weight, const numeric::DensityCurve* part);
  [[nodiscard]] double density(double x) const;
  [[nodiscard]] double cdf(double x) const;
  [[nodiscard]] double quantile(double p) const;
  [[nodiscard]] double mean() const;
  [[nodiscard]] double variance(double mean) const;

 private:
  struct Part {
    double weight;
    const numeric::DensityCurve* curve;
  };
  std::vector<Part> parts_;
};

}  // namespace steelyard::pool_room
