// Which moments of the posterior exist.
#pragma once

#include "pool/field.hpp"
#include "steelyard/model.hpp"

namespace steelyard::pool_room {

/// Orders below which moments exist, decided from the priors' tails and the number of studies that bound
/// their effect on both sides (docs/pool.md has the argument):
///  - same effect: a bounding study makes every moment exist; without one the prior's tail is the
///  posterior's.
///  - varying effects: for large τ each bounding study contributes a factor 1/τ.
struct MomentOrders {
  double effect_fixed;
  double effect_random;
  double spread;
  double new_study;
};
[[nodiscard]] MomentOrders moment_orders(const Field& field, const EffectPrior& effect,
                                         const SpreadPrior& spread);

/// Of a study's own effect under varying effects.
[[nodiscard]] double shrunken_order(const Field& field, std::size_t study, const MomentOrders& orders);

}  // namespace steelyard::pool_room
