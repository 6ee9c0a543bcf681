// What a reader must know beside the pooled numbers.
#pragma once

#include <span>
#include <vector>

#include "steelyard/pool.hpp"

namespace steelyard::pool_room {

[[nodiscard]] std::vector<Diagnostic> cautions(std::span<const Study> studies, const Priors& priors,
                                               const PoolOptions& options, const PoolResult& result);

}  // namespace steelyard::pool_room
