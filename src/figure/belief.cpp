// How the data moved belief: quantiles before, after, and for a new study.
#include <algorithm>
#include <cmath>

#include <fmt/format.h>

#include "steelyard/figure.hpp"

namespace steelyard::figure {
namespace {

const std::vector<double> shares = {0.025, 0.1, 0.25, 0.5, 0.75, 0.9, 0.975};

/// Whether whether there is an effect and whether it varies are independent beforehand.
bool independent(const Priors& priors) {
  const auto& p = priors.model;
  return std::fabs(p[0] * p[3] - p[1] * p[2]) <= 1e-12;
}

/// The ratio of densities at 0, where it is the Bayes factor, and the sentence about it.
void add_ratio(const Analysis& analysis, Belief& out) {
  const Priors& priors = analysis.options.priors;
  const double before = log_density(priors.effect, 0.0);
  const bool single = analysis.studies.size() < 2;
  if (!std::isfinite(before)) {
    out.ratio_note =
        "The prior has no density at 0, so the ratio of densities there says nothing about the Bayes factor.";
    return;
  }
  if (!single && !independent(priors)) {
    out.ratio_note =
        "The model probabilities tie the two questions together, so the ratio of densities at 0 is not the "
        "averaged "
        "Bayes factor.";
    return;
  }
  const Within within = single ? Within::fixed_effect : Within::average;
  const double after = analysis.result.posterior->effect_density(within, 0.0);
  const auto& evidence = single ? analysis.result.effect_fixed : analysis.result.effect;
  if (!(after > 0)) {
    out.ratio_note = "The posterior density at 0 is too small to print; the Bayes factor holds.";
    if (evidence) out.log_ratio_at_zero = evidence->log_bf;
    return;
  }
  out.log_ratio_at_zero = before - std::log(after);
  const bool fell = *out.log_ratio_at_zero >= 0;
  out.ratio_note =
      fmt::format("At no effect the density {} {}-fold, from {:.3g} to {:.3g}: that is the Bayes factor{}.",
                  fell ? "fell" : "rose", ratio_text(std::fabs(*out.log_ratio_at_zero)), std::exp(before),
                  after, fell ? " for an effect" : " for no effect");
}

BeliefStage prior_stage(const EffectPrior& prior) {
  BeliefStage out{"before the data", {}, upper_cdf(prior, 0.0)};
  for (const double share : shares) out.quantiles.push_back(quantile(prior, share));
  return out;
}

template <class Quantile, class Cdf>
BeliefStage stage(std::string label, const Quantile& quantile_at, const Cdf& cdf_at) {
  BeliefStage out{std::move(label), {}, 1.0 - cdf_at(0.0)};
  for (const double share : shares) out.quantiles.push_back(quantile_at(share));
  return out;
}

/// Holds all of what is believed after the data and the middle four fifths of what was before, unless that
/// is so wide that the rest could not be seen.
Scale frame(const Belief& belief, const std::string& title) {
  double low = 0.0, high = 0.0;
  for (std::size_t i = 1; i < belief.stages.size(); ++i) {
    low = std::min(low, belief.stages[i].quantiles.front());
    high = std::max(high, belief.stages[i].quantiles.back());
  }
  const double width = std::max(high - low, 1e-300);
  const auto& prior = belief.stages.front().quantiles;
  low = std::max(std::min(low, prior[1]), low - width);
  high = std::min(std::max(high, prior[prior.size() - 2]), high + width);
  const double margin = 0.04 * (high - low);
  return {low - margin, high + margin, false, title};
}

std::string finding(const Belief& belief) {
  const int decimals = decimals_for(belief.effect.high - belief.effect.low);
  std::string out = "Middle 95% of belief: ";
  for (std::size_t i = 0; i < belief.stages.size(); ++i) {
    const BeliefStage& stage = belief.stages[i];
    out += fmt::format("{}{}, {} to {} ({} above 0)", i == 0 ? "" : "; ", stage.label,
                       number_text(stage.quantiles.front(), decimals),
                       number_text(stage.quantiles.back(), decimals), percent_text(stage.above_zero));
  }
  return out + ". " + belief.ratio_note;
}

}  // namespace

Outcome<Belief> belief(const Analysis& analysis) {
  const auto& posterior = analysis.result.posterior;
  if (!posterior) {
    Diagnostic problem;
    problem.code = "no-belief";
    problem.what = "The belief figure needs the posterior, which this analysis did not keep.";
    problem.remedy = "Pool with summaries.";
    return {std::nullopt, {problem}};
  }
  const Within within = analysis.studies.size() < 2 ? Within::fixed_effect : Within::average;
  Belief out;
  out.probabilities = shares;
  out.stages.push_back(prior_stage(analysis.options.priors.effect));
  out.stages.push_back(stage(
      "after the data", [&](double p) { return posterior->effect_quantile(within, p); },
      [&](double x) { return posterior->effect_cdf(within, x); }));
  out.stages.push_back(stage(
      "for a new study", [&](double p) { return posterior->new_study_quantile(within, p); },
      [&](double x) { return posterior->new_study_cdf(within, x); }));
  out.effect = frame(out, "if there is an effect: " + effect_name(analysis.studies));
  add_ratio(analysis, out);
  out.words = {"How the data moved belief about the effect", finding(out)};
  return {std::move(out), {}};
}

}  // namespace steelyard::figure
