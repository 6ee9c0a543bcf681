#include "pool/marginal.hpp"

#include <algorithm>
#include <cmath>
#include <limits>
#include <optional>
#include <utility>

namespace steelyard::pool_room {

namespace {

/// Fills in the error with rounding, and the status by the promise of docs/pool.md:
/// abs_error ≤ max(1e-8, 8ε·Σ(λ²+|log L|)); `rounding` is half of that sum's term.
Integral finish(double log_value, double error, double rounding, std::size_t evaluations) {
  Integral out;
  out.log_value = log_value;
  out.abs_error = error + rounding;
  out.evaluations = evaluations;
  const double promise = std::max(1e-8, 2.0 * rounding);
  out.status = std::isfinite(log_value) && out.abs_error <= promise ? IntegralStatus::ok
                                                                    : IntegralStatus::accuracy_not_reached;
  return out;
}

SpreadAxis axis_for(const Field& field) { return {std::max(field.smallest_se(), 1e-12)}; }

double log_normal_mass(const Window& window) {
  constexpr double half_log_two_pi = 0.91893853320467274178;
  return window.log_best + std::log(window.width) + half_log_two_pi;
}

}  // namespace

Integral fixed_at(const Field& field, double mean) {
  return finish(field.at(0.0, mean), 0.0, field.rounding(0.0, mean), 1);
}

Integral random_at(const Field& field, double mean, const SpreadPrior& spread) {
  std::size_t evaluations = 0;
  SpreadProblem problem;
  problem.axis = axis_for(field);
  problem.prior = spread;
  problem.largest_estimate = field.largest_estimate();
  problem.noise = field.rounding(0.0, mean);
  problem.explore = [&](double s) {
    ++evaluations;
    return field.at(s, mean);
  };
  problem.exact = [&](std::span<const double> spreads, std::span<Inner> out) {
    evaluations += spreads.size();
    for (std::size_t j = 0; j < spreads.size(); ++j) out[j] = {field.at(spreads[j], mean), 0.0};
  };
  const SpreadIntegral integral = integrate_spread(problem);
  return finish(integral.log_value, integral.error, field.rounding(0.0, mean), evaluations);
}

FixedMarginal fixed_effect(const Field& field, const PriorBlock& effect, bool keep_nodes) {
  FixedMarginal out;
  const Window window = row_window(field, effect, 0.0, std::nullopt);
  const double rounding = field.rounding(0.0, window.best);
  out.row = make_row(field, effect, 0.0, Hint{window.best, window.width}, rounding, keep_nodes);
  out.integral =
      finish(out.row.log_integral, out.row.error, rounding, out.row.evaluations + window.evaluations);
  return out;
}

RandomMarginal random_effect(const Field& field, const PriorBlock& effect, const SpreadPrior& spread,
                             bool keep_nodes) {
  RandomMarginal out;
  std::size_t evaluations = 0;
  std::optional<Hint> hint;
  std::vector<Row> sampled;  // all rows in the order of their making, 16 a call
  double rounding = 0.0;
  {
    const Window window = row_window(field, effect, 0.0, std::nullopt);
    rounding = field.rounding(0.0, window.best);
    evaluations += window.evaluations;
    hint = Hint{window.best, window.width};
  }
  SpreadProblem problem;
  problem.axis = axis_for(field);
  problem.prior = spread;
  problem.largest_estimate = field.largest_estimate();
  problem.noise = 4.0 * rounding;
  problem.explore = [&](double s) {
    const Window window = row_window(field, effect, s, hint);
    evaluations += window.evaluations;
    return log_normal_mass(window);
  };
  problem.exact = [&](std::span<const double> spreads, std::span<Inner> values) {
    for (std::size_t j = 0; j < spreads.size(); ++j) {
      sampled.push_back(make_row(field, effect, spreads[j], hint, rounding, keep_nodes));
      const Row& row = sampled.back();
      evaluations += row.evaluations;
      hint = Hint{row.window.best, row.window.width};
      values[j] = {row.log_integral, row.error};
    }
  };
  out.axis = problem.axis;
  out.outer = integrate_spread(problem);
  out.integral = finish(out.outer.log_value, out.outer.error, rounding, evaluations);
  for (const SpreadPanel& panel : out.outer.panels)
    for (std::size_t j = 0; j < numeric::chebyshev_points; ++j)
      out.rows.push_back(std::move(sampled[panel.sample * numeric::chebyshev_points + j]));
  return out;
}

}  // namespace steelyard::pool_room

namespace steelyard {

namespace {

Integral without_studies() {
  Integral out;
  out.log_value = 0.0;
  out.abs_error = 0.0;
  out.evaluations = 0;
  out.status = IntegralStatus::ok;
  return out;
}

}  // namespace

Integral log_marginal_fixed_at(std::span<const Likelihood> studies, double mean) {
  if (studies.empty()) return without_studies();
  return pool_room::fixed_at(pool_room::Field(studies), mean);
}

Integral log_marginal_random_at(std::span<const Likelihood> studies, double mean, const SpreadPrior& spread) {
  if (studies.empty()) return without_studies();
  return pool_room::random_at(pool_room::Field(studies), mean, spread);
}

Integral log_marginal_fixed(std::span<const Likelihood> studies, const EffectPrior& effect) {
  if (studies.empty()) return without_studies();
  return pool_room::fixed_effect(pool_room::Field(studies), pool_room::PriorBlock(effect), false).integral;
}

Integral log_marginal_random(std::span<const Likelihood> studies, const EffectPrior& effect,
                             const SpreadPrior& spread) {
  if (studies.empty()) return without_studies();
  return pool_room::random_effect(pool_room::Field(studies), pool_room::PriorBlock(effect), spread, false)
      .integral;
}

}  // namespace steelyard
