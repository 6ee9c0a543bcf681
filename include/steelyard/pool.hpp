// Room "pool": the four models, their marginal likelihoods and what follows from them.
#pragma once

#include <array>
#include <cstddef>
#include <memory>
#include <optional>
#include <span>
#include <string>
#include <vector>

#include "steelyard/base.hpp"
#include "steelyard/model.hpp"
#include "steelyard/study.hpp"

namespace steelyard {

/// The four models, in this order everywhere.
enum class Model { fixed_null, fixed_effect, random_null, random_effect };
inline constexpr std::size_t model_count = 4;
[[nodiscard]] std::string_view id(Model model);  ///< "fixed_null", ...

/// Everything assumed before the data.
struct Priors {
  EffectPrior effect;
  SpreadPrior spread;
  std::array<double, model_count> model = {0.25, 0.25, 0.25, 0.25};  ///< ≥ 0, sum 1
};

struct PoolOptions {
  double level = 0.95;                ///< of the central credible intervals, 0 < level < 1
  bool summaries = true;              ///< false: marginal likelihoods and evidence only
  bool shrunken = true;               ///< the studies' own effects
  std::size_t shrunken_limit = 2000;  ///< beyond that many studies shrunken effects are null, with a caution
};

/// How an integral ended.
enum class IntegralStatus { ok, accuracy_not_reached, not_identified };
[[nodiscard]] std::string_view to_text(IntegralStatus status);

/// A log marginal likelihood. `abs_error` bounds |log_value − truth|, rounding included; the promise
/// is abs_error ≤ max(1e-8, 8ε·Σ(λ²+|log L|)), and `status` says when it was not kept.
struct Integral {
  double log_value = 0.0;
  double abs_error = 0.0;
  std::size_t evaluations = 0;  ///< nodes (mean, spread) at which the studies were evaluated
  IntegralStatus status = IntegralStatus::not_identified;
};

struct ModelResult {
  Model model = Model::fixed_null;
  double prior_probability = 0.25;
  double posterior_probability = 0.0;
  std::optional<Integral> integral;  ///< absent: not identified (a single study has no heterogeneity)
};

/// A log Bayes factor (natural log) with the error that follows from its integrals.
struct LogBayesFactor {
  double log_bf = 0.0;
  double abs_error = 0.0;
};

/// What is known about one quantity after the data. An absent number doesn't exist or isn't identified;
/// `reason` then says why in a sentence.
struct Summary {
  std::optional<double> mean, sd, median, lower, upper;
  std::string reason;
};

/// Posterior density, distribution function and quantiles of the quantities, for figures and for the
/// commands that ask more. Obtained from PoolResult::posterior; immutable; safe to share among threads.
class Posterior;

struct StudyResult {
  double log_bf = 0.0;  ///< this study alone: effect prior (cut to the direction) against no effect
  double log_bf_error = 0.0;
  Summary shrunken;  ///< the study's own effect, averaged over the two effect models
};

struct PoolResult {
  std::array<ModelResult, model_count> models;
  /// Posterior odds ÷ prior odds of the class; absent when a side has no prior mass or isn't identified.
  std::optional<LogBayesFactor> effect, effect_fixed, effect_random, heterogeneity;
  Summary pooled_effect, pooled_effect_fixed, pooled_effect_random, spread, new_study, i2;
  std::vector<StudyResult> studies;
  std::vector<Diagnostic> cautions;
  std::shared_ptr<const Posterior> posterior;  ///< null without summaries
  bool accurate = true;                        ///< every integral kept its promise

  [[nodiscard]] const ModelResult& at(Model model) const { return models[static_cast<std::size_t>(model)]; }
};

/// Pools. Pure: same input, same bytes. Error (absent value) when the studies are empty, metrics are
/// mixed, priors are unusable, options out of range, or the metric isn't `smd` and `priors_are_explicit` is
/// false.
[[nodiscard]] Outcome<PoolResult> pool(std::span<const Study> studies, const Priors& priors,
                                       const PoolOptions& options = {});

/// The two marginal likelihoods a caller may want of arbitrary likelihoods.
[[nodiscard]] Integral log_marginal_fixed(std::span<const Likelihood> studies, const EffectPrior& effect);
[[nodiscard]] Integral log_marginal_random(std::span<const Likelihood> studies, const EffectPrior& effect,
                                           const SpreadPrior& spread);
/// The same with the mean held at a value (the no-effect models: 0).
[[nodiscard]] Integral log_marginal_fixed_at(std::span<const Likelihood> studies, double mean);
[[nodiscard]] Integral log_marginal_random_at(std::span<const Likelihood> studies, double mean,
                                              const SpreadPrior& spread);

/// Which of the averaged answers.
enum class Within { fixed_effect, random_effect, average };

class Posterior {
 public:
  virtual ~Posterior() = default;
  /// Mean effect μ (average: over the two effect models).
  [[nodiscard]] virtual double effect_density(Within within, double x) const = 0;
  [[nodiscard]] virtual double effect_cdf(Within within, double x) const = 0;
  [[nodiscard]] virtual double effect_quantile(Within within, double p) const = 0;
  /// Spread τ under random_effect (0 and NaN when not identified).
  [[nodiscard]] virtual double spread_density(double x) const = 0;
  [[nodiscard]] virtual double spread_cdf(double x) const = 0;
  [[nodiscard]] virtual double spread_quantile(double p) const = 0;
  /// The effect in a new study, likewise averaged over the two effect models, or within one.
  [[nodiscard]] virtual double new_study_density(Within within, double x) const = 0;
  [[nodiscard]] virtual double new_study_cdf(Within within, double x) const = 0;
  [[nodiscard]] virtual double new_study_quantile(Within within, double p) const = 0;
  /// Joint log posterior density of (μ, τ) under random_effect.
  [[nodiscard]] virtual double joint_log_density(double effect, double spread) const = 0;
};

}  // namespace steelyard
