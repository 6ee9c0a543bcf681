// One common mean against a common mean with group deviations, with the exact likelihood.
//
// At each spread τ, with G_g(m) the product of the likelihoods of group g at the mean m, and p the prior of
// a deviation:
//   without deviations  ∫ π(μ) Π_g G_g(μ) dμ
//   with deviations     ∫ π(μ) Π_g [∫ p(m − μ) G_g(m) dm] dμ
// on one fixed grid of means, then integrated over τ: outside the product when the groups share a spread,
// inside it (for each group at each μ) when each has its own. Done on two grids; their difference is the
// stated error.
#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <limits>
#include <numeric>
#include <span>
#include <utility>
#include <vector>

#include "numeric/chebyshev.hpp"
#include "steelyard/numeric.hpp"
#include "steelyard/stress.hpp"
#include "steelyard/weigh.hpp"
#include "stress/nodes.hpp"

namespace steelyard {

namespace {

using stressing::Axis;

constexpr double infinity = std::numeric_limits<double>::infinity();

// The logarithms of the marginal likelihoods that are compared.
struct Compared {
  double fixed_common = 0.0, fixed_deviating = 0.0;
  double random_common = 0.0, random_deviating = 0.0;
};

double log_sum(std::vector<double>& terms) {
  const double top = *std::max_element(terms.begin(), terms.end());
  if (!(top > -infinity)) return -infinity;
  numeric::exp_shifted(terms.data(), top, terms.size());
  return top + std::log(std::accumulate(terms.begin(), terms.end(), 0.0));
}

// p(m_j − μ_k)·weight_j for all pairs, each row summing to 1 so that a likelihood that is flat where the
// grid is coarse keeps its value.
std::vector<double> smoothing_matrix(const Axis& axis, const EffectPrior& deviation) {
  const std::size_t n = axis.x.size();
  std::vector<double> matrix(n * n);
  std::vector<double> weight(n);
  for (std::size_t j = 0; j < n; ++j) weight[j] = std::exp(axis.log_weight[j]);
  for (std::size_t k = 0; k < n; ++k) {
    double sum = 0.0;
    for (std::size_t j = 0; j < n; ++j) {
      matrix[k * n + j] = weight[j] * std::exp(log_density(deviation, axis.x[j] - axis.x[k]));
      sum += matrix[k * n + j];
    }
    for (std::size_t j = 0; j < n; ++j) matrix[k * n + j] /= sum;
  }
  return matrix;
}

class Comparison {
 public:
  Comparison(std::span<const Study> studies, const std::vector<std::vector<std::size_t>>& groups,
             const Priors& priors, const GroupOptions& options, int points)
      : groups_(groups), shared_(options.shared_spread) {
    for (const Study& study : studies) likelihoods_.push_back(likelihood(study));
    const EffectPrior deviation{options.deviation, Direction::either};
    // Deviations reach to where the prior of the mean may not: the axis of group means is open.
    means_ =
        stressing::open_mean_axis(studies, priors.effect, points, 0.5 * width_of(deviation).value_or(1.0));
    spreads_ = stressing::spread_axis(studies, priors.spread, points);
    matrix_ = smoothing_matrix(means_, deviation);
    log_prior_ = means_.log_weight;
    for (std::size_t j = 0; j < log_prior_.size(); ++j)
      log_prior_[j] += log_density(priors.effect, means_.x[j]);
  }

  [[nodiscard]] Compared run(bool random) {
    Compared c;
    std::tie(c.fixed_common, c.fixed_deviating) = at_spread(0.0);
    if (!random) return c;
    std::vector<double> common, deviating;
    own_common_.assign(groups_.size(), std::vector<double>(means_.x.size(), -infinity));
    own_deviating_ = own_common_;
    for (std::size_t t = 0; t < spreads_.x.size(); ++t) {
      const auto [a, b] = at_spread(spreads_.x[t], spreads_.log_weight[t]);
      common.push_back(a + spreads_.log_weight[t]);
      deviating.push_back(b + spreads_.log_weight[t]);
    }
    if (shared_) {
      c.random_common = log_sum(common);
      c.random_deviating = log_sum(deviating);
    } else {
      c.random_common = product(own_common_);
      c.random_deviating = product(own_deviating_);
    }
    return c;
  }

