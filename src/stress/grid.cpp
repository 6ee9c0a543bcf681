#include "stress/grid.hpp"

#include <algorithm>
#include <cmath>

#include "steelyard/weigh.hpp"
#include "stress/surface.hpp"
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

namespace {

// Beyond this many studies posteriors are so narrow that a fixed grid of means would need more nodes than
// adaptive integrals do.
constexpr std::size_t most_on_surface = 2000;
// The fixed grid is used when its largest miss at the cells that are checked stays below this.
constexpr double largest_miss = 1e-6;

using Cells = std::vector<Marginals>;

// Every cell by adaptive integrals.
std::optional<Cells> exact_cells(const PriorMarginals& marginals, const PriorGrid& grid, unsigned threads,
                                 const std::function<bool()>& keep_going) {
  const std::size_t columns = grid.scales.size();
  Cells cells(grid.widths.size() * columns);
  std::vector<std::optional<Integral>> nulls(columns);
  for (std::size_t c = 0; c < columns; ++c) nulls[c] = marginals.random_null(grid.scales[c]);
  const auto one_row = [&](std::size_t r) {
    const Integral fixed = marginals.fixed_effect(grid.widths[r]);
    for (std::size_t c = 0; c < columns; ++c) {
      cells[r * columns + c] = {marginals.fixed_null(), fixed, nulls[c],
                                marginals.random_effect(grid.widths[r], grid.scales[c])};
    }
  };
  if (!for_each_index(grid.widths.size(), threads, one_row, keep_going)) return std::nullopt;
  return cells;
}

// Every cell with the varying-effects marginal likelihood, the costly one, from one evaluation of the
// likelihood on a fixed grid, checked at the corners and the middle against adaptive integrals; twice the
// largest miss is the stated error. Nothing when it misses by too much.
std::optional<Cells> surface_cells(std::span<const Study> studies, const Priors& priors,
                                   const PriorMarginals& marginals, const PriorGrid& grid,
                                   const std::function<bool()>& keep_going) {
  std::vector<EffectPrior> effects;
  for (const double width : grid.widths) effects.push_back(with_width(priors.effect, width));
  std::vector<SpreadPrior> spreads;
  for (const double scale : grid.scales) spreads.push_back(with_scale(priors.spread, scale));
  const auto surface = surface_marginals(studies, effects, spreads, keep_going);
  if (!surface) return std::nullopt;
  const std::size_t rows = grid.widths.size();
  const std::size_t columns = grid.scales.size();
  double largest = 0.0;
  for (const std::size_t r : {std::size_t{0}, rows / 2, rows - 1}) {
    for (const std::size_t c : {std::size_t{0}, columns / 2, columns - 1}) {
      const Integral exact = *marginals.random_effect(grid.widths[r], grid.scales[c]);
      largest = std::max(largest, std::abs((*surface)[r * columns + c] - exact.log_value) + exact.abs_error);
    }
  }
  if (!(largest <= largest_miss)) return std::nullopt;
  std::vector<std::optional<Integral>> nulls;
  for (const double scale : grid.scales) nulls.push_back(marginals.random_null(scale));
  Cells cells;
  for (std::size_t r = 0; r < rows; ++r) {
    const Integral fixed = marginals.fixed_effect(grid.widths[r]);
    for (std::size_t c = 0; c < columns; ++c) {
      cells.push_back({marginals.fixed_null(), fixed, nulls[c],
                       Integral{(*surface)[r * columns + c], 2.0 * largest, 0, IntegralStatus::ok}});
    }
  }
  return cells;
}

// The Bayes factors of the cells; nothing when the model probabilities leave no question.
bool fill(PriorGrid& grid, const Cells& cells, const Priors& priors, bool& accurate) {
  for (const Marginals& cell : cells) {
    const auto effect = effect_evidence(cell, priors);
    if (!effect) return false;
    grid.effect.push_back(*effect);
    if (const auto varies = heterogeneity_evidence(cell, priors)) grid.heterogeneity.push_back(*varies);
    for (const auto& integral : cell)
      accurate = accurate && (!integral || integral->status == IntegralStatus::ok);
  }
  if (grid.heterogeneity.size() != grid.effect.size()) grid.heterogeneity.clear();
  const auto less = [](const LogBayesFactor& a, const LogBayesFactor& b) { return a.log_bf < b.log_bf; };
  const auto [lowest, highest] = std::minmax_element(grid.effect.begin(), grid.effect.end(), less);
  grid.lowest = lowest->log_bf;
  grid.highest = highest->log_bf;
  return true;
}

}  // namespace

std::optional<PriorGrid> prior_grid(std::span<const Study> studies, const Priors& priors,
                                    const StressOptions& options, bool& accurate,
                                    const std::function<bool()>& keep_going) {
  PriorGrid grid;
  grid.widths = options.widths.empty() ? usual_factors() : options.widths;
  grid.scales = options.scales.empty() ? usual_factors() : options.scales;
  const PriorMarginals marginals(studies, priors);
  if (!std::all_of(grid.widths.begin(), grid.widths.end(), [&](double w) { return marginals.usable(w); })) {
    return std::nullopt;
  }
  // Nine cells are checked anyway; a grid of little more is integrated cell by cell.
  const bool large = grid.widths.size() * grid.scales.size() > 20;
  std::optional<Cells> cells;
  if (large && studies.size() > 1 && studies.size() <= most_on_surface) {
    cells = surface_cells(studies, priors, marginals, grid, keep_going);
  }
  if (!cells) cells = exact_cells(marginals, grid, options.threads, keep_going);
  if (!cells || !fill(grid, *cells, priors, accurate)) return std::nullopt;
  return grid;
}

}  // namespace steelyard::stressing
