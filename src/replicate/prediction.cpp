#include "replicate/prediction.hpp"

#include <algorithm>
#include <cmath>
#include <limits>
#include <utility>
#include <variant>
#include <vector>

#include "weigh/search.hpp"

namespace steelyard::replicating {

namespace {

constexpr double infinity = std::numeric_limits<double>::infinity();
constexpr double like_normal = 1e9;  // degrees of freedom

// A replication as something that could have come out with any t.
struct Target {
  double df = 1.0;
  double n_effective = 1.0;
  double t = 0.0;
  bool folded = false;
};

class Predictive {
 public:
  Predictive(std::span<const Likelihood> originals, const EffectPrior& prior, Target outcome)
      : all_(originals.begin(), originals.end()), prior_(prior), outcome_(outcome) {
    known_ = log_marginal_fixed(all_, prior_);
    all_.push_back({});
  }

  // Predictive probability that T lies in these bands.
  double operator()(std::vector<Interval> bands) {
    all_.back() = {BandT{std::move(bands), outcome_.df, outcome_.n_effective}, 1.0, std::nullopt, false};
    const Integral with = log_marginal_fixed(all_, prior_);
    const double p = std::exp(std::min(0.0, with.log_value - known_.log_value));
    error_ = std::max(error_, p * (with.abs_error + known_.abs_error));
    return p;
  }
  double below(double t) {
    if (!outcome_.folded) return (*this)({{-infinity, t}});
    return t > 0.0 ? (*this)({{-t, t}}) : 0.0;
  }
  double above(double t) {
    if (!outcome_.folded) return (*this)({{t, infinity}});
    return t > 0.0 ? (*this)({{-infinity, -t}, {t, infinity}}) : 1.0;
  }
  // The t with predictive probability p on the given side.
  double quantile(double p, bool upper) {
    const auto excess = [&](double t) { return upper ? p - above(t) : below(t) - p; };
    double low = outcome_.folded ? 0.0 : -4.0;
    double high = 4.0;
    while (excess(low) > 0.0 && low > -1e6) low *= 2.0;
    while (excess(high) < 0.0 && high < 1e6) high *= 2.0;
    return weighing::zero(excess, low, excess(low), high, excess(high), 1e-9 * (1.0 + high - low));
  }
  [[nodiscard]] double error() const { return error_; }

 private:
  std::vector<Likelihood> all_;
  EffectPrior prior_;
  Target outcome_;
  Integral known_;
  double error_ = 0.0;
};

void predict_statistic(Prediction& p, Predictive& predictive, const Target& outcome, double level) {
  const double tail = 0.5 * (1.0 - level);
  p.statistic = Interval{predictive.quantile(tail, false), predictive.quantile(tail, true)};
  const double per_effect = std::sqrt(outcome.n_effective);
  p.effect = Interval{p.statistic->low / per_effect, p.statistic->high / per_effect};
  const double t = outcome.folded ? std::abs(outcome.t) : outcome.t;
  p.below = predictive.below(t);
  p.inside = t >= p.statistic->low && t <= p.statistic->high;
}

}  // namespace

Prediction predict(std::span<const Likelihood> originals, const EffectPrior& prior, const Study& replication,
                   std::size_t index, double level) {
  Prediction p;
  p.study = index;
  Target outcome;
  if (const auto* band = std::get_if<BandT>(&replication.evidence)) {
    Predictive predictive(originals, prior, {band->df, band->n_effective, 0.0, false});
    p.band = predictive(band->bands);
    p.error = predictive.error();
    p.reason = "Only a range is printed for this replication, so its place in the interval isn't known.";
    return p;
  }
  if (const auto* exact = std::get_if<ExactT>(&replication.evidence)) {
    outcome = {exact->df, exact->n_effective, exact->t, exact->folded};
  } else {
    const auto& normal = std::get<NormalEstimate>(replication.evidence);
    outcome = {like_normal, 1.0 / (normal.se * normal.se), normal.estimate / normal.se, normal.folded};
  }
  Predictive predictive(originals, prior, outcome);
  predict_statistic(p, predictive, outcome, level);
  p.error = predictive.error();
  return p;
}

}  // namespace steelyard::replicating
