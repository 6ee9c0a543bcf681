#include "pool/evidence.hpp"

#include <algorithm>
#include <cmath>
#include <initializer_list>
#include <limits>
#include <optional>

#include "steelyard/numeric.hpp"

namespace steelyard::pool_room {

namespace {

constexpr double minus_infinity = -std::numeric_limits<double>::infinity();

/// A class of models: its log marginal likelihood (prior probabilities within the class as weights), and the
/// largest error among its members.
struct Class {
  double log_value = minus_infinity;
  double abs_error = 0.0;
};

std::optional<Class> join(const PoolResult& result, std::initializer_list<Model> members) {
  double prior = 0.0;
  for (const Model m : members)
    if (result.at(m).integral) prior += result.at(m).prior_probability;
  if (!(prior > 0.0)) return std::nullopt;
  Class out;
  for (const Model m : members) {
    const ModelResult& model = result.at(m);
    if (!model.integral || !(model.prior_probability > 0.0)) continue;
    out.log_value = numeric::log_add(out.log_value,
                                     std::log(model.prior_probability / prior) + model.integral->log_value);
    // An average in the log is off by no more than its worst part.
    out.abs_error = std::max(out.abs_error, model.integral->abs_error);
  }
  return out;
}

std::optional<LogBayesFactor> against(const std::optional<Class>& a, const std::optional<Class>& b) {
  if (!a || !b) return std::nullopt;
  return LogBayesFactor{a->log_value - b->log_value, a->abs_error + b->abs_error};
}

}  // namespace

void weigh_models(PoolResult& result) {
  double top = minus_infinity;
  for (const ModelResult& model : result.models)
    if (model.integral && model.prior_probability > 0.0) top = std::max(top, model.integral->log_value);
  double total = 0.0;
  for (ModelResult& model : result.models) {
    model.posterior_probability =
        model.integral ? model.prior_probability * std::exp(model.integral->log_value - top) : 0.0;
    total += model.posterior_probability;
  }
  for (ModelResult& model : result.models) model.posterior_probability /= total;
}

void fill_evidence(PoolResult& result) {
  using enum Model;
  const bool several = result.at(random_effect).integral.has_value();
  // Within one kind of model the comparison needs no prior probabilities.
  const auto single = [&result](Model m) -> std::optional<Class> {
    if (!result.at(m).integral) return std::nullopt;
    return Class{result.at(m).integral->log_value, result.at(m).integral->abs_error};
  };
  result.effect_fixed = against(single(fixed_effect), single(fixed_null));
  result.effect_random = against(single(random_effect), single(random_null));
  result.effect =
      against(join(result, {fixed_effect, random_effect}), join(result, {fixed_null, random_null}));
  if (several)
    result.heterogeneity =
        against(join(result, {random_null, random_effect}), join(result, {fixed_null, fixed_effect}));
}

}  // namespace steelyard::pool_room
