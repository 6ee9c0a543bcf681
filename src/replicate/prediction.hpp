// What originals predict for a replication, exactly.
#pragma once

#include <span>

#include "steelyard/replicate.hpp"

namespace steelyard::replicating {

/// The predictive distribution of the replication's statistic given the originals under one common effect
/// with this prior: P(T ≤ t) is a ratio of marginal likelihoods, m(originals and T ≤ t) ÷ m(originals), so
/// nothing is approximated. An estimate counts as a t with 1e9 df (1e-9 off the Normal).
[[nodiscard]] Prediction predict(std::span<const Likelihood> originals, const EffectPrior& prior,
                                 const Study& replication, std::size_t index, double level);

}  // namespace steelyard::replicating
