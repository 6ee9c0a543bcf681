// The four marginal likelihoods, with what the summaries need of them.
#pragma once

#include <memory>
#include <vector>

#include "pool/field.hpp"
#include "pool/prior_block.hpp"
#include "pool/row.hpp"
#include "pool/spread.hpp"
#include "steelyard/pool.hpp"

namespace steelyard::pool_room {

struct NullMarginal {
  Integral integral;
};

struct FixedMarginal {
  Integral integral;
  Row row;
};

struct RandomMarginal {
  Integral integral;
  SpreadAxis axis;
  SpreadIntegral outer;
  std::vector<Row> rows;  ///< 16 for each panel of `outer`, parallel to its nodes
};

[[nodiscard]] Integral fixed_at(const Field& field, double mean);
[[nodiscard]] Integral random_at(const Field& field, double mean, const SpreadPrior& spread);
[[nodiscard]] FixedMarginal fixed_effect(const Field& field, const PriorBlock& effect, bool keep_nodes);
[[nodiscard]] RandomMarginal random_effect(const Field& field, const PriorBlock& effect,
                                           const SpreadPrior& spread, bool keep_nodes);

}  // namespace steelyard::pool_room
