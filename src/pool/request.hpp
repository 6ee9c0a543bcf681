// What may be wrong with a request to pool.
#pragma once

#include <span>
#include <vector>

#include "steelyard/pool.hpp"

namespace steelyard::pool_room {

[[nodiscard]] std::vector<Diagnostic> problems_with_request(std::span<const Study> studies,
                                                            const Priors& priors, const PoolOptions& options);

}  // namespace steelyard::pool_room
