// The ways in which papers make a d (or g): by which SD, with or without the small-sample factor.
#pragma once

#include <vector>

#include "audit/statistic.hpp"

namespace steelyard::auditing {

/// |d| by each of the usual definitions, from a test; each also times Hedges' J.
[[nodiscard]] std::vector<Range> effects_from_test(const RowView& row, const Source& test);
/// The same from a difference and SDs: pooled (n − 2 or n), either group's, their averages, of the
/// differences.
[[nodiscard]] std::vector<Range> effects_from_scores(const RowView& row);
/// Hull of ranges, for messages.
[[nodiscard]] Range hull(const std::vector<Range>& ranges);
[[nodiscard]] bool meets_any(const Range& range, const std::vector<Range>& ranges);

}  // namespace steelyard::auditing
