// Regions, directions and thresholds: what a pooled posterior says about where the effect lies.
#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cmath>
#include <limits>
#include <vector>

#include "pool/line.hpp"
#include "steelyard/numeric.hpp"
#include "steelyard/weigh.hpp"

namespace steelyard {

namespace {

// Masses are known to 1e-8; below this a ratio of them would have fewer than two digits.
constexpr double least_mass = 1e-6;
constexpr double mass_error = 1e-8;

Diagnostic refusal(std::string code, std::string what, std::string remedy) {
  return {Severity::error, std::move(code), {}, std::move(what), std::move(remedy)};
}

std::vector<Likelihood> likelihoods(std::span<const Study> studies) {
  std::vector<Likelihood> all;
  for (const Study& study : studies) all.push_back(likelihood(study));
  return all;
}

double posterior_of(const PoolResult& result, Model model) { return result.at(model).posterior_probability; }

double effect_models(const PoolResult& result) {
  return posterior_of(result, Model::fixed_effect) + posterior_of(result, Model::random_effect);
}

// The probability that a new study's effect lies in (low, high] when effects vary around no effect at all:
// ∫ [Φ(high/τ) − Φ(low/τ)] p(τ | data) dτ.
double null_new_study(std::span<const Study> studies, const SpreadPrior& spread, double low, double high) {
  const std::vector<Likelihood> all = likelihoods(studies);
  std::vector<double> breaks = {0.0};
  for (const double p : {1e-10, 1e-5, 1e-3, 0.02, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9, 0.98, 0.999,
                         1.0 - 1e-5, 1.0 - 1e-9}) {
    const double x = quantile(spread, p);
    if (x > breaks.back() && std::isfinite(x)) breaks.push_back(x);
  }
  const pool_room::Line line(
      [&](double tau) {
        double sum = log_density(spread, tau);
        if (!std::isfinite(sum)) return sum;
        for (const Likelihood& one : all) sum += log_likelihood(one, 0.0, tau);
        return sum;
      },
      std::move(breaks));
  return line.expectation(
      [low, high](double tau) { return numeric::normal_cdf(high / tau) - numeric::normal_cdf(low / tau); });
}

// All models that can be told apart and have prior mass.
bool every_model_identified(const PoolResult& result) {
  return std::all_of(result.models.begin(), result.models.end(), [](const ModelResult& model) {
    return model.prior_probability == 0.0 || model.integral.has_value();
  });
}

// Evidence for inside against outside, given the masses before and after.
void negligible(RegionResult& result, double prior, double posterior) {
  if (prior < least_mass || prior > 1.0 - least_mass) {
    result.reason =
        fmt::format("The prior puts {} of its mass inside the region, so there is nothing to compare with.",
                    prior < 0.5 ? "none" : "all");
    return;
  }
  const double log_prior_odds = std::log(prior) - std::log1p(-prior);
  const double held = std::clamp(posterior, least_mass, 1.0 - least_mass);
  const double log_bf = std::log(held) - std::log1p(-held) - log_prior_odds;
  if (held != posterior) {
    result.negligible_limit = log_bf;
    result.reason =
        fmt::format("Less than a millionth of the posterior lies {} the region; a bound is given.",
                    posterior < 0.5 ? "inside" : "outside");
    return;
  }
  result.negligible = LogBayesFactor{log_bf, mass_error / (held * (1.0 - held))};
}

double log_add_weighted(double log_a, double a, double log_b, double b) {
  const double infinity = std::numeric_limits<double>::infinity();
  return numeric::log_add(a > 0.0 ? log_a + std::log(a) : -infinity,
                          b > 0.0 ? log_b + std::log(b) : -infinity);
}

// Odds of the sign from marginal likelihoods of the two halves of the prior, so that they stay exact where
// a probability would round to 1.
std::optional<double> sign_odds(const PoolResult& result, const Priors& priors,
                                std::span<const Study> studies) {
  if (priors.effect.direction != Direction::either) return std::nullopt;
  const EffectPrior up{priors.effect.family, Direction::greater};
  const EffectPrior down{priors.effect.family, Direction::less};
  if (problem_with(up) || problem_with(down)) return std::nullopt;
  const double log_prior_odds = std::log(upper_cdf(priors.effect, 0.0)) - std::log(cdf(priors.effect, 0.0));
  if (!std::isfinite(log_prior_odds)) return std::nullopt;
  const std::vector<Likelihood> all = likelihoods(studies);
  const double fixed = priors.model[static_cast<std::size_t>(Model::fixed_effect)];
  const double random = result.at(Model::random_effect).integral
                            ? priors.model[static_cast<std::size_t>(Model::random_effect)]
                            : 0.0;
  const auto marginal = [&](const EffectPrior& prior) {
    const double log_fixed = fixed > 0.0 ? log_marginal_fixed(all, prior).log_value : 0.0;
    const double log_random = random > 0.0 ? log_marginal_random(all, prior, priors.spread).log_value : 0.0;
    return log_add_weighted(log_fixed, fixed, log_random, random);
  };
  return marginal(up) - marginal(down) + log_prior_odds;
}

void all_models(RegionResult& result, const PoolResult& pooled, const Priors& priors,
                std::span<const Study> studies, const RegionOptions& options) {
  if (!every_model_identified(pooled)) return;
  const double effect = effect_models(pooled);
  const double fixed_null = posterior_of(pooled, Model::fixed_null);
  const double random_null = posterior_of(pooled, Model::random_null);
  const double zero_inside = options.region.low <= 0.0 && options.region.high >= 0.0 ? 1.0 : 0.0;
  result.mean_effect.inside_all_models =
      effect * result.mean_effect.inside + (fixed_null + random_null) * zero_inside;
  const auto under_null = [&](double low, double high) {
    return random_null > 0.0 ? random_null * null_new_study(studies, priors.spread, low, high) : 0.0;
  };
  result.new_study.inside_all_models = effect * result.new_study.inside + fixed_null * zero_inside +
                                       under_null(options.region.low, options.region.high);
  if (!options.threshold) return;
  const double infinity = std::numeric_limits<double>::infinity();
  result.above_threshold_all_models = effect * *result.above_threshold +
                                      fixed_null * (*options.threshold < 0.0 ? 1.0 : 0.0) +
                                      under_null(*options.threshold, infinity);
}

std::optional<Diagnostic> problem(const PoolResult& result, const Priors& priors,
                                  const RegionOptions& options) {
  if (!(options.region.low < options.region.high) || !std::isfinite(options.region.low) ||
      !std::isfinite(options.region.high)) {
    return refusal("region-empty",
                   fmt::format("The region from {} to {} is empty.", options.region.low, options.region.high),
                   "Give a lower and a larger upper end, for instance -0.1:0.1.");
  }
  if (options.threshold && !std::isfinite(*options.threshold)) {
    return refusal("threshold-not-finite", "The threshold is not a finite number.",
                   "Give a number such as 0.2.");
  }
  if (std::holds_alternative<FlatPrior>(priors.effect.family)) {
    return refusal("region-improper", "A flat prior has no mass in any region.", "Use a proper prior.");
  }
  if (!result.posterior || !(effect_models(result) > 0.0)) {
    return refusal("region-without-posterior", "The result carries no posterior of the effect.",
                   "Pool with summaries, and give a model with an effect some prior probability.");
  }
  return std::nullopt;
}

}  // namespace

Outcome<RegionResult> weigh_region(const PoolResult& pooled, const Priors& priors,
                                   std::span<const Study> studies, const RegionOptions& options) {
  if (auto found = problem(pooled, priors, options)) return {std::nullopt, {std::move(*found)}};
  RegionResult result;
  result.asked = options;
  const Posterior& posterior = *pooled.posterior;
  const auto [low, high] = options.region;
  const auto within = [](double mass) { return std::clamp(mass, 0.0, 1.0); };
  result.prior_inside = within(cdf(priors.effect, high) - cdf(priors.effect, low));
  result.mean_effect.inside =
      within(posterior.effect_cdf(Within::average, high) - posterior.effect_cdf(Within::average, low));
  result.new_study.inside =
      within(posterior.new_study_cdf(Within::average, high) - posterior.new_study_cdf(Within::average, low));
  result.positive = within(1.0 - posterior.effect_cdf(Within::average, 0.0));
  result.log_sign_odds = sign_odds(pooled, priors, studies);
  if (options.threshold) {
    result.above_threshold = within(1.0 - posterior.new_study_cdf(Within::average, *options.threshold));
  }
  negligible(result, result.prior_inside, result.mean_effect.inside);
  all_models(result, pooled, priors, studies, options);
  return {std::move(result), {}};
}

}  // namespace steelyard
