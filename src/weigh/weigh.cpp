// Each study alone.
#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <functional>
#include <variant>
#include <vector>

#include "steelyard/numeric.hpp"
#include "steelyard/weigh.hpp"
#include "weigh/bound.hpp"
#include "weigh/rounding.hpp"
#include "weigh/search.hpp"

namespace steelyard {

namespace {

using namespace weighing;

constexpr double default_expected = 0.5;  // a medium effect in Cohen's words, in SD units

// One study's marginal likelihood under a prior against no effect.
class Scale {
 public:
  explicit Scale(Evidence evidence) : study_{{std::move(evidence), 1.0, std::nullopt, false}} {
    none_ = log_marginal_fixed_at(study_, 0.0);
  }
  [[nodiscard]] LogBayesFactor weigh(const EffectPrior& prior, bool& accurate) const {
    const Integral integral = log_marginal_fixed(study_, prior);
    accurate = accurate && integral.status == IntegralStatus::ok && none_.status == IntegralStatus::ok;
    return {integral.log_value - none_.log_value, integral.abs_error + none_.abs_error};
  }
  [[nodiscard]] double log_bf(const EffectPrior& prior) const {
    return log_marginal_fixed(study_, prior).log_value - none_.log_value;
  }

 private:
  std::vector<Likelihood> study_;
  Integral none_;
};

// The side to which the evidence points; +1 when it doesn't say.
double side_of(const Evidence& evidence) {
  if (const auto* exact = std::get_if<ExactT>(&evidence))
    return exact->t < 0.0 && !exact->folded ? -1.0 : 1.0;
  if (const auto* normal = std::get_if<NormalEstimate>(&evidence)) {
    return normal->estimate < 0.0 && !normal->folded ? -1.0 : 1.0;
  }
  const auto& bands = std::get<BandT>(evidence).bands;
  const bool all_below =
      std::all_of(bands.begin(), bands.end(), [](const Interval& band) { return band.high <= 0.0; });
  return all_below ? -1.0 : 1.0;
}

void weigh_directions(Weighing& w, const Scale& scale, const EffectPrior& prior, bool& accurate) {
  const auto cut = [&](Direction direction) -> std::optional<LogBayesFactor> {
    if (direction == prior.direction) return w.bf;
    const EffectPrior other{prior.family, direction};
    if (problem_with(other)) return std::nullopt;
    return scale.weigh(other, accurate);
  };
  w.either = cut(Direction::either);
  w.greater = cut(Direction::greater);
  w.less = cut(Direction::less);
}

void weigh_attitudes(Weighing& w, const Scale& scale, const Study& study, const EffectPrior& prior,
                     const WeighOptions& options, bool& accurate) {
  if (!options.expected && study.metric != "smd") return;
  const double expected = options.expected.value_or(default_expected);
  const double side = prior.direction == Direction::either ? side_of(study.evidence)
                      : prior.direction == Direction::less ? -1.0
                                                           : 1.0;
  w.enthusiast_side = side > 0.0 ? "greater" : "less";
  w.sceptic = scale.weigh(sceptical_prior(expected), accurate);
  w.enthusiast = scale.weigh(enthusiastic_prior(side * expected), accurate);
}

// Where, on a prior wider or narrower than the given one, the Bayes factor passes 1.
void find_turning_width(Weighing& w, const Scale& scale, const EffectPrior& prior) {
  const std::optional<double> width = width_of(prior);
  if (!width) return;
  // Below this a Bayes factor can't be told from 1.
  constexpr double level = 1e-7;
  const auto log_bf = [&](double log_factor) {
    return scale.log_bf(with_width(prior, std::exp(log_factor)));
  };
  const bool shrinking = w.bf.log_bf < 0.0;
  const double step = shrinking ? -std::log(2.0) : std::log(2.0);
  const double farthest = shrinking ? -std::log(1000.0) : std::log(10000.0);
  double a = 0.0;
  double fa = w.bf.log_bf;
  while (std::abs(a) < std::abs(farthest)) {
    const double b = a + step;
    const EffectPrior changed = with_width(prior, std::exp(b));
    if (problem_with(changed)) return;
    const double fb = log_bf(b);
    if (shrinking ? fb > level : fb < -level) {
      const double at = zero(log_bf, a, fa, b, fb, 1e-9);
      w.turning_factor = std::exp(at);
      w.turning_width = *width * *w.turning_factor;
      return;
    }
    a = b;
    fa = fb;
  }
}

Translated translated(const Summary& effect, const std::function<double(double)>& change) {
  return {change(*effect.median), change(*effect.lower), change(*effect.upper)};
}

void translate(Weighing& w, const Study& study) {
  if (!w.effect.median || !w.effect.lower || !w.effect.upper) return;
  if (study.metric == "smd") {
    // A random difference of two scores has variance 2; a single score is compared with a constant.
    const double per_sd = study.design == Design::one_sample ? 1.0 : std::sqrt(0.5);
    w.superiority = translated(w.effect, [per_sd](double d) { return numeric::normal_cdf(d * per_sd); });
  }
  if (study.raw_sd) w.raw = translated(w.effect, [&](double d) { return d * *study.raw_sd; });
}

Outcome<PoolResult> posterior_alone(const Study& study, const Priors& priors, double level) {
  PoolOptions options;
  options.level = level;
  options.shrunken = false;
  return pool({&study, 1}, priors, options);
}

Outcome<Weighing> weigh_one(const Study& study, std::size_t index, const EffectPrior& prior,
                            const WeighOptions& options, bool& accurate) {
  Priors priors;
  priors.effect = prior;
  priors.model = {0.5, 0.5, 0.0, 0.0};
  Outcome<PoolResult> pooled = posterior_alone(study, priors, options.level);
  if (!pooled.ok()) return {std::nullopt, std::move(pooled.diagnostics)};
  Weighing w;
  w.study = index;
  w.effect = pooled.value->pooled_effect_fixed;
  const Scale scale(study.evidence);
  w.bf = scale.weigh(prior, accurate);
  weigh_directions(w, scale, prior, accurate);
  weigh_attitudes(w, scale, study, prior, options, accurate);
  w.rounding = rounding_range(study, prior.direction,
                              [&prior](const Evidence& evidence) { return Scale(evidence).log_bf(prior); });
  find_turning_width(w, scale, prior);
  w.bound = likelihood_bound(study.evidence, prior.direction);
  w.p = two_sided_p(study.evidence);
  if (w.p) w.log_p_bound = log_sellke_bound(*w.p);
  translate(w, study);
  if (options.region) {
    auto region = weigh_region(*pooled.value, priors, {&study, 1}, *options.region);
    if (!region.ok()) return {std::nullopt, std::move(region.diagnostics)};
    w.region = std::move(*region.value);
  }
  w.cautions = pooled.value->cautions;
  return {std::move(w), {}};
}

// Quantile of sorted values by linear interpolation between order statistics.
double sorted_quantile(const std::vector<double>& sorted, double p) {
  const double at = p * static_cast<double>(sorted.size() - 1);
  const auto below = static_cast<std::size_t>(at);
  const std::size_t above = std::min(below + 1, sorted.size() - 1);
  return sorted[below] + (at - static_cast<double>(below)) * (sorted[above] - sorted[below]);
}

WeighSpread spread_of(const std::vector<Weighing>& rows) {
  constexpr double decibans_per_nat = 4.3429448190325182765;
  std::vector<double> sorted;
  for (const Weighing& w : rows) sorted.push_back(decibans_per_nat * w.bf.log_bf);
  std::sort(sorted.begin(), sorted.end());
  WeighSpread spread;
  spread.count = sorted.size();
  spread.least = sorted.front();
  spread.lower_quartile = sorted_quantile(sorted, 0.25);
  spread.median = sorted_quantile(sorted, 0.5);
  spread.upper_quartile = sorted_quantile(sorted, 0.75);
  spread.most = sorted.back();
  for (const double db : sorted) {
    spread.for_effect += db > 0.0 ? 1 : 0;
    spread.for_none += db < 0.0 ? 1 : 0;
    spread.clearly_for_effect += db >= 10.0 ? 1 : 0;
    spread.clearly_for_none += db <= -10.0 ? 1 : 0;
  }
  return spread;
}

std::optional<Diagnostic> problem(std::span<const Study> studies, const EffectPrior& prior,
                                  const WeighOptions& options) {
  const auto refusal = [](std::string code, std::string what, std::string remedy) {
    return Diagnostic{Severity::error, std::move(code), {}, std::move(what), std::move(remedy)};
  };
  if (studies.empty())
    return refusal("no-studies", "There are no studies to weigh.", "Give at least one row.");
  if (!(options.level > 0.0 && options.level < 1.0)) {
    return refusal("level-out-of-range", fmt::format("The level of the intervals is {}.", options.level),
                   "It must lie between 0 and 1, for instance 0.95.");
  }
  if (options.expected && !(*options.expected > 0.0 && *options.expected <= 1e6)) {
    return refusal("expected-out-of-range",
                   fmt::format("The effect that is expected or doubted is {}.", *options.expected),
                   "It must be positive, for instance 0.5.");
  }
  return problem_with(prior);
}

}  // namespace

Outcome<WeighResult> weigh(std::span<const Study> studies, const EffectPrior& prior,
                           const WeighOptions& options) {
  if (auto found = problem(studies, prior, options)) return {std::nullopt, {std::move(*found)}};
  WeighResult result;
  for (std::size_t i = 0; i < studies.size(); ++i) {
    auto one = weigh_one(studies[i], i, prior, options, result.accurate);
    if (!one.ok()) return {std::nullopt, std::move(one.diagnostics)};
    result.rows.push_back(std::move(*one.value));
  }
  result.spread = spread_of(result.rows);
  return {std::move(result), {}};
}

}  // namespace steelyard
