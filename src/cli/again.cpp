#include "again.hpp"

namespace steelyard::cli {

namespace {

figure::Answer figure_answer(const Study& study, const Answer& answer) {
  figure::Answer shown;
  shown.label = study.label;
  shown.year = study.year;
  if (answer.effect) shown.log_bf = answer.effect->log_bf;
  const Summary& effect = answer.pooled_effect;
  shown.effect = {effect.median, effect.lower, effect.upper,
                  answer.refused.empty() ? effect.reason : answer.refused};
  return shown;
}

// The scale of a spread prior: what `with_scale` multiplies.
double scale_of(const SpreadPrior& prior) {
  struct Scale {
    double operator()(const HalfCauchyPrior& p) const { return p.scale; }
    double operator()(const HalfNormalPrior& p) const { return p.scale; }
    double operator()(const HalfStudentTPrior& p) const { return p.scale; }
    double operator()(const InverseGammaPrior& p) const { return p.scale; }
    double operator()(const LogNormalPrior&) const { return 1.0; }  // shown as a factor
    double operator()(const ExponentialPrior& p) const { return p.mean; }
    double operator()(const UniformSpreadPrior& p) const { return p.high; }
  };
  return std::visit(Scale{}, prior.family);
}

}  // namespace

std::vector<figure::Answer> arrivals(const StressAnalysis& analysis) {
  std::vector<figure::Answer> answers;
  for (std::size_t i = 0; i < analysis.result.cumulative.size(); ++i) {
    answers.push_back(
        figure_answer(analysis.rows.studies[analysis.result.order[i]], analysis.result.cumulative[i]));
  }
  return answers;
}

std::vector<figure::Answer> leave_one_outs(const StressAnalysis& analysis) {
  std::vector<figure::Answer> answers;
  for (std::size_t i = 0; i < analysis.result.without.size(); ++i) {
    answers.push_back(figure_answer(analysis.rows.studies[i], analysis.result.without[i]));
  }
  return answers;
}

std::optional<figure::PriorGrid> prior_grid(const StressAnalysis& analysis) {
  const auto width = width_of(analysis.rows.options.priors.effect);
  if (!analysis.result.grid || !width) return std::nullopt;
  const PriorGrid& grid = *analysis.result.grid;
  figure::PriorGrid shown;
  shown.width_used = *width;
  shown.scale_used = scale_of(analysis.rows.options.priors.spread);
  for (const double factor : grid.widths) shown.widths.push_back(factor * shown.width_used);
  for (const double factor : grid.scales) shown.scales.push_back(factor * shown.scale_used);
  for (const LogBayesFactor& bf : grid.effect) shown.log_bf.emplace_back(bf.log_bf);
  return shown;
}

}  // namespace steelyard::cli