 private:
  // ∫ π(μ) Π_g value_g(μ) dμ.
  [[nodiscard]] double product(const std::vector<std::vector<double>>& values) const {
    std::vector<double> terms = log_prior_;
    for (const std::vector<double>& value : values) {
      for (std::size_t j = 0; j < terms.size(); ++j) terms[j] += value[j];
    }
    return log_sum(terms);
  }

  [[nodiscard]] std::vector<double> smoothed(const std::vector<double>& log_g) const {
    const std::size_t n = log_g.size();
    const double top = *std::max_element(log_g.begin(), log_g.end());
    std::vector<double> g = log_g;
    numeric::exp_shifted(g.data(), top, n);
    std::vector<double> out(n);
    for (std::size_t k = 0; k < n; ++k) {
      const double* row = matrix_.data() + k * n;
      double sum = 0.0;
      for (std::size_t j = 0; j < n; ++j) sum += row[j] * g[j];
      out[k] = top + std::log(sum);
    }
    return out;
  }

  std::pair<double, double> at_spread(double spread, double log_weight = -infinity) {
    std::vector<std::vector<double>> common, deviating;
    for (const std::vector<std::size_t>& members : groups_) {
      std::vector<double> log_g(means_.x.size(), 0.0);
      for (const std::size_t i : members) add_log_likelihood(likelihoods_[i], spread, means_.x, log_g);
      deviating.push_back(smoothed(log_g));
      common.push_back(std::move(log_g));
    }
    if (!shared_ && log_weight > -infinity) {
      for (std::size_t g = 0; g < groups_.size(); ++g) {
        for (std::size_t j = 0; j < means_.x.size(); ++j) {
          own_common_[g][j] = numeric::log_add(own_common_[g][j], common[g][j] + log_weight);
          own_deviating_[g][j] = numeric::log_add(own_deviating_[g][j], deviating[g][j] + log_weight);
        }
      }
    }
    return {product(common), product(deviating)};
  }

