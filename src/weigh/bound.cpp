#include "weigh/bound.hpp"

#include <algorithm>
#include <cmath>
#include <variant>

#include "steelyard/model.hpp"
#include "steelyard/numeric.hpp"
#include "weigh/search.hpp"

namespace steelyard::weighing {

namespace {

// The effects among which the largest likelihood must lie, and whether it may be at an end of the axis.
struct Reach {
  double half_width = 1.0;
  bool open_above = false, open_below = false;
};

Reach reach(const ExactT& e) { return {(2.0 * std::abs(e.t) + 5.0) / std::sqrt(e.n_effective)}; }
Reach reach(const NormalEstimate& e) { return {std::abs(e.estimate) + 5.0 * e.se}; }
Reach reach(const BandT& e) {
  double farthest = 0.0;
  Reach r;
  for (const Interval& band : e.bands) {
    for (const double end : {band.low, band.high}) {
      if (std::isfinite(end)) farthest = std::max(farthest, std::abs(end));
    }
    r.open_above = r.open_above || std::isinf(band.high);
    r.open_below = r.open_below || std::isinf(band.low);
  }
  r.half_width = (2.0 * farthest + 5.0) / std::sqrt(e.n_effective);
  return r;
}

}  // namespace

LikelihoodBound likelihood_bound(const Evidence& evidence, Direction direction) {
  const Likelihood study{evidence, 1.0, std::nullopt, false};
  const auto log_l = [&study](double effect) { return log_likelihood(study, effect, 0.0); };
  const double none = log_l(0.0);
  const Reach r = std::visit([](const auto& e) { return reach(e); }, evidence);
  const bool below = direction != Direction::greater;
  const bool above = direction != Direction::less;
  // An open band becomes certain as the effect grows: likelihood 1, reached by no effect.
  if ((above && r.open_above) || (below && r.open_below)) return {-none, std::nullopt};
  // A folded likelihood has a hump on each side; both ends of the axis get a scan of their own.
  Extreme best{0.0, none};
  if (above) {
    const Extreme e = largest(log_l, 0.0, r.half_width, 64, 60);
    if (e.value > best.value) best = e;
  }
  if (below) {
    const Extreme e = largest(log_l, -r.half_width, 0.0, 64, 60);
    if (e.value > best.value) best = e;
  }
  return {best.value - none, best.at};
}

std::optional<double> two_sided_p(const Evidence& evidence) {
  if (const auto* exact = std::get_if<ExactT>(&evidence))
    return numeric::student_t_two_sided(exact->t, exact->df);
  if (const auto* estimate = std::get_if<NormalEstimate>(&evidence)) {
    return 2.0 * numeric::normal_upper(std::abs(estimate->estimate / estimate->se));
  }
  return std::nullopt;
}

}  // namespace steelyard::weighing
