// Originals read as seen only because they were significant.
#pragma once

#include <optional>
#include <span>
#include <string>
#include <vector>

#include "steelyard/replicate.hpp"

namespace steelyard::replicating {

/// The originals with their likelihood divided by P(two-sided p < alpha). Empty, with the reason, when
/// one of them isn't significant at that level.
struct Selected {
  std::vector<Likelihood> originals;
  std::string reason;
};
[[nodiscard]] Selected selected_originals(std::span<const Study> originals, double alpha);

/// Posterior of the mean effect under one common effect.
[[nodiscard]] Summary fixed_summary(std::span<const Likelihood> studies, std::span<const Study> originals,
                                    const EffectPrior& prior, double level);

}  // namespace steelyard::replicating