  const std::vector<std::vector<std::size_t>>& groups_;
  bool shared_;
  std::vector<Likelihood> likelihoods_;
  Axis means_, spreads_;
  std::vector<double> matrix_, log_prior_;
  std::vector<std::vector<double>> own_common_, own_deviating_;
};

Diagnostic refusal(std::string code, std::string what, std::string remedy) {
  return {Severity::error, std::move(code), {}, std::move(what), std::move(remedy)};
}

bool centred(const EffectFamily& deviation) {
  if (const auto* f = std::get_if<CauchyPrior>(&deviation)) return f->location == 0.0;
  if (const auto* f = std::get_if<NormalPrior>(&deviation)) return f->mean == 0.0;
  if (const auto* f = std::get_if<StudentTPrior>(&deviation)) return f->location == 0.0;
  if (const auto* f = std::get_if<UniformPrior>(&deviation)) return f->low == -f->high;
  return false;
}

std::optional<Diagnostic> problem(std::span<const Study> studies, std::span<const std::string> labels,
                                  const Priors& priors, const GroupOptions& options) {
  if (labels.size() != studies.size()) {
    return refusal("groups-do-not-match",
                   fmt::format("There are {} group labels for {} studies.", labels.size(), studies.size()),
                   "Give one label a study.");
  }
  for (std::size_t i = 0; i < labels.size(); ++i) {
    if (!labels[i].empty()) continue;
    return refusal("group-missing",
                   fmt::format("\"{}\" belongs to no group: its cell is empty.", studies[i].label),
                   "Fill the cell, or leave the row out with --without.");
  }
  if (!centred(options.deviation)) {
    return refusal("deviation-not-centred",
                   fmt::format("The prior of group deviations, {}, is not centred at 0.",
                               to_text(EffectPrior{options.deviation})),
                   "Use a family centred at 0, for instance cauchy(0, 0.35).");
  }
  if (std::holds_alternative<FlatPrior>(priors.effect.family)) {
    return refusal("groups-improper", "A flat prior of the mean gives no Bayes factor among groups.",
                   "Use a proper prior.");
  }
  if (auto found = problem_with(EffectPrior{options.deviation})) return found;
  return problem_with(priors.effect);
}

struct Split {
  std::vector<std::string> names;
  std::vector<std::vector<std::size_t>> members;
};

Split split(std::span<const std::string> labels) {
  Split s;
  for (std::size_t i = 0; i < labels.size(); ++i) {
    const auto at = std::find(s.names.begin(), s.names.end(), labels[i]);
    const auto g = static_cast<std::size_t>(at - s.names.begin());
    if (at == s.names.end()) {
      s.names.push_back(labels[i]);
      s.members.emplace_back();
    }
    s.members[g].push_back(i);
  }
  return s;
}

LogBayesFactor bayes_factor(double fine_a, double fine_b, double coarse_a, double coarse_b) {
  const double value = fine_a - fine_b;
  return {value, std::abs(value - (coarse_a - coarse_b)) + 1e-12 * (std::abs(fine_a) + std::abs(fine_b))};
}

double average(double fixed, double random, double p_fixed, double p_random) {
  const double a = p_fixed > 0.0 ? fixed + std::log(p_fixed) : -infinity;
  const double b = p_random > 0.0 ? random + std::log(p_random) : -infinity;
  return numeric::log_add(a, b);
}

void compare(GroupResult& result, std::span<const Study> studies, const Split& groups, const Priors& priors) {
  const bool random = studies.size() > 1;
  const Compared coarse = Comparison(studies, groups.members, priors, result.options, 4).run(random);
  const Compared fine = Comparison(studies, groups.members, priors, result.options, 6).run(random);
  result.fixed =
      bayes_factor(fine.fixed_deviating, fine.fixed_common, coarse.fixed_deviating, coarse.fixed_common);
  result.random =
      bayes_factor(fine.random_deviating, fine.random_common, coarse.random_deviating, coarse.random_common);
  const double p_fixed = priors.model[static_cast<std::size_t>(Model::fixed_effect)];
  const double p_random = priors.model[static_cast<std::size_t>(Model::random_effect)];
  if (p_fixed + p_random > 0.0) {
    const auto mix = [&](double fixed, double varying) { return average(fixed, varying, p_fixed, p_random); };
    result.averaged = bayes_factor(
        mix(fine.fixed_deviating, fine.random_deviating), mix(fine.fixed_common, fine.random_common),
        mix(coarse.fixed_deviating, coarse.random_deviating), mix(coarse.fixed_common, coarse.random_common));
  }
  constexpr double promised = 1e-5;
  result.accurate = result.fixed.abs_error <= promised && result.random->abs_error <= promised;
}

}  // namespace

Outcome<GroupResult> compare_groups(std::span<const Study> studies, std::span<const std::string> labels,
                                    const Priors& priors, const GroupOptions& options) {
  if (auto found = problem(studies, labels, priors, options)) return {std::nullopt, {std::move(*found)}};
  const Split groups = split(labels);
  if (groups.names.size() < 2) {
    return {std::nullopt,
            {refusal("one-group", fmt::format("There is {} group.", groups.names.empty() ? "no" : "only one"),
                     "Name a column with at least two different labels.")}};
  }
  GroupResult result;
  result.options = options;
  PoolOptions pooling;
  pooling.level = options.level;
  pooling.shrunken = false;
  for (std::size_t g = 0; g < groups.names.size(); ++g) {
    std::vector<Study> members;
    for (const std::size_t i : groups.members[g]) members.push_back(studies[i]);
    Outcome<PoolResult> pooled = pool(members, priors, pooling);
    if (!pooled.ok()) return {std::nullopt, std::move(pooled.diagnostics)};
    result.groups.push_back({groups.names[g], groups.members[g], std::move(*pooled.value)});
  }
  compare(result, studies, groups, priors);
  return {std::move(result), {}};
}

}  // namespace steelyard
