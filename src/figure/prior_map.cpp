// Evidence over a grid of priors, and the line where it changes sides.
#include <algorithm>
#include <cmath>

#include <fmt/format.h>

#include "figure/contour.hpp"
#include "steelyard/figure.hpp"

namespace steelyard::figure {
namespace {

/// Borders halfway between neighbours in the logarithm, the outer ones as far out as the next inner ones.
std::vector<double> edges(const std::vector<double>& centres) {
  std::vector<double> out;
  for (std::size_t i = 0; i + 1 < centres.size(); ++i) out.push_back(std::sqrt(centres[i] * centres[i + 1]));
  out.insert(out.begin(), centres.front() * centres.front() / out.front());
  out.push_back(centres.back() * centres.back() / out.back());
  return out;
}

bool usable(const std::vector<double>& values) {
  return values.size() >= 2 && values.front() > 0 && std::is_sorted(values.begin(), values.end()) &&
         std::adjacent_find(values.begin(), values.end()) == values.end();
}

std::vector<Curve> turning_lines(const PriorGrid& grid) {
  Grid heights;
  for (const double width : grid.widths) heights.xs.push_back(std::log(width));
  for (const double scale : grid.scales) heights.ys.push_back(std::log(scale));
  for (const auto& log_bf : grid.log_bf) {
    if (!log_bf) return {};
    heights.values.push_back(*log_bf);
  }
  auto lines = contour_lines(heights, 0.0);
  for (Curve& line : lines)
    for (Point& point : line) point = {std::exp(point.x), std::exp(point.y)};
  return lines;
}

std::string finding(const PriorGrid& grid, const PriorMap& map) {
  double low = HUGE_VAL, high = -HUGE_VAL;
  for (const auto& value : map.decibans)
    if (value) low = std::min(low, *value), high = std::max(high, *value);
  if (low > high) return "No prior of the grid has a Bayes factor.";
  std::string out = fmt::format(
      "With a {} from {:.3g} to {:.3g} and a {} from {:.3g} to {:.3g} the evidence runs from {} to {} "
      "decibans.",
      grid.width_name, grid.widths.front(), grid.widths.back(), grid.scale_name, grid.scales.front(),
      grid.scales.back(), number_text(low, 1), number_text(high, 1));
  if (low > 0) return out + " It speaks for an effect under every prior of the grid.";
  if (high < 0) return out + " It speaks for no effect under every prior of the grid.";
  return out + " It changes sides within this range.";
}

}  // namespace

Outcome<PriorMap> prior_map(const PriorGrid& grid) {
  if (!usable(grid.widths) || !usable(grid.scales) ||
      grid.log_bf.size() != grid.widths.size() * grid.scales.size()) {
    Diagnostic problem;
    problem.code = "no-prior-map";
    problem.what =
        "The map of priors needs at least two widths and two scales, positive and ascending, with one value "
        "for each pair.";
    problem.remedy = "Ask for a grid of at least 2 by 2 priors.";
    return {std::nullopt, {problem}};
  }
  PriorMap out;
  out.width_edges = edges(grid.widths);
  out.scale_edges = edges(grid.scales);
  out.width = {out.width_edges.front(), out.width_edges.back(), true, grid.width_name};
  out.scale = {out.scale_edges.front(), out.scale_edges.back(), true, grid.scale_name};
  for (const auto& log_bf : grid.log_bf)
    out.decibans.push_back(log_bf ? std::optional<double>(decibans(*log_bf)) : std::nullopt);
  out.turns = turning_lines(grid);
  out.used = {grid.width_used, grid.scale_used};
  out.words = {"Evidence under other priors", finding(grid, out)};
  return {std::move(out), {}};
}

}  // namespace steelyard::figure
