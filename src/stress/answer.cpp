#include "stress/answer.hpp"

#include <algorithm>
#include <cmath>
#include <limits>
#include <utility>

#include "steelyard/numeric.hpp"

namespace steelyard {

std::string_view to_text(Stand stand) {
  switch (stand) {
    case Stand::effect:
      return "an effect";
    case Stand::no_effect:
      return "no effect";
    case Stand::undecided:
      break;
  }
  return "undecided";
}

namespace stressing {

namespace {

// The log marginal likelihood of a class of two models, averaged by their prior probabilities.
struct ClassMarginal {
  double log_value = -std::numeric_limits<double>::infinity();
  double error = 0.0;
  bool any = false;
};

ClassMarginal class_marginal(const Marginals& marginals, const Priors& priors, std::array<Model, 2> models) {
  ClassMarginal c;
  double mass = 0.0;
  for (const Model model : models) {
    const auto at = static_cast<std::size_t>(model);
    if (!marginals[at] || !(priors.model[at] > 0.0)) continue;
    c.any = true;
    mass += priors.model[at];
    c.log_value = numeric::log_add(c.log_value, marginals[at]->log_value + std::log(priors.model[at]));
    c.error = std::max(c.error, marginals[at]->abs_error);
  }
  if (c.any) c.log_value -= std::log(mass);
  return c;
}

std::optional<LogBayesFactor> ratio(const ClassMarginal& a, const ClassMarginal& b) {
  if (!a.any || !b.any) return std::nullopt;
  return LogBayesFactor{a.log_value - b.log_value, a.error + b.error};
}

}  // namespace

std::optional<LogBayesFactor> effect_evidence(const Marginals& marginals, const Priors& priors) {
  return ratio(class_marginal(marginals, priors, {Model::fixed_effect, Model::random_effect}),
               class_marginal(marginals, priors, {Model::fixed_null, Model::random_null}));
}

std::optional<LogBayesFactor> heterogeneity_evidence(const Marginals& marginals, const Priors& priors) {
  return ratio(class_marginal(marginals, priors, {Model::random_null, Model::random_effect}),
               class_marginal(marginals, priors, {Model::fixed_null, Model::fixed_effect}));
}

Answer answer(std::span<const Study> studies, const Priors& priors, const PoolOptions& options) {
  Outcome<PoolResult> pooled = pool(studies, priors, options);
  Answer a;
  if (!pooled.ok()) {
    a.refused = pooled.diagnostics.empty() ? "Pooling is not possible." : pooled.diagnostics.front().what;
    return a;
  }
  PoolResult& r = *pooled.value;
  a.effect = r.effect;
  a.effect_fixed = r.effect_fixed;
  a.effect_random = r.effect_random;
  a.heterogeneity = r.heterogeneity;
  a.pooled_effect = std::move(r.pooled_effect);
  a.accurate = r.accurate;
  return a;
}

Stand stand_of(double log_bf, double verdict) {
  const double limit = std::log(verdict);
  if (log_bf >= limit) return Stand::effect;
  return log_bf <= -limit ? Stand::no_effect : Stand::undecided;
}

Stand stand_of(const Answer& answer, double verdict) {
  return answer.effect ? stand_of(answer.effect->log_bf, verdict) : Stand::undecided;
}

}  // namespace stressing

}  // namespace steelyard
