// The effect prior's log density for many effects at once.
#pragma once

#include <span>

#include "steelyard/model.hpp"

namespace steelyard::pool_room {

/// Everything about an effect prior that the integrals ask again and again. Immutable.
class PriorBlock {
 public:
  explicit PriorBlock(const EffectPrior& prior);

  [[nodiscard]] const PriorShape& shape() const { return shape_; }
  [[nodiscard]] const EffectPrior& prior() const { return prior_; }

  /// out[j] += log density(x[j]) for x inside the support; the caller sees to that.
  void add(std::span<const double> x, std::span<double> out) const;
  /// −infinity outside the support.
  [[nodiscard]] double at(double x) const;

 private:
  enum class Kernel { flat, cauchy, normal, student };
  Kernel kernel_ = Kernel::flat;
  double location_ = 0.0;
  double inv_scale_ = 0.0;
  double inv_df_ = 0.0;
  double power_ = 0.0;     ///< (df + 1)/2
  double constant_ = 0.0;  ///< log density at kernel 0
  PriorShape shape_;
  EffectPrior prior_;
};

}  // namespace steelyard::pool_room
