// The joint posterior of mean effect and spread as regions of highest density.
#include <algorithm>
#include <cmath>
#include <cstddef>
#include <vector>

#include <fmt/format.h>

#include "figure/contour.hpp"
#include "steelyard/figure.hpp"

namespace steelyard::figure {
namespace {

constexpr std::size_t effect_nodes = 97;
constexpr std::size_t spread_nodes = 109;
constexpr double masses[] = {0.99, 0.95, 0.80, 0.50};

std::vector<double> even(double low, double high, std::size_t count) {
  std::vector<double> out(count);
  for (std::size_t i = 0; i < count; ++i)
    out[i] = low + (high - low) * static_cast<double>(i) / static_cast<double>(count - 1);
  return out;
}

/// Density on a grid, relative to its highest value.
Grid density(const Posterior& posterior, const Scale& effect, const Scale& spread) {
  Grid grid{even(effect.low, effect.high, effect_nodes), even(spread.low, spread.high, spread_nodes), {}};
  // A spread of exactly 0 may have no density: its line takes the value just above it.
  const double least = 1e-3 * (grid.ys[1] - grid.ys[0]);
  double peak = -HUGE_VAL;
  for (const double x : grid.xs)
    for (const double y : grid.ys) {
      grid.values.push_back(posterior.joint_log_density(x, std::max(y, least)));
      peak = std::max(peak, grid.values.back());
    }
  for (double& value : grid.values) value = std::isfinite(value) ? std::exp(value - peak) : 0.0;
  return grid;
}

/// The density above which lies a share of the mass on the grid.
double level_of(const Grid& grid, double mass) {
  std::vector<double> sorted = grid.values;
  std::sort(sorted.begin(), sorted.end(), std::greater<>());
  double total = 0.0, sum = 0.0;
  for (const double value : sorted) total += value;
  for (const double value : sorted) {
    sum += value;
    if (sum >= mass * total) return value;
  }
  return 0.0;
}

Point peak_of(const Grid& grid) {
  const auto at = static_cast<std::size_t>(std::max_element(grid.values.begin(), grid.values.end()) -
                                           grid.values.begin());
  return {grid.xs[at / grid.ys.size()], grid.ys[at % grid.ys.size()]};
}

std::string finding(const Analysis& analysis, const Surface& surface) {
  const Posterior& posterior = *analysis.result.posterior;
  const double above = 1.0 - posterior.effect_cdf(Within::random_effect, 0.0);
  const int effect_decimals = decimals_for(surface.effect.high - surface.effect.low);
  const int spread_decimals = decimals_for(surface.spread.high - surface.spread.low);
  double low = HUGE_VAL, high = -HUGE_VAL, least = HUGE_VAL, most = -HUGE_VAL;
  for (const Curve& ring : surface.regions[1].rings)
    for (const Point& point : ring) {
      low = std::min(low, point.x), high = std::max(high, point.x);
      least = std::min(least, point.y), most = std::max(most, point.y);
    }
  return fmt::format(
      "If effects vary, the smallest region with 95% of the posterior reaches from {} to {} in the mean "
      "effect "
      "and from {} to {} in the spread (SD of effects); it is highest at a mean of {} and a spread of {}. "
      "Probability of a mean effect above 0: {}.",
      number_text(low, effect_decimals), number_text(high, effect_decimals),
      number_text(least, spread_decimals), number_text(most, spread_decimals),
      number_text(surface.peak.x, effect_decimals), number_text(surface.peak.y, spread_decimals),
      percent_text(above));
}

Diagnostic missing(const Analysis& analysis) {
  Diagnostic out;
  out.code = "no-surface";
  out.what = analysis.studies.size() < 2
                 ? "The surface shows the spread of effects, which one study can't tell."
                 : "The surface shows the spread of effects, which this analysis has not estimated.";
  out.remedy =
      "Draw the forest or the belief figure instead, or pool at least two studies with varying effects "
      "allowed.";
  return out;
}

}  // namespace

Outcome<Surface> surface(const Analysis& analysis) {
  const auto& posterior = analysis.result.posterior;
  const bool known = posterior && analysis.result.at(Model::random_effect).integral &&
                     analysis.studies.size() > 1 && std::isfinite(posterior->spread_quantile(0.5));
  if (!known) return {std::nullopt, {missing(analysis)}};
  Surface out;
  const double low = posterior->effect_quantile(Within::random_effect, 0.0005);
  const double high = posterior->effect_quantile(Within::random_effect, 0.9995);
  const double margin = 0.08 * (high - low);
  out.effect = {std::min(low - margin, 0.0 - margin), std::max(high + margin, margin), false,
                "mean effect: " + effect_name(analysis.studies)};
  out.spread = {0.0, posterior->spread_quantile(0.996), false, "spread: SD of effects between studies"};
  const Grid grid = density(*posterior, out.effect, out.spread);
  for (const double mass : masses) out.regions.push_back({mass, contour_rings(grid, level_of(grid, mass))});
  out.peak = peak_of(grid);
  out.words = {"Joint posterior of mean effect and spread", finding(analysis, out)};
  return {std::move(out), {}};
}

}  // namespace steelyard::figure
