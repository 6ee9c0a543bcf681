#include "stress/grid.hpp"

#include <algorithm>
#include <cmath>

#include "steelyard/weigh.hpp"
#include "stress/threads.hpp"

namespace steelyard::stressing {

std::vector<double> usual_factors() {
  constexpr int count = 20;
  std::vector<double> factors;
  for (int i = 0; i < count; ++i) factors.push_back(std::exp2(-3.0 + 6.0 * i / (count - 1)));
  return factors;
}

PriorMarginals::PriorMarginals(std::span<const Study> studies, const Priors& priors) : priors_(priors) {
  for (const Study& study : studies) studies_.push_back(likelihood(study));
  fixed_null_ = log_marginal_fixed_at(studies_, 0.0);
}

Integral PriorMarginals::fixed_effect(double width) const {
  return log_marginal_fixed(studies_, with_width(priors_.effect, width));
}

std::optional<Integral> PriorMarginals::random_null(double scale) const {
  if (studies_.size() < 2) return std::nullopt;
  return log_marginal_random_at(studies_, 0.0, with_scale(priors_.spread, scale));
}

std::optional<Integral> PriorMarginals::random_effect(double width, double scale) const {
  if (studies_.size() < 2) return std::nullopt;
  return log_marginal_random(studies_, with_width(priors_.effect, width), with_scale(priors_.spread, scale));
}

Marginals PriorMarginals::at(double width, double scale) const {
  return {fixed_null_, fixed_effect(width), random_null(scale), random_effect(width, scale)};
}

std::optional<double> PriorMarginals::log_bf(double width, double scale) const {
  if (!usable(width)) return std::nullopt;
  const auto evidence = effect_evidence(at(width, scale), priors_);
  return evidence ? std::optional<double>(evidence->log_bf) : std::nullopt;
}

bool PriorMarginals::usable(double width) const { return !problem_with(with_width(priors_.effect, width)); }

std::optional<PriorGrid> prior_grid(std::span<const Study> studies, const Priors& priors,
                                    const StressOptions& options, bool& accurate,
                                    const std::function<bool()>& keep_going) {
  PriorGrid grid;
  grid.widths = options.widths.empty() ? usual_factors() : options.widths;
  grid.scales = options.scales.empty() ? usual_factors() : options.scales;
  const PriorMarginals marginals(studies, priors);
  const std::size_t rows = grid.widths.size();
  const std::size_t columns = grid.scales.size();
  if (!std::all_of(grid.widths.begin(), grid.widths.end(), [&](double w) { return marginals.usable(w); })) {
    return std::nullopt;
  }
  std::vector<Marginals> cells(rows * columns);
  std::vector<std::optional<Integral>> nulls(columns);
  for (std::size_t c = 0; c < columns; ++c) nulls[c] = marginals.random_null(grid.scales[c]);
  const auto one_row = [&](std::size_t r) {
    const Integral fixed = marginals.fixed_effect(grid.widths[r]);
    for (std::size_t c = 0; c < columns; ++c) {
      cells[r * columns + c] = {marginals.fixed_null(), fixed, nulls[c],
                                marginals.random_effect(grid.widths[r], grid.scales[c])};
    }
  };
  if (!for_each_index(rows, options.threads, one_row, keep_going)) return std::nullopt;
  for (const Marginals& cell : cells) {
    const auto effect = effect_evidence(cell, priors);
    if (!effect) return std::nullopt;
    grid.effect.push_back(*effect);
    if (const auto heterogeneity = heterogeneity_evidence(cell, priors))
      grid.heterogeneity.push_back(*heterogeneity);
    for (const auto& integral : cell) {
      accurate = accurate && (!integral || integral->status == IntegralStatus::ok);
    }
  }
  if (grid.heterogeneity.size() != grid.effect.size()) grid.heterogeneity.clear();
  const auto less = [](const LogBayesFactor& a, const LogBayesFactor& b) { return a.log_bf < b.log_bf; };
  const auto [lowest, highest] = std::minmax_element(grid.effect.begin(), grid.effect.end(), less);
  grid.lowest = lowest->log_bf;
  grid.highest = highest->log_bf;
  return grid;
}

}  // namespace steelyard::stressing
