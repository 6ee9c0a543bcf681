// Pooled answers, and Bayes factors put together from marginal likelihoods.
#pragma once

#include <array>
#include <optional>
#include <span>

#include "steelyard/stress.hpp"

namespace steelyard::stressing {

/// The four log marginal likelihoods; absent where not identified.
using Marginals = std::array<std::optional<Integral>, model_count>;

/// Posterior odds ÷ prior odds of an effect, or of varying effects; absent when a side has no prior mass.
[[nodiscard]] std::optional<LogBayesFactor> effect_evidence(const Marginals& marginals, const Priors& priors);
[[nodiscard]] std::optional<LogBayesFactor> heterogeneity_evidence(const Marginals& marginals,
                                                                   const Priors& priors);

/// Pools and keeps what an Answer holds; `refused` when pooling is.
[[nodiscard]] Answer answer(std::span<const Study> studies, const Priors& priors, const PoolOptions& options);

[[nodiscard]] Stand stand_of(double log_bf, double verdict);
[[nodiscard]] Stand stand_of(const Answer& answer, double verdict);

}  // namespace steelyard::stressing
