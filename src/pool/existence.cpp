#include "pool/existence.hpp"

#include <algorithm>
#include <cmath>
#include <limits>

namespace steelyard::pool_room {

namespace {
constexpr double infinity = std::numeric_limits<double>::infinity();
}

MomentOrders moment_orders(const Field& field, const EffectPrior& effect, const SpreadPrior& spread) {
  const double b = tail_order(effect);
  const double a = tail_order(spread);
  const double bounding = static_cast<double>(field.bounding());
  MomentOrders out{};
  out.effect_fixed = bounding > 0.0 ? infinity : b;
  out.spread = a + bounding;
  // A mean far out needs a spread as large, or it contradicts the bounding studies.
  out.effect_random = bounding > 0.0 ? a + b + bounding : b;
  out.new_study = std::min(out.effect_random, out.spread);
  return out;
}

double shrunken_order(const Field& field, std::size_t study, const MomentOrders& orders) {
  return field.bounds(study) ? infinity : orders.new_study;
}

}  // namespace steelyard::pool_room
