// The smallest changes that turn the verdict, and what holds throughout.
#pragma once

#include "steelyard/stress.hpp"
#include "stress/grid.hpp"

namespace steelyard::stressing {

/// Fills `turns` and `firmness` from the answers already in `result`. The prior's width and scale at which
/// the verdict turns are searched for between the ends of the grid.
void find_turns(StressResult& result, std::span<const Study> studies, const Priors& priors,
                const StressOptions& options);

}  // namespace steelyard::stressing
