#include "pool/spread.hpp"

#include <algorithm>
#include <array>
#include <cmath>
#include <limits>

#include "numeric/quadrature.hpp"
#include "pool/marks.hpp"
#include "pool/search.hpp"

namespace steelyard::pool_room {

namespace {

constexpr double infinity = std::numeric_limits<double>::infinity();

/// Probabilities whose quantiles under the prior are looked at in the search and end quadrature panels.
constexpr double prior_marks[] = {1e-9, 1e-5, 1e-3, 0.02, 0.2, 0.5, 0.8, 0.98, 0.999};

/// The longest panel of the interpolation in u.
constexpr double longest_panel = 1.6;

std::vector<double> prior_points(const SpreadProblem& problem) {
  std::vector<double> out;
  for (const double p : prior_marks) out.push_back(problem.axis.coordinate(quantile(problem.prior, p)));
  return out;
}

/// Where the outer integrand lives. Starts from a comb over all spreads that data and prior make thinkable.
Window outer_window(const SpreadProblem& problem, const std::vector<double>& marks) {
  const PriorShape shape = steelyard::shape(problem.prior);
  SearchSpace space;
  space.low = problem.axis.coordinate(std::max(0.0, shape.low));
  space.high = std::isfinite(shape.high) ? problem.axis.coordinate(shape.high) : infinity;
  space.drop = 36.0;
  space.log_integrand = [&problem](std::span<const double> u, std::span<double> out) {
    for (std::size_t j = 0; j < u.size(); ++j) {
      const double spread = problem.axis.spread(u[j]);
      const double prior = log_density(problem.prior, spread) + problem.axis.log_slope(u[j]);
      // Where the prior has no density at all the inner value isn't worth its price.
      out[j] = prior > -1e300 ? prior + problem.explore(spread) : -infinity;
    }
  };
  space.start = marks;
  const double last = problem.axis.coordinate(2.0 * problem.largest_estimate + 2.0 * problem.axis.scale);
  constexpr double step = 0.8;
  for (double u = 0.0; u < last + step; u += step) space.start.push_back(u + 1e-3);
  return find_window(space);
}

std::vector<double> curve_breaks(const Window& window) {
  const double length = window.high - window.low;
  const int pieces = std::max(1, static_cast<int>(std::ceil(length / longest_panel)));
  std::vector<double> out;
  for (int i = 0; i < pieces; ++i) out.push_back(window.low + length * i / pieces);
  out.push_back(window.high);
  return out;
}

std::vector<double> quadrature_breaks(const SpreadIntegral& integral, const Window& window,
                                      const std::vector<double>& marks) {
  std::vector<double> edges;
  for (const auto& panel : integral.curve.panels()) edges.push_back(panel.low);
  edges.push_back(integral.curve.high());
  std::vector<double> wanted = marks;
  for (const double offset : {-4.0, 0.0, 4.0}) wanted.push_back(window.best + offset * window.width);
  return merge_marks(edges, wanted, 1e-4 * window.width);
}

}  // namespace

double SpreadAxis::spread(double u) const { return scale * std::sinh(u); }
double SpreadAxis::coordinate(double spread) const { return std::asinh(spread / scale); }
double SpreadAxis::log_slope(double u) const { return std::log(scale * std::cosh(u)); }

double log_outer(const SpreadProblem& problem, const numeric::LogCurve& curve, double u) {
  return curve(u) + log_density(problem.prior, problem.axis.spread(u)) + problem.axis.log_slope(u);
}

SpreadIntegral integrate_spread(const SpreadProblem& problem) {
  SpreadIntegral out;
  const std::vector<double> marks = prior_points(problem);
  const Window window = outer_window(problem, marks);

  double worst_inner = 0.0;
  std::vector<std::array<double, numeric::chebyshev_points>> inner_errors;
  const numeric::BlockFunction inner = [&](std::span<const double> u, std::span<double> values) {
    std::array<double, numeric::chebyshev_points> spreads;
    std::array<Inner, numeric::chebyshev_points> results;
    for (std::size_t j = 0; j < u.size(); ++j) spreads[j] = problem.axis.spread(u[j]);
    problem.exact({spreads.data(), u.size()}, {results.data(), u.size()});
    inner_errors.emplace_back();
    for (std::size_t j = 0; j < u.size(); ++j) {
      values[j] = results[j].log_value;
      inner_errors.back()[j] = results[j].error;
    }
  };
  const numeric::BlockFunction weight = [&](std::span<const double> u, std::span<double> values) {
    for (std::size_t j = 0; j < u.size(); ++j)
      values[j] = log_density(problem.prior, problem.axis.spread(u[j])) + problem.axis.log_slope(u[j]);
  };
  numeric::LogCurve::Need need;
  need.tolerance = 5e-10;
  need.noise = std::max(problem.noise, 4e-11);
  need.log_peak = window.log_best;
  need.weight = &weight;
  need.most_panels = 60;
  out.curve = numeric::LogCurve(inner, curve_breaks(window), need);

  for (const auto& panel : out.curve.panels())
    out.panels.push_back({panel.low, panel.high, panel.sample, {}});
  out.breaks = quadrature_breaks(out, window, marks);
  std::vector<std::size_t> panel_of(out.breaks.size() - 1);
  for (std::size_t i = 0; i + 1 < out.breaks.size(); ++i)
    panel_of[i] = static_cast<std::size_t>(&out.curve.panel_at(0.5 * (out.breaks[i] + out.breaks[i + 1])) -
                                           out.curve.panels().data());
  std::vector<numeric::ChebyshevArray> moments(out.panels.size());
  double interpolation = 0.0;
  const auto log_integrand = [&](std::size_t index, const numeric::KronrodArray& u,
                                 numeric::KronrodArray& g) {
    numeric::LogCurve::evaluate(out.curve.panels()[panel_of[index]], u.data(), g.data(), u.size());
    for (std::size_t j = 0; j < u.size(); ++j)
      g[j] += log_density(problem.prior, problem.axis.spread(u[j])) + problem.axis.log_slope(u[j]);
  };
  const auto accept = [&](std::size_t index, const numeric::KronrodArray& u,
                          const numeric::KronrodArray& mass) {
    const auto& panel = out.curve.panels()[panel_of[index]];
    numeric::ChebyshevArray& moment = moments[panel_of[index]];
    double sum = 0.0;
    for (std::size_t j = 0; j < u.size(); ++j) {
      const double x = std::clamp(2.0 * (u[j] - panel.low) / (panel.high - panel.low) - 1.0, -1.0, 1.0);
      double before = 1.0;
      double current = x;
      moment[0] += mass[j];
      for (std::size_t k = 1; k < numeric::chebyshev_points; ++k) {
        moment[k] += mass[j] * current;
        const double next = 2.0 * x * current - before;
        before = current;
        current = next;
      }
      sum += mass[j];
    }
    const auto& errors = inner_errors[panel.sample];
    worst_inner = *std::max_element(errors.begin(), errors.end());
    // The interpolant of values that are each off by e is off by at most the Lebesgue constant times e.
    constexpr double lebesgue = 2.8;
    interpolation += sum * (panel.error + lebesgue * worst_inner);
  };
  const numeric::Quadrature q =
      numeric::integrate_log(out.breaks, window.log_best, 1e-11, log_integrand, accept);
  out.log_value = window.log_best + std::log(q.value);
  out.error = (q.error + interpolation) / q.value + 1e-15;

  constexpr double n = static_cast<double>(numeric::chebyshev_points);
  for (std::size_t p = 0; p < out.panels.size(); ++p) {
    for (std::size_t j = 0; j < numeric::chebyshev_points; ++j) {
      double sum = moments[p][0];
      for (std::size_t k = 1; k < numeric::chebyshev_points; ++k)
        sum += 2.0 * moments[p][k] * numeric::chebyshev_basis()[k][j];
      out.panels[p].weight[j] = sum / (n * q.value);
    }
  }
  return out;
}

}  // namespace steelyard::pool_room
