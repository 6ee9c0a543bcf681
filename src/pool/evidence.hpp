// From marginal likelihoods to model probabilities and Bayes factors.
#pragma once

#include "steelyard/pool.hpp"

namespace steelyard::pool_room {

/// Posterior model probabilities; a model without an integral gets 0 and its prior mass is spread over the
/// others in proportion.
void weigh_models(PoolResult& result);

/// The Bayes factors of the classes: posterior odds ÷ prior odds, each with the error that its integrals pass
/// on.
void fill_evidence(PoolResult& result);

}  // namespace steelyard::pool_room
