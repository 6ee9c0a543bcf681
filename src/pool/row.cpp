#include "pool/row.hpp"

#include <algorithm>
#include <cmath>
#include <limits>
#include <utility>

#include "numeric/quadrature.hpp"
#include "pool/marks.hpp"

namespace steelyard::pool_room {

namespace {

/// Multiples of the width at which the peak's neighbourhood is first looked at.
constexpr double comb[] = {-10.0, -5.0, -2.5, -1.0, -0.2, 0.5, 1.5, 3.5, 7.0};

void add_comb(std::vector<double>& points, double centre, double width) {
  for (const double offset : comb) points.push_back(centre + offset * width);
}

/// The ends of the quadrature panels: the curve's panels, the peak and its flanks, the prior's shape.
std::vector<double> quadrature_breaks(const Row& row, const PriorShape& shape) {
  std::vector<double> edges;
  for (const auto& panel : row.curve.panels()) edges.push_back(panel.low);
  edges.push_back(row.curve.high());
  std::vector<double> wanted;
  for (const double offset : {-3.7, 0.0, 3.7}) wanted.push_back(row.window.best + offset * row.window.width);
  const double length = row.window.high - row.window.low;
  if (std::isfinite(shape.scale) && shape.scale * 4.0 < length) {
    wanted.push_back(shape.center);
    // Geometric all the way: a panel that spans many powers of ten would see nothing of an algebraic tail.
    constexpr double ratio = 6.0;
    for (double offset = 0.5; offset * shape.scale < length; offset *= ratio) {
      wanted.push_back(shape.center + offset * shape.scale);
      wanted.push_back(shape.center - offset * shape.scale);
    }
  }
  return merge_marks(edges, wanted, 0.1 * std::min(row.window.width, shape.scale));
}

}  // namespace

void Row::log_density(const PriorBlock& prior, std::span<const double> x, std::span<double> out) const {
  if (curve.panels().size() == 1) {
    numeric::LogCurve::evaluate(curve.panels().front(), x.data(), out.data(), x.size());
    prior.add(x, out);
    for (std::size_t j = 0; j < x.size(); ++j)
      out[j] = x[j] >= curve.low() && x[j] <= curve.high() ? out[j] - log_integral
                                                           : -std::numeric_limits<double>::infinity();
    return;
  }
  for (std::size_t j = 0; j < x.size();) {
    if (!(x[j] >= curve.low() && x[j] <= curve.high())) {
      out[j++] = -std::numeric_limits<double>::infinity();
      continue;
    }
    // Neighbouring points mostly share a panel.
    const numeric::LogCurve::Panel& panel = curve.panel_at(x[j]);
    std::size_t n = 1;
    while (j + n < x.size() && x[j + n] >= panel.low && x[j + n] <= panel.high) ++n;
    numeric::LogCurve::evaluate(panel, &x[j], &out[j], n);
    prior.add(x.subspan(j, n), out.subspan(j, n));
    for (std::size_t i = j; i < j + n; ++i) out[i] -= log_integral;
    j += n;
  }
}

numeric::LogCurve curve_without(const Row& row, const Field& field, std::size_t study) {
  numeric::LogCurve out = row.curve;
  out.subtract([&](std::span<const double> x, std::span<double> values) {
    field.evaluate_one(study, row.spread, x, values);
  });
  return out;
}

Window row_window(const Field& field, const PriorBlock& prior, double spread,
                  const std::optional<Hint>& hint) {
  SearchSpace space;
  space.low = prior.shape().low;
  space.high = prior.shape().high;
  space.log_integrand = [&](std::span<const double> x, std::span<double> out) {
    field.evaluate(spread, x, out);
    prior.add(x, out);
  };
  const Guess guess = field.guess(spread);
  if (hint) {
    add_comb(space.start, hint->best, hint->width);
    space.start.push_back(guess.mean);
  } else {
    add_comb(space.start, guess.mean, guess.sd);
  }
  if (field.folded()) {
    const std::vector<double> one_side = space.start;
    for (const double x : one_side) space.start.push_back(-x);
    space.start.push_back(0.0);
    add_comb(space.start, guess.mean, guess.sd);
    add_comb(space.start, -guess.mean, guess.sd);
  }
  const PriorShape& shape = prior.shape();
  if (std::isfinite(shape.scale)) {
    const double centre = std::clamp(shape.center, shape.low, shape.high);
    for (const double offset : {-1.0, 0.0, 1.0}) space.start.push_back(centre + offset * shape.scale);
  }
  // All starting points may lie outside the support when the direction is against the data.
  if (std::isfinite(space.low)) space.start.push_back(space.low + std::min(guess.sd, shape.scale));
  if (std::isfinite(space.high)) space.start.push_back(space.high - std::min(guess.sd, shape.scale));
  return find_window(space);
}

Row make_row(const Field& field, const PriorBlock& prior, double spread, const std::optional<Hint>& hint,
             double noise, bool keep_nodes) {
  Row row;
  row.spread = spread;
  row.window = row_window(field, prior, spread, hint);
  const Window& window = row.window;

  const numeric::BlockFunction values = [&](std::span<const double> x, std::span<double> out) {
    field.evaluate(spread, x, out);
  };
  const numeric::BlockFunction weight = [&prior](std::span<const double> x, std::span<double> out) {
    prior.add(x, out);
  };
  std::vector<double> breaks{window.low, window.high};
  // A window that is much longer than its peak is wide gets the peak and its surroundings as panels of their
  // own: far out the likelihood is often flat, and one panel then serves a very long way.
  for (const double offset : {12.0, 60.0, 1000.0})
    for (const double x : {window.best - offset * window.width, window.best + offset * window.width})
      if (x > window.low + 0.5 * offset * window.width && x < window.high - 0.5 * offset * window.width)
        breaks.push_back(x);
  std::sort(breaks.begin(), breaks.end());
  numeric::LogCurve::Need need;
  need.tolerance = 1e-11;
  need.noise = noise;
  need.log_peak = window.log_best;
  need.weight = &weight;
  row.curve = numeric::LogCurve(values, breaks, need);
  row.evaluations = window.evaluations + row.curve.evaluations();

  const std::vector<double> marks = quadrature_breaks(row, prior.shape());
  std::vector<const numeric::LogCurve::Panel*> panel_of(marks.size() - 1);
  for (std::size_t i = 0; i + 1 < marks.size(); ++i)
    panel_of[i] = &row.curve.panel_at(0.5 * (marks[i] + marks[i + 1]));
  double interpolation = 0.0;
  double first = 0.0;
  double second = 0.0;
  const auto log_integrand = [&](std::size_t index, const numeric::KronrodArray& x,
                                 numeric::KronrodArray& out) {
    numeric::LogCurve::evaluate(*panel_of[index], x.data(), out.data(), x.size());
    prior.add(x, out);
  };
  const auto accept = [&](std::size_t index, const numeric::KronrodArray& x,
                          const numeric::KronrodArray& mass) {
    double sum = 0.0;
    for (std::size_t j = 0; j < x.size(); ++j) {
      const double from_best = x[j] - window.best;
      sum += mass[j];
      first += mass[j] * from_best;
      second += mass[j] * from_best * from_best;
      if (keep_nodes) row.nodes.push_back({x[j], mass[j]});
    }
    interpolation += sum * panel_of[index]->error;
  };
  const numeric::Quadrature q = numeric::integrate_log(marks, window.log_best, 1e-12, log_integrand, accept);
  row.log_integral = window.log_best + std::log(q.value);
  row.error = (q.error + interpolation) / q.value + 1e-15;
  row.mean = window.best + first / q.value;
  row.sd = std::sqrt(std::max(0.0, second / q.value - (first / q.value) * (first / q.value)));
  for (Node& node : row.nodes) node.mass /= q.value;
  return row;
}

}  // namespace steelyard::pool_room
