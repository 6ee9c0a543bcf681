// Room "weigh": each study alone, and what a posterior says about regions, directions and thresholds.
#pragma once

#include <cstddef>
#include <optional>
#include <span>
#include <string>
#include <vector>

#include "steelyard/base.hpp"
#include "steelyard/pool.hpp"
#include "steelyard/study.hpp"

namespace steelyard {

// ---- regions, directions, thresholds --------------------------------------------------------------

/// Questions about where the effect lies.
struct RegionOptions {
  Interval region = {-0.1, 0.1};    ///< effects that are practically negligible, low < high
  std::optional<double> threshold;  ///< P(effect in a new study > threshold)
};

/// What the posterior says about one quantity (the mean effect, or the effect in a new study).
struct RegionMass {
  double inside = 0.0;  ///< P(in the region), given an effect model
  /// The same over all models with prior mass: the same-effect null counts as an effect of exactly 0, and in
  /// a new study under varying effects without a mean effect the effect is Normal(0, τ²). Absent when a
  /// model with prior mass isn't identified.
  std::optional<double> inside_all_models;
};

/// Formulas: docs/methods.md.
struct RegionResult {
  RegionOptions asked;
  /// Evidence for a negligible effect: posterior odds ÷ prior odds of inside against outside, under the
  /// effect models (Morey & Rouder 2011). Absent, with `reason`, when the prior or the posterior leaves
  /// less than 1e-6 on a side: then `negligible_limit` bounds it on that side.
  std::optional<LogBayesFactor> negligible;
  std::optional<double>
      negligible_limit;  ///< log Bayes factor is beyond this (above when > 0, below when < 0)
  std::string reason;
  double prior_inside = 0.0;  ///< prior mass of the region
  RegionMass mean_effect, new_study;
  double positive = 0.0;  ///< P(mean effect > 0), given an effect model
  /// log odds of a positive against a negative mean effect, given an effect model, exact in logarithms;
  /// absent when the prior allows one sign only.
  std::optional<double> log_sign_odds;
  std::optional<double> above_threshold;  ///< P(effect in a new study > threshold), given an effect model
  std::optional<double> above_threshold_all_models;
};

/// `result` must come with its posterior (summaries). Error when it has none, or the region is empty.
[[nodiscard]] Outcome<RegionResult> weigh_region(const PoolResult& result, const Priors& priors,
                                                 std::span<const Study> studies,
                                                 const RegionOptions& options);

// ---- each study alone -----------------------------------------------------------------------------

struct WeighOptions {
  double level = 0.95;  ///< of the central credible intervals, 0 < level < 1
  /// The effect that the sceptic doubts and the enthusiast expects (Spiegelhalter, Freedman & Parmar
  /// 1994), > 0, in the study's metric. Absent: 0.5 for `smd`, and nothing for other metrics.
  std::optional<double> expected;
  std::optional<RegionOptions> region;
};

/// The largest likelihood of any effect against no effect: no prior can make more of the study.
struct LikelihoodBound {
  double log_bf = 0.0;
  std::optional<double> effect;  ///< where it is reached; absent when only approached without end
};

struct LogRange {
  std::optional<double> low, high;  ///< absent: without end on that side
};

/// Median and central interval of a quantity that follows from the effect.
struct Translated {
  double median = 0.0, lower = 0.0, upper = 0.0;
};

struct Weighing {
  std::size_t study = 0;  ///< index into the studies given
  LogBayesFactor bf;      ///< the effect prior, cut to its direction, against no effect
  /// The same prior family uncut, and cut to either side; absent where the cut leaves no mass.
  std::optional<LogBayesFactor> either, greater, less;
  Summary effect;                    ///< posterior under the effect prior
  std::optional<LogRange> rounding;  ///< of bf.log_bf over what the printed digits allow
  std::optional<LogBayesFactor> sceptic, enthusiast;
  std::string enthusiast_side;  ///< "greater" or "less": what the enthusiast expects
  /// The factor on the prior's width at which the Bayes factor passes 1 and how wide the prior then is
  /// (its scale, sd, or half width); absent when it never does between 1/1000 and 10,000.
  std::optional<double> turning_factor;
  std::optional<double> turning_width;
  LikelihoodBound bound;              ///< Edwards, Lindman & Savage (1963)
  std::optional<double> p;            ///< two-sided p of an exact t or an estimate
  std::optional<double> log_p_bound;  ///< log of 1/(−e·p·log p), for p < 1/e (Sellke et al. 2001)
  /// P(a random member of group 1 beats one of group 2) = Φ(δ/√2); one sample: P(a score is above the
  /// comparison value) = Φ(δ). Only for `smd`.
  std::optional<Translated> superiority;
  std::optional<Translated> raw;  ///< effect × SD in raw units, where an SD is known
  std::optional<RegionResult> region;
  std::vector<Diagnostic> cautions;
};

/// How the evidence of the rows is distributed (decibans; > 0 favours an effect).
struct WeighSpread {
  std::size_t count = 0;
  double least = 0.0, lower_quartile = 0.0, median = 0.0, upper_quartile = 0.0, most = 0.0;
  std::size_t for_effect = 0;          ///< rows above 0
  std::size_t for_none = 0;            ///< rows below 0
  std::size_t clearly_for_effect = 0;  ///< +10 decibans (10 to 1) or more
  std::size_t clearly_for_none = 0;    ///< −10 decibans or less
};

struct WeighResult {
  std::vector<Weighing> rows;  ///< one a study, in their order
  WeighSpread spread;
  bool accurate = true;
};

/// Weighs each study alone. Pure. Error when there are none, the prior is unusable, or an option is out
/// of its range. Metrics may differ between rows; the caller sees to it that the prior fits them.
[[nodiscard]] Outcome<WeighResult> weigh(std::span<const Study> studies, const EffectPrior& prior,
                                         const WeighOptions& options = {});

/// The bound of Sellke, Bayarri & Berger (2001): log(1/(−e·p·log p)); nothing unless 0 < p < 1/e.
[[nodiscard]] std::optional<double> log_sellke_bound(double p);

/// The sceptic's and the enthusiast's prior for an expected effect: Normal with sd expected/z(.95),
/// around 0 (5 % left beyond the expected effect) and around the expected effect (5 % on the wrong side).
[[nodiscard]] EffectPrior sceptical_prior(double expected);
[[nodiscard]] EffectPrior enthusiastic_prior(double expected);  ///< expected < 0: the other side

/// The same prior with its width multiplied; location and direction stay (a uniform keeps its middle).
[[nodiscard]] EffectPrior with_width(const EffectPrior& prior, double factor);
[[nodiscard]] SpreadPrior with_scale(const SpreadPrior& prior, double factor);
/// The width that `with_width` multiplies: scale, sd or half width (flat: absent).
[[nodiscard]] std::optional<double> width_of(const EffectPrior& prior);

}  // namespace steelyard
