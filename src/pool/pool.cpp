// Pools: checks the request, runs the four integrals, weighs the models, joins the summaries.
#include <algorithm>
#include <cmath>
#include <set>
#include <utility>

#include "pool/cautions.hpp"
#include "pool/evidence.hpp"
#include "pool/posterior.hpp"
#include "pool/request.hpp"
#include "steelyard/numeric.hpp"
#include "steelyard/pool.hpp"

namespace steelyard {

std::string_view id(Model model) {
  switch (model) {
    case Model::fixed_null:
      return "fixed_null";
    case Model::fixed_effect:
      return "fixed_effect";
    case Model::random_null:
      return "random_null";
    case Model::random_effect:
      return "random_effect";
  }
  return "";
}

std::string_view to_text(IntegralStatus status) {
  switch (status) {
    case IntegralStatus::ok:
      return "ok";
    case IntegralStatus::accuracy_not_reached:
      return "accuracy_not_reached";
    case IntegralStatus::not_identified:
      return "not_identified";
  }
  return "";
}

namespace {

using pool_room::Pooled;
using pool_room::PooledPosterior;

/// The evidence of each study taken alone: same-effect model, effect prior against no effect.
std::vector<StudyResult> single_studies(std::span<const Likelihood> likelihoods,
                                        const pool_room::PriorBlock& prior) {
  std::vector<StudyResult> out(likelihoods.size());
  for (std::size_t i = 0; i < likelihoods.size(); ++i) {
    const pool_room::Field field(likelihoods.subspan(i, 1));
    const Integral effect = pool_room::fixed_effect(field, prior, false).integral;
    const Integral null = pool_room::fixed_at(field, 0.0);
    out[i].log_bf = effect.log_value - null.log_value;
    out[i].log_bf_error = effect.abs_error + null.abs_error;
  }
  return out;
}

void run_models(Pooled& pooled, PoolResult& result, bool summaries) {
  const bool several = pooled.field.size() > 1;
  pooled.fixed = pool_room::fixed_effect(pooled.field, pooled.prior, false);
  auto& models = result.models;
  for (std::size_t m = 0; m < model_count; ++m) {
    models[m].model = static_cast<Model>(m);
    models[m].prior_probability = pooled.priors.model[m];
  }
  models[0].integral = pool_room::fixed_at(pooled.field, 0.0);
  models[1].integral = pooled.fixed.integral;
  if (several) {
    models[2].integral = pool_room::random_at(pooled.field, 0.0, pooled.priors.spread);
    pooled.random = pool_room::random_effect(pooled.field, pooled.prior, pooled.priors.spread, summaries);
    models[3].integral = pooled.random->integral;
  }
  for (const ModelResult& model : models)
    if (model.integral && model.integral->status != IntegralStatus::ok) result.accurate = false;
}

void summarize(const PooledPosterior& posterior, const PoolOptions& options, PoolResult& result) {
  const double level = options.level;
  result.pooled_effect = posterior.effect_summary(Within::average, level);
  result.pooled_effect_fixed = posterior.effect_summary(Within::fixed_effect, level);
  result.pooled_effect_random = posterior.effect_summary(Within::random_effect, level);
  result.spread = posterior.spread_summary(level);
  result.new_study = posterior.new_study_summary(level);
  result.i2 = posterior.i2_summary(level);
  if (!options.shrunken || result.studies.size() > options.shrunken_limit) return;
  for (std::size_t i = 0; i < result.studies.size(); ++i)
    result.studies[i].shrunken = posterior.shrunken_summary(i, level);
}

}  // namespace

Outcome<PoolResult> pool(std::span<const Study> studies, const Priors& priors, const PoolOptions& options) {
  Outcome<PoolResult> out;
  out.diagnostics = pool_room::problems_with_request(studies, priors, options);
  if (std::any_of(out.diagnostics.begin(), out.diagnostics.end(),
                  [](const Diagnostic& d) { return d.severity == Severity::error; }))
    return out;
  std::vector<Likelihood> likelihoods;
  likelihoods.reserve(studies.size());
  for (const Study& study : studies) likelihoods.push_back(likelihood(study));

  PoolResult result;
  auto pooled = std::make_unique<Pooled>(likelihoods, priors);
  run_models(*pooled, result, options.summaries);
  pool_room::weigh_models(result);
  pool_room::fill_evidence(result);
  const double effect = result.at(Model::fixed_effect).posterior_probability +
                        result.at(Model::random_effect).posterior_probability;
  if (effect > 0.0) {
    pooled->share_fixed = result.at(Model::fixed_effect).posterior_probability / effect;
    pooled->share_random = result.at(Model::random_effect).posterior_probability / effect;
  }
  pooled->orders = pool_room::moment_orders(pooled->field, priors.effect, priors.spread);
  if (options.summaries) {
    result.studies = single_studies(likelihoods, pooled->prior);
    auto posterior = std::make_shared<PooledPosterior>(std::move(pooled));
    summarize(*posterior, options, result);
    result.posterior = std::move(posterior);
  }
  result.cautions = pool_room::cautions(studies, priors, options, result);
  out.value = std::move(result);
  return out;
}

}  // namespace steelyard
