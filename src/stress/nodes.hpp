// A fixed grid over (mean, spread) that suits every subset of a set of studies.
#pragma once

#include <span>
#include <vector>

#include "steelyard/model.hpp"
#include "steelyard/study.hpp"

namespace steelyard::stressing {

/// Nodes with the logarithm of (quadrature weight × prior density).
struct Axis {
  std::vector<double> x;
  std::vector<double> log_weight;
};

/// Means: panels as fine as the narrowest posterior that all studies together could give over the range of
/// their estimates, finer around the prior's centre where the prior asks for it, growing geometrically
/// beyond. `points`: Gauss-Legendre nodes a panel, 4 or 6.
[[nodiscard]] Axis mean_axis(std::span<const Study> studies, const EffectPrior& prior, int points);

/// The same panels over the whole line, wherever the prior has its support, no core panel wider than
/// `widest`; the weights are those of the rule alone. At most about 2,500 nodes.
[[nodiscard]] Axis open_mean_axis(std::span<const Study> studies, const EffectPrior& prior, int points,
                                  double widest);

/// Panels that suit each of several priors, with the weights of the rule alone: for many priors on one field.
[[nodiscard]] Axis mean_axis_for_all(std::span<const Study> studies, std::span<const EffectPrior> priors,
                                     int points);
[[nodiscard]] Axis spread_axis_for_all(std::span<const Study> studies, std::span<const SpreadPrior> priors,
                                       int points);

/// Spreads: panels in geometric progression from well below the smallest standard error.
[[nodiscard]] Axis spread_axis(std::span<const Study> studies, const SpreadPrior& prior, int points);

}  // namespace steelyard::stressing
