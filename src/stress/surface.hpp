// The likelihood of all studies on one fixed grid of (mean, spread): many priors, one evaluation.
#pragma once

#include <functional>
#include <optional>
#include <span>
#include <vector>

#include "steelyard/model.hpp"
#include "steelyard/study.hpp"

namespace steelyard::stressing {

/// Log marginal likelihoods of varying effects for every pair of the given priors, [effect prior ·
/// spread priors + spread prior]; priors sorted from narrow to wide. The error is not known here: compare
/// some with exact values. Nothing when `keep_going` said no.
[[nodiscard]] std::optional<std::vector<double>> surface_marginals(std::span<const Study> studies,
                                                                   std::span<const EffectPrior> effects,
                                                                   std::span<const SpreadPrior> spreads,
                                                                   const std::function<bool()>& keep_going);

}  // namespace steelyard::stressing
