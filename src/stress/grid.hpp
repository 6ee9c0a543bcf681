// Evidence over prior width × spread scale.
#pragma once

#include <functional>
#include <optional>
#include <span>
#include <vector>

#include "steelyard/stress.hpp"
#include "stress/answer.hpp"

namespace steelyard::stressing {

/// 20 factors from 1/8 to 8 in geometric progression.
[[nodiscard]] std::vector<double> usual_factors();

/// Marginal likelihoods under priors that differ in width and scale only. The null models do not depend on
/// the width and the same-effect ones not on the scale, so most of the work is done once.
class PriorMarginals {
 public:
  PriorMarginals(std::span<const Study> studies, const Priors& priors);

  [[nodiscard]] Integral fixed_null() const { return fixed_null_; }
  [[nodiscard]] Integral fixed_effect(double width) const;
  [[nodiscard]] std::optional<Integral> random_null(double scale) const;
  [[nodiscard]] std::optional<Integral> random_effect(double width, double scale) const;
  /// All four at one point.
  [[nodiscard]] Marginals at(double width, double scale) const;
  /// Averaged log Bayes factor of an effect; nothing when a side has no prior mass or the prior no place.
  [[nodiscard]] std::optional<double> log_bf(double width, double scale) const;
  [[nodiscard]] bool usable(double width) const;

 private:
  std::vector<Likelihood> studies_;
  Priors priors_;
  Integral fixed_null_;
};

/// The whole grid. Absent when the model probabilities leave no question, a prior of the grid is
/// unusable, or `keep_going` said no; `accurate` is cleared when an integral missed its promise.
[[nodiscard]] std::optional<PriorGrid> prior_grid(std::span<const Study> studies, const Priors& priors,
                                                  const StressOptions& options, bool& accurate,
                                                  const std::function<bool()>& keep_going);

}  // namespace steelyard::stressing
