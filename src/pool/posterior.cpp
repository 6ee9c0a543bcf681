#include "pool/posterior.hpp"

#include <algorithm>
#include <cmath>
#include <limits>
#include <utility>

namespace steelyard::pool_room {

namespace {

constexpr double not_a_number = std::numeric_limits<double>::quiet_NaN();

constexpr const char* no_mean =
    "The mean does not exist: the data do not bound the effect on both sides and the prior's tail is too "
    "heavy.";
constexpr const char* no_variance = "The variance does not exist: the posterior's tail is too heavy.";
constexpr const char* not_identified = "A single study says nothing about how effects vary.";

/// Quantiles always; mean and sd if they exist.
template <class Curve>
Summary summarize(const Curve& curve, double level, double order) {
  Summary out;
  out.median = curve.quantile(0.5);
  out.lower = curve.quantile(0.5 * (1.0 - level));
  out.upper = curve.quantile(0.5 * (1.0 + level));
  if (!(order > 1.0)) {
    out.reason = no_mean;
    return out;
  }
  const double mean = curve.mean();
  out.mean = mean;
  if (order > 2.0)
    out.sd = std::sqrt(std::max(0.0, curve.variance(mean)));
  else
    out.reason = no_variance;
  return out;
}

Summary missing() {
  Summary out;
  out.reason = not_identified;
  return out;
}

}  // namespace

PooledPosterior::PooledPosterior(std::unique_ptr<Pooled> pooled) : pooled_(std::move(pooled)) {}

const numeric::DensityCurve* PooledPosterior::fixed_curve() const {
  std::call_once(once_fixed_, [this] { fixed_ = effect_density_fixed(pooled_->fixed.row, pooled_->prior); });
  return &fixed_;
}

const numeric::DensityCurve* PooledPosterior::random_curve() const {
  if (!pooled_->random) return nullptr;
  std::call_once(once_random_, [this] { random_ = effect_density_random(*pooled_->random, pooled_->prior); });
  return &random_;
}

const numeric::DensityCurve* PooledPosterior::spread_curve() const {
  if (!pooled_->random) return nullptr;
  std::call_once(once_spread_,
                 [this] { spread_ = pool_room::spread_density(*pooled_->random, pooled_->priors.spread); });
  return &spread_;
}

const numeric::DensityCurve* PooledPosterior::new_study_curve() const {
  if (!pooled_->random) return nullptr;
  std::call_once(once_new_, [this] {
    new_ = own_effect_density(*pooled_->random, pooled_->prior, pooled_->field, std::nullopt);
  });
  return &new_;
}

Mixture PooledPosterior::effect_mixture(Within within) const {
  Mixture out;
  if (within == Within::fixed_effect) out.add(1.0, fixed_curve());
  if (within == Within::random_effect) out.add(1.0, random_curve());
  if (within == Within::average) {
    if (pooled_->share_fixed > 0.0) out.add(pooled_->share_fixed, fixed_curve());
    if (pooled_->share_random > 0.0) out.add(pooled_->share_random, random_curve());
  }
  return out;
}

Mixture PooledPosterior::new_study_mixture(Within within) const {
  Mixture out;
  if (within == Within::fixed_effect) out.add(1.0, fixed_curve());
  if (within == Within::random_effect) out.add(1.0, new_study_curve());
  if (within == Within::average) {
    if (pooled_->share_fixed > 0.0) out.add(pooled_->share_fixed, fixed_curve());
    if (pooled_->share_random > 0.0) out.add(pooled_->share_random, new_study_curve());
  }
  return out;
}

double PooledPosterior::effect_density(Within within, double x) const {
  return effect_mixture(within).density(x);
}
double PooledPosterior::effect_cdf(Within within, double x) const { return effect_mixture(within).cdf(x); }
double PooledPosterior::effect_quantile(Within within, double p) const {
  if (within == Within::random_effect && !pooled_->random) return not_a_number;
  return effect_mixture(within).quantile(p);
}

double PooledPosterior::spread_density(double x) const {
  const auto* curve = spread_curve();
  if (curve == nullptr || !(x >= 0.0)) return 0.0;
  const SpreadAxis& axis = pooled_->random->axis;
  const double u = axis.coordinate(x);
  return curve->density(u) * std::exp(-axis.log_slope(u));
}

double PooledPosterior::spread_cdf(double x) const {
  const auto* curve = spread_curve();
  return curve == nullptr ? 0.0 : curve->cdf(pooled_->random->axis.coordinate(x));
}

double PooledPosterior::spread_quantile(double p) const {
  const auto* curve = spread_curve();
  return curve == nullptr ? not_a_number : pooled_->random->axis.spread(curve->quantile(p));
}

double PooledPosterior::new_study_density(Within within, double x) const {
  return new_study_mixture(within).density(x);
}
double PooledPosterior::new_study_cdf(Within within, double x) const {
  return new_study_mixture(within).cdf(x);
}
double PooledPosterior::new_study_quantile(Within within, double p) const {
  if (within == Within::random_effect && !pooled_->random) return not_a_number;
  return new_study_mixture(within).quantile(p);
}

double PooledPosterior::joint_log_density(double effect, double spread) const {
  if (!pooled_->random || !(spread >= 0.0)) return -std::numeric_limits<double>::infinity();
  const double prior = pooled_->prior.at(effect) + log_density(pooled_->priors.spread, spread);
  if (!std::isfinite(prior)) return prior;
  return prior + pooled_->field.at(spread, effect) - pooled_->random->integral.log_value;
}

Summary PooledPosterior::effect_summary(Within within, double level) const {
  const MomentOrders& orders = pooled_->orders;
  if (within == Within::random_effect && !pooled_->random) return missing();
  double order = within == Within::random_effect ? orders.effect_random : orders.effect_fixed;
  if (within == Within::average && pooled_->share_random > 0.0) order = std::min(order, orders.effect_random);
  Summary out = summarize(effect_mixture(within), level, order);
  if (out.mean) out.mean = effect_moments(within).mean;
  if (out.sd) out.sd = std::sqrt(effect_moments(within).variance);
  return out;
}

PooledPosterior::Moments PooledPosterior::effect_moments(Within within) const {
  // From the rows, whose windows reach further into the tails than the curves do.
  double fixed = within == Within::average        ? pooled_->share_fixed
                 : within == Within::fixed_effect ? 1.0
                                                  : 0.0;
  double random = within == Within::average ? pooled_->share_random : 1.0 - fixed;
  Moments out{0.0, 0.0};
  double square = 0.0;
  // About one centre, so that large effects lose no digits of the variance.
  const double centre = pooled_->fixed.row.mean;
  const auto add = [&](double weight, const Row& row) {
    const double d = row.mean - centre;
    out.mean += weight * d;
    square += weight * (row.sd * row.sd + d * d);
  };
  if (fixed > 0.0) add(fixed, pooled_->fixed.row);
  if (random > 0.0 && pooled_->random) {
    const RandomMarginal& r = *pooled_->random;
    for (std::size_t p = 0; p < r.outer.panels.size(); ++p)
      for (std::size_t j = 0; j < numeric::chebyshev_points; ++j)
        add(random * r.outer.panels[p].weight[j], r.rows[p * numeric::chebyshev_points + j]);
  }
  out.variance = std::max(0.0, square - out.mean * out.mean);
  out.mean += centre;
  return out;
}

Summary PooledPosterior::new_study_summary(double level) const {
  const MomentOrders& orders = pooled_->orders;
  double order = orders.effect_fixed;
  if (pooled_->share_random > 0.0) order = std::min(order, orders.new_study);
  Summary out = summarize(new_study_mixture(Within::average), level, order);
  if (!out.sd) return out;
  // The mean is that of the mean effect; the variance adds E τ², whose heavy tail the curve of the spread
  // follows further than that of the new effect does.
  const Moments effect = effect_moments(Within::average);
  out.mean = effect.mean;
  double variance = effect.variance;
  if (pooled_->share_random > 0.0) {
    const SpreadAxis& axis = pooled_->random->axis;
    variance += pooled_->share_random *
                spread_curve()->expectation([&axis](double u) { return axis.spread(u) * axis.spread(u); });
  }
  out.sd = std::sqrt(variance);
  return out;
}

Summary PooledPosterior::spread_summary(double level) const {
  const auto* curve = spread_curve();
  if (curve == nullptr) return missing();
  const SpreadAxis& axis = pooled_->random->axis;
  Summary out;
  out.median = axis.spread(curve->quantile(0.5));
  out.lower = axis.spread(curve->quantile(0.5 * (1.0 - level)));
  out.upper = axis.spread(curve->quantile(0.5 * (1.0 + level)));
  const double order = pooled_->orders.spread;
  if (!(order > 1.0)) {
    out.reason = no_mean;
    return out;
  }
  const double mean = curve->expectation([&axis](double u) { return axis.spread(u); });
  out.mean = mean;
  if (order > 2.0)
    out.sd = std::sqrt(std::max(0.0, curve->expectation([&axis, mean](double u) {
      const double d = axis.spread(u) - mean;
      return d * d;
    })));
  else
    out.reason = no_variance;
  return out;
}

Summary PooledPosterior::i2_summary(double level) const {
  const auto* curve = spread_curve();
  if (curve == nullptr) return missing();
  const SpreadAxis& axis = pooled_->random->axis;
  // The typical sampling variance of Higgins & Thompson (2002), eq. 9.
  double weights = 0.0;
  double squares = 0.0;
  double count = 0.0;
  for (const double v : pooled_->field.variances()) {
    if (!std::isfinite(v)) continue;
    weights += 1.0 / v;
    squares += 1.0 / (v * v);
    count += 1.0;
  }
  const double typical = (count - 1.0) * weights / (weights * weights - squares);
  if (!(typical > 0.0)) return missing();
  const auto share = [&axis, typical](double u) {
    const double t2 = axis.spread(u) * axis.spread(u);
    return t2 / (t2 + typical);
  };
  Summary out;
  out.median = share(curve->quantile(0.5));
  out.lower = share(curve->quantile(0.5 * (1.0 - level)));
  out.upper = share(curve->quantile(0.5 * (1.0 + level)));
  const double mean = curve->expectation(share);
  out.mean = mean;
  out.sd = std::sqrt(std::max(
      0.0, curve->expectation([&share, mean](double u) { return (share(u) - mean) * (share(u) - mean); })));
  return out;
}

Summary PooledPosterior::shrunken_summary(std::size_t study, double level) const {
  const MomentOrders& orders = pooled_->orders;
  Mixture mixture;
  if (pooled_->share_fixed > 0.0) mixture.add(pooled_->share_fixed, fixed_curve());
  numeric::DensityCurve own;
  double order = orders.effect_fixed;
  if (pooled_->random && pooled_->share_random > 0.0) {
    own = own_effect_density(*pooled_->random, pooled_->prior, pooled_->field, study);
    mixture.add(pooled_->share_random, &own);
    order = std::min(order, shrunken_order(pooled_->field, study, orders));
  }
  return summarize(mixture, level, order);
}

}  // namespace steelyard::pool_room
