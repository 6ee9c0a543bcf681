// The answers of stress in the form that figures want.
#pragma once

#include <vector>

#include "steelyard/analysis.hpp"
#include "steelyard/figure.hpp"

namespace steelyard::cli {

/// In order of arrival; the last one holds all studies.
[[nodiscard]] std::vector<figure::Answer> arrivals(const StressAnalysis& analysis);
/// All but one study each.
[[nodiscard]] std::vector<figure::Answer> leave_one_outs(const StressAnalysis& analysis);
/// Evidence over prior widths and scales, in the units of the priors; nothing without a grid or where a
/// prior has no width.
[[nodiscard]] std::optional<figure::PriorGrid> prior_grid(const StressAnalysis& analysis);

}  // namespace steelyard::cli
