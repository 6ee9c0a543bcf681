// The most that any prior could make of a study.
#pragma once

#include "steelyard/weigh.hpp"

namespace steelyard::weighing {

/// The largest log likelihood among the effects that the direction allows, less that of no effect
/// (Edwards, Lindman & Savage 1963), to 1e-10.
[[nodiscard]] LikelihoodBound likelihood_bound(const Evidence& evidence, Direction direction);

/// Two-sided p of an exact t or an estimate; nothing for a band.
[[nodiscard]] std::optional<double> two_sided_p(const Evidence& evidence);

}  // namespace steelyard::weighing
