// Confidence intervals in a row: which quantity they belong to, and their level.
#pragma once

#include "rebuild/facts.hpp"

namespace steelyard::rebuilding {

enum class CiOf { none, difference, mean, d, g, r, estimate, odds_ratio, correlation };

/// What the row's ci_low and ci_high belong to: `ci_of` where it is filled; else the first of estimate,
/// odds_ratio, correlation, mean_diff, d, g, r that is printed; else the difference of two means (one sample:
/// its mean).
[[nodiscard]] CiOf ci_of(const Numbers& x);

/// The level as a fraction: 0.95 when empty; 95 is read as 95 %.
[[nodiscard]] double ci_level(Numbers& x);

}  // namespace steelyard::rebuilding
