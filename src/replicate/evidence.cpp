#include "replicate/evidence.hpp"

#include <algorithm>
#include <cmath>
#include <limits>

#include "steelyard/numeric.hpp"

namespace steelyard::replicating {

namespace {

// A class of two models by their prior probabilities: log Σ p·m (not divided by Σ p).
struct Mixed {
  double log_value = -std::numeric_limits<double>::infinity();
  double error = 0.0;
};

void mix(Mixed& mixed, const Integral& integral, double probability) {
  if (!(probability > 0.0)) return;
  mixed.log_value = numeric::log_add(mixed.log_value, std::log(probability) + integral.log_value);
  mixed.error = std::max(mixed.error, integral.abs_error);
}

double probability(const Priors& priors, Model model) {
  return priors.model[static_cast<std::size_t>(model)];
}

Mixed effect(const Marginals& m, const Priors& priors) {
  Mixed mixed;
  mix(mixed, m.fixed_effect, probability(priors, Model::fixed_effect));
  mix(mixed, m.random_effect, probability(priors, Model::random_effect));
  return mixed;
}
Mixed none(const Marginals& m, const Priors& priors) {
  Mixed mixed;
  mix(mixed, m.fixed_null, probability(priors, Model::fixed_null));
  mix(mixed, m.random_null, probability(priors, Model::random_null));
  return mixed;
}

LogBayesFactor against(const Integral& a, const Integral& b) {
  return {a.log_value - b.log_value, a.abs_error + b.abs_error};
}

LogBayesFactor divided(const LogBayesFactor& a, const LogBayesFactor& b) {
  return {a.log_bf - b.log_bf, a.abs_error + b.abs_error};
}

const char* const no_question = "The model probabilities leave no question: one side of it has none.";

}  // namespace

Marginals marginals(std::span<const Likelihood> studies, const EffectPrior& effect,
                    const SpreadPrior& spread) {
  return {log_marginal_fixed_at(studies, 0.0), log_marginal_fixed(studies, effect),
          log_marginal_random_at(studies, 0.0, spread), log_marginal_random(studies, effect, spread)};
}

EvidenceTriple evidence(const Marginals& of, const Priors& priors) {
  EvidenceTriple e;
  e.fixed = against(of.fixed_effect, of.fixed_null);
  e.random = against(of.random_effect, of.random_null);
  const double with = probability(priors, Model::fixed_effect) + probability(priors, Model::random_effect);
  const double without = probability(priors, Model::fixed_null) + probability(priors, Model::random_null);
  if (!(with > 0.0 && without > 0.0)) {
    e.reason = no_question;
    return e;
  }
  const Mixed some = effect(of, priors);
  const Mixed no = none(of, priors);
  e.averaged =
      LogBayesFactor{some.log_value - no.log_value - std::log(with / without), some.error + no.error};
  return e;
}

EvidenceTriple evidence_beyond(const Marginals& all, const Marginals& known, const Priors& priors) {
  const EvidenceTriple whole = evidence(all, priors);
  const EvidenceTriple part = evidence(known, priors);
  EvidenceTriple e;
  e.fixed = divided(*whole.fixed, *part.fixed);
  e.random = divided(*whole.random, *part.random);
  if (whole.averaged && part.averaged) e.averaged = divided(*whole.averaged, *part.averaged);
  e.reason = whole.reason;
  return e;
}

bool accurate(const Marginals& of) {
  const auto ok = [](const Integral& integral) { return integral.status == IntegralStatus::ok; };
  return ok(of.fixed_null) && ok(of.fixed_effect) && ok(of.random_null) && ok(of.random_effect);
}

}  // namespace steelyard::replicating
