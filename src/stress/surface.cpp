#include "stress/surface.hpp"

#include <algorithm>
#include <cmath>
#include <limits>
#include <numeric>
#include <variant>

#include "numeric/chebyshev.hpp"
#include "pool/field.hpp"
#include "stress/nodes.hpp"

namespace steelyard::stressing {

namespace {

constexpr double infinity = std::numeric_limits<double>::infinity();

double log_sum(std::vector<double>& terms) {
  const double top = *std::max_element(terms.begin(), terms.end());
  if (!(top > -infinity)) return -infinity;
  numeric::exp_shifted(terms.data(), top, terms.size());
  return top + std::log(std::accumulate(terms.begin(), terms.end(), 0.0));
}

// Weight × prior density of each prior at each node, in logarithms.
template <class Prior>
std::vector<std::vector<double>> log_weights(const Axis& axis, std::span<const Prior> priors) {
  std::vector<std::vector<double>> all;
  for (const Prior& prior : priors) {
    all.push_back(axis.log_weight);
    for (std::size_t j = 0; j < axis.x.size(); ++j) all.back()[j] += log_density(prior, axis.x[j]);
  }
  return all;
}

// The likelihood over the means at one spread. Bands cost a thousand times an exact t, so they are only
// evaluated where the other studies (and the most generous of the priors) leave something.
class Rows {
 public:
  Rows(std::span<const Study> studies, const std::vector<std::vector<double>>& weights)
      : quick_(pick(studies, false)), slow_(pick(studies, true)), best_weight_(weights.front()) {
    for (const std::vector<double>& weight : weights) {
      for (std::size_t j = 0; j < weight.size(); ++j) best_weight_[j] = std::max(best_weight_[j], weight[j]);
    }
  }

  void evaluate(double spread, const std::vector<double>& means, std::vector<double>& out) const {
    quick_.evaluate(spread, means, out);
    if (slow_.size() == 0) return;
    if (quick_.size() == 0) return add_slow(spread, means, -infinity, out);
    double top = -infinity;
    for (std::size_t j = 0; j < out.size(); ++j) top = std::max(top, out[j] + best_weight_[j]);
    const std::vector<double> before = out;
    add_slow(spread, means, top - reach, out);
    double left = -infinity;
    for (std::size_t j = 0; j < out.size(); ++j) left = std::max(left, out[j] + best_weight_[j]);
    // The bands contradict the rest: what was left out may count after all.
    if (left < top - 0.5 * reach) {
      out = before;
      add_slow(spread, means, -infinity, out);
    }
  }

 private:
  static constexpr double reach = 80.0;  // nats

  static pool_room::Field pick(std::span<const Study> studies, bool bands) {
    std::vector<Likelihood> some;
    for (const Study& study : studies) {
      if (std::holds_alternative<BandT>(study.evidence) == bands) some.push_back(likelihood(study));
    }
    return pool_room::Field(some);
  }

  void add_slow(double spread, const std::vector<double>& means, double least,
                std::vector<double>& out) const {
    std::vector<std::size_t> at;
    std::vector<double> some, values;
    for (std::size_t j = 0; j < means.size(); ++j) {
      if (out[j] + best_weight_[j] >= least) {
        at.push_back(j);
        some.push_back(means[j]);
      } else {
        out[j] = -infinity;
      }
    }
    values.resize(some.size());
    slow_.evaluate(spread, some, values);
    for (std::size_t k = 0; k < at.size(); ++k) out[at[k]] += values[k];
  }

  pool_room::Field quick_, slow_;
  std::vector<double> best_weight_;
};

}  // namespace

std::optional<std::vector<double>> surface_marginals(std::span<const Study> studies,
                                                     std::span<const EffectPrior> effects,
                                                     std::span<const SpreadPrior> spreads,
                                                     const std::function<bool()>& keep_going) {
  const Axis means = mean_axis_for_all(studies, effects, 6);
  const Axis taus = spread_axis_for_all(studies, spreads, 6);
  const auto effect_weights = log_weights(means, effects);
  const auto spread_weights = log_weights(taus, spreads);
  const Rows rows(studies, effect_weights);
  std::vector<double> row(means.x.size()), terms(means.x.size());
  std::vector<std::vector<double>> inner(effects.size(), std::vector<double>(taus.x.size()));
  for (std::size_t t = 0; t < taus.x.size(); ++t) {
    if (!keep_going()) return std::nullopt;
    rows.evaluate(taus.x[t], means.x, row);
    for (std::size_t e = 0; e < effects.size(); ++e) {
      for (std::size_t j = 0; j < row.size(); ++j) terms[j] = row[j] + effect_weights[e][j];
      inner[e][t] = log_sum(terms);
    }
  }
  std::vector<double> out;
  for (std::size_t e = 0; e < effects.size(); ++e) {
    for (std::size_t s = 0; s < spreads.size(); ++s) {
      std::vector<double> sum = inner[e];
      for (std::size_t t = 0; t < sum.size(); ++t) sum[t] += spread_weights[s][t];
      out.push_back(log_sum(sum));
    }
  }
  return out;
}

}  // namespace steelyard::stressing
