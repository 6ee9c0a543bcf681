// The results of a stress analysis in the form that ladder, sway and the map of priors take.
#include "steelyard/figure.hpp"

namespace steelyard::figure {
namespace {

Answer answer(const steelyard::Answer& from, const Study& study) {
  const Summary& effect = from.pooled_effect;
  Answer out{study.label,
             study.year,
             std::nullopt,
             {effect.mean ? effect.mean : effect.median, effect.lower, effect.upper, effect.reason}};
  if (from.effect) out.log_bf = from.effect->log_bf;
  if (!from.refused.empty()) out.effect.reason = from.refused;
  return out;
}

}  // namespace

std::vector<Answer> arrivals(const StressResult& stress, std::span<const Study> studies) {
  std::vector<Answer> out;
  for (std::size_t k = 0; k < stress.cumulative.size() && k < stress.order.size(); ++k)
    out.push_back(answer(stress.cumulative[k], studies[stress.order[k]]));
  return out;
}

std::vector<Answer> removals(const StressResult& stress, std::span<const Study> studies) {
  std::vector<Answer> out;
  for (std::size_t i = 0; i < stress.without.size(); ++i)
    out.push_back(answer(stress.without[i], studies[i]));
  return out;
}

std::optional<PriorGrid> prior_grid(const StressResult& stress, const Priors& priors) {
  if (!stress.grid) return std::nullopt;
  PriorGrid out;
  out.width_used = shape(priors.effect).scale;
  // The median moves with the factor in every family; their own scale parameters mean different things.
  out.scale_used = quantile(priors.spread, 0.5);
  out.scale_name = "prior median of the spread";
  for (const double factor : stress.grid->widths) out.widths.push_back(factor * out.width_used);
  for (const double factor : stress.grid->scales) out.scales.push_back(factor * out.scale_used);
  for (const LogBayesFactor& effect : stress.grid->effect) out.log_bf.emplace_back(effect.log_bf);
  return out;
}

}  // namespace steelyard::figure
