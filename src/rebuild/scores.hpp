// Means, SDs and their differences, from whichever cells carry them.
#pragma once

#include <optional>

#include "rebuild/facts.hpp"
#include "rebuild/frame.hpp"

namespace steelyard::rebuilding {

/// The frame of a test made from the scores themselves: df follow from the sizes, not from a printed df,
/// and no covariate is taken out.
[[nodiscard]] std::optional<Frame> score_frame(Numbers& x);

/// Group 1 minus group 2 (one sample: the mean minus mu0): `mean_diff`, else the means.
[[nodiscard]] bool has_difference(const Numbers& x);
[[nodiscard]] std::optional<double> difference(Numbers& x);

/// Pooled SD of two groups with their sizes.
[[nodiscard]] double pooled_sd(double sd1, double n1, double sd2, double n2);
/// SD of the differences of pairs with correlation r.
[[nodiscard]] double sd_of_differences(double sd1, double sd2, double r);

}  // namespace steelyard::rebuilding
