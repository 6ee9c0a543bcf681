#include "pool/densities.hpp"

#include <algorithm>
#include <array>
#include <cmath>

#include "pool/marks.hpp"

namespace steelyard::pool_room {

namespace {

/// Rows that carry less than this of the posterior are left out of densities; far below the accuracy of
/// any quantile.
constexpr double least_weight = 1e-12;

/// Distances from a peak, in its width, at which panels of a density end.
constexpr double flanks[] = {1.2, 2.7, 4.5, 7.0, 12.0, 24.0, 64.0, 256.0, 2048.0, 65536.0};

void add_flanks(std::vector<double>& marks, double best, double width, double low, double high) {
  marks.push_back(best);
  for (const double offset : flanks) {
    if (best - offset * width > low) marks.push_back(best - offset * width);
    if (best + offset * width < high) marks.push_back(best + offset * width);
  }
}

void add_prior_marks(std::vector<double>& marks, const PriorShape& shape, double length) {
  if (!std::isfinite(shape.scale) || shape.scale * 4.0 > length) return;
  for (const double offset : {-32.0, -8.0, -2.0, 0.0, 2.0, 8.0, 32.0})
    marks.push_back(shape.center + offset * shape.scale);
}

}  // namespace

numeric::DensityCurve effect_density_fixed(const Row& row, const PriorBlock& prior) {
  const numeric::BlockFunction density = [&](std::span<const double> x, std::span<double> out) {
    row.log_density(prior, x, out);
    numeric::exp_shifted(out.data(), 0.0, out.size());
  };
  std::vector<double> edges;
  for (const auto& panel : row.curve.panels()) edges.push_back(panel.low);
  edges.push_back(row.curve.high());
  std::vector<double> marks;
  add_flanks(marks, row.window.best, row.window.width, row.window.low, row.window.high);
  add_prior_marks(marks, prior.shape(), row.window.high - row.window.low);
  return {density, merge_marks(edges, marks, 0.1 * std::min(row.window.width, prior.shape().scale))};
}

namespace {

/// A row and its weight in the posterior of the spread.
struct Weighed {
  const Row* row;
  double weight;
};

std::vector<Weighed> weighed_rows(const RandomMarginal& random) {
  std::vector<Weighed> out;
  for (std::size_t p = 0; p < random.outer.panels.size(); ++p)
    for (std::size_t j = 0; j < numeric::chebyshev_points; ++j) {
      const double weight = random.outer.panels[p].weight[j];
      if (std::fabs(weight) > least_weight)
        out.push_back({&random.rows[p * numeric::chebyshev_points + j], weight});
    }
  return out;
}

const Row& heaviest(const std::vector<Weighed>& rows) {
  return *std::max_element(rows.begin(), rows.end(), [](const Weighed& a, const Weighed& b) {
            return a.weight < b.weight;
          })->row;
}

}  // namespace

numeric::DensityCurve effect_density_random(const RandomMarginal& random, const PriorBlock& prior) {
  const std::vector<Weighed> rows = weighed_rows(random);
  double low = rows.front().row->window.low;
  double high = rows.front().row->window.high;
  for (const Weighed& w : rows) {
    low = std::min(low, w.row->window.low);
    high = std::max(high, w.row->window.high);
  }
  const numeric::BlockFunction density = [&](std::span<const double> x, std::span<double> out) {
    std::array<double, numeric::chebyshev_points> one;
    std::fill(out.begin(), out.end(), 0.0);
    for (const Weighed& w : rows) {
      w.row->log_density(prior, x, {one.data(), x.size()});
      numeric::exp_shifted(one.data(), 0.0, x.size());
      for (std::size_t j = 0; j < x.size(); ++j) out[j] += w.weight * one[j];
    }
  };
  const Row& main = heaviest(rows);
  Neighbourhood where{low, high, {}};
  add_flanks(where.look, main.window.best, main.window.width, low, high);
  add_prior_marks(where.look, prior.shape(), high - low);
  return through_logarithm(density, where);
}

numeric::DensityCurve through_logarithm(const numeric::BlockFunction& density, const Neighbourhood& where) {
  const numeric::BlockFunction log_density = [&density](std::span<const double> x, std::span<double> out) {
    constexpr std::size_t block = numeric::chebyshev_points;
    for (std::size_t first = 0; first < x.size(); first += block) {
      const std::size_t n = std::min(block, x.size() - first);
      density(x.subspan(first, n), out.subspan(first, n));
    }
    // Far out the weighed sum may cross zero by rounding.
    for (double& value : out) value = std::log(std::max(value, 1e-300));
  };
  SearchSpace space;
  space.low = where.low;
  space.high = where.high;
  space.start = where.look;
  space.drop = 26.0;  // what is left out holds less than 1e-10
  space.log_integrand = log_density;
  const Window window = find_window(space);
  std::vector<double> wanted;
  for (double offset = 2.5; offset * window.width < window.high - window.low; offset *= 3.5) {
    wanted.push_back(window.best - offset * window.width);
    wanted.push_back(window.best + offset * window.width);
  }
  numeric::LogCurve::Need need;
  need.tolerance = 3e-10;
  need.noise = 1e-11;
  need.loosest = 1e-2;
  need.log_peak = window.log_best;
  const numeric::LogCurve curve(log_density, merge_marks({window.low, window.high}, wanted, window.width),
                                need);
  const numeric::BlockFunction smooth = [&curve](std::span<const double> x, std::span<double> out) {
    // DensityCurve asks for points of one panel at a time, and its panels end where the curve's do.
    numeric::LogCurve::evaluate(curve.panel_at(0.5 * (x.front() + x.back())), x.data(), out.data(), x.size());
    numeric::exp_shifted(out.data(), 0.0, out.size());
  };
  std::vector<double> edges;
  for (const auto& panel : curve.panels()) edges.push_back(panel.low);
  edges.push_back(curve.high());
  std::vector<double> marks;
  add_flanks(marks, window.best, window.width, window.low, window.high);
  numeric::DensityCurve out(smooth, merge_marks(edges, marks, 0.1 * window.width), 1e-9);
  // A logarithm that falls off a cliff can't be interpolated: the curve then overshoots beyond what the peak
  // allows, and the density itself serves.
  if (out.total() < std::exp(window.log_best + 0.5) * (window.high - window.low)) return out;
  const numeric::BlockFunction plain = [&density](std::span<const double> x, std::span<double> values) {
    density(x, values);
    for (double& value : values) value = std::max(value, 0.0);
  };
  return {plain, merge_marks({window.low, window.high}, marks, 0.1 * window.width), 1e-9};
}

numeric::DensityCurve spread_density(const RandomMarginal& random, const SpreadPrior& prior) {
  SpreadProblem problem;
  problem.axis = random.axis;
  problem.prior = prior;
  const numeric::BlockFunction density = [&](std::span<const double> u, std::span<double> out) {
    for (std::size_t j = 0; j < u.size(); ++j)
      out[j] = std::exp(log_outer(problem, random.outer.curve, u[j]) - random.outer.log_value);
  };
  return {density, random.outer.breaks};
}

void Mixture::add(double weight, const numeric::DensityCurve* part) {
  if (weight > 0.0 && part != nullptr && !part->empty()) parts_.push_back({weight, part});
}

double Mixture::density(double x) const {
  double sum = 0.0;
  for (const Part& part : parts_) sum += part.weight * part.curve->density(x);
  return sum;
}

double Mixture::cdf(double x) const {
  double sum = 0.0;
  for (const Part& part : parts_) sum += part.weight * part.curve->cdf(x);
  return sum;
}

double Mixture::quantile(double p) const {
  if (parts_.size() == 1) return parts_.front().curve->quantile(p);
  double low = parts_.front().curve->quantile(p);
  double high = low;
  for (const Part& part : parts_) {
    const double q = part.curve->quantile(p);
    low = std::min(low, q);
    high = std::max(high, q);
  }
  // The quantile lies between those of the parts. Newton inside a shrinking bracket.
  double x = 0.5 * (low + high);
  for (int round = 0; round < 200 && low < high; ++round) {
    const double miss = cdf(x) - p;
    if (std::fabs(miss) < 1e-13) break;
    (miss > 0.0 ? high : low) = x;
    const double slope = density(x);
    double next = slope > 0.0 ? x - miss / slope : 0.5 * (low + high);
    if (!(next > low && next < high)) next = 0.5 * (low + high);
    if (next == x) break;
    x = next;
  }
  return x;
}

double Mixture::mean() const {
  double sum = 0.0;
  for (const Part& part : parts_) sum += part.weight * part.curve->mean();
  return sum;
}

double Mixture::variance(double mean) const {
  double sum = 0.0;
  for (const Part& part : parts_) sum += part.weight * part.curve->variance(mean);
  return sum;
}

}  // namespace steelyard::pool_room
