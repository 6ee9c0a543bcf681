// The effect in a new study, and a study's own effect: the mean's posterior seen through the spread.
//
// Given (μ, τ) a new effect is Normal(μ, τ²), and a study's own effect has density proportional to
// L_i(x)·Normal(x; μ, τ²)/L_i(μ, τ). So each row of the posterior, the study's own factor taken out of it,
// is convolved with Normal(0, τ²), the rows are added with their weights, and the sum is multiplied by
// L_i(x).
#include <algorithm>
#include <array>
#include <cmath>
#include <functional>
#include <numbers>

#include "numeric/quadrature.hpp"
#include "pool/densities.hpp"
#include "pool/kernels.hpp"
#include "pool/marks.hpp"

namespace steelyard::pool_room {

namespace {

constexpr double least_weight = 1e-10;
constexpr double least_mass = 1e-10;

/// How a row is convolved with Normal(0, τ²).
enum class Way {
  nodes,    ///< τ is large beside every structure of the row: a sum over fixed nodes of the mean
  clipped,  ///< τ is small and the row smooth: 31 Kronrod points over the part of the row within 6.2 τ
  adaptive  ///< the row has structure of several sizes
};

struct Part {
  const Row* row = nullptr;
  double weight = 0.0;
  Way way = Way::adaptive;
  std::vector<double> centre;  ///< nodes of the mean
  std::vector<double> mass;    ///< of the row's density, at the nodes; sums to 1
  Row other;                   ///< the row without the study, if one is to be taken out
  [[nodiscard]] const Row& shape() const { return other.curve.panels().empty() ? *row : other; }
};

/// An equally spaced rule on ±6.5 standard deviations is exact to 1e-9 for a shape near the Normal; whether
/// the row has one shows in the rule's sum, mean and variance.
bool equally_spaced_nodes(const Row& row, const PriorBlock& prior, Part& part) {
  constexpr int half = 10;
  constexpr double step = 0.65;
  std::array<double, 2 * half + 1> x;
  std::array<double, 2 * half + 1> g;
  for (int i = -half; i <= half; ++i)
    x[static_cast<std::size_t>(i + half)] = row.mean + row.sd * step * static_cast<double>(i);
  row.log_density(prior, x, g);
  numeric::exp_shifted(g.data(), 0.0, g.size());
  double sum = 0.0;
  double mean = 0.0;
  double square = 0.0;
  for (std::size_t j = 0; j < x.size(); ++j) {
    g[j] *= row.sd * step;
    const double z = (x[j] - row.mean) / row.sd;
    sum += g[j];
    mean += g[j] * z;
    square += g[j] * z * z;
  }
  // What counts is the error in the whole, in which the row has its weight.
  const double error = std::max({std::fabs(sum - 1.0), std::fabs(mean), 0.1 * std::fabs(square - 1.0)});
  if (!(error < 1e-2 && error * std::fabs(part.weight) < 2e-9)) return false;
  for (std::size_t j = 0; j < x.size(); ++j) {
    if (g[j] < least_mass) continue;
    part.centre.push_back(x[j]);
    part.mass.push_back(g[j] / sum);
  }
  return true;
}

/// The nodes of the row's own quadrature.
void own_nodes(const Row& row, Part& part) {
  for (const Node& node : row.nodes) {
    if (node.mass < 1e-2 * least_mass) continue;
    part.centre.push_back(node.x);
    part.mass.push_back(node.mass);
  }
}

std::vector<Part> make_parts(const RandomMarginal& random, const PriorBlock& prior) {
  std::vector<Part> parts;
  for (std::size_t p = 0; p < random.outer.panels.size(); ++p)
    for (std::size_t j = 0; j < numeric::chebyshev_points; ++j) {
      Part part;
      part.weight = random.outer.panels[p].weight[j];
      if (std::fabs(part.weight) < least_weight) continue;
      part.row = &random.rows[p * numeric::chebyshev_points + j];
      const Row& row = *part.row;
      const bool one_size = row.sd < 1.6 * row.window.width && prior.shape().scale > 0.5 * row.sd;
      // At this ratio the two rules are equally exact: 1e-8.
      if (row.spread > 0.8 * row.sd) {
        part.way = Way::nodes;
        if (!equally_spaced_nodes(row, prior, part)) own_nodes(row, part);
      } else if (one_size) {
        part.way = Way::clipped;
      }
      parts.push_back(std::move(part));
    }
  return parts;
}

/// Takes one study out of every part, scaled down as a whole against overflow.
void take_out(std::vector<Part>& parts, const PriorBlock& prior, const Field& field, std::size_t study) {
  double level = 0.0;
  bool first = true;
  for (const Part& part : parts) {
    double value = 0.0;
    field.evaluate_one(study, part.row->spread, {&part.row->mean, 1}, {&value, 1});
    const double size = std::log(std::fabs(part.weight)) - value;
    level = first ? size : std::max(level, size);
    first = false;
  }
  std::vector<double> with;
  std::vector<double> without;
  for (Part& part : parts) {
    part.other.spread = part.row->spread;
    part.other.window = part.row->window;
    part.other.curve = curve_without(*part.row, field, study);
    part.other.log_integral = part.row->log_integral + level;
    if (part.way != Way::nodes) continue;
    with.resize(part.centre.size());
    without.resize(part.centre.size());
    part.row->log_density(prior, part.centre, with);
    part.other.log_density(prior, part.centre, without);
    for (std::size_t b = 0; b < with.size(); ++b) with[b] = without[b] - with[b];
    numeric::exp_shifted(with.data(), 0.0, with.size());
    for (std::size_t b = 0; b < with.size(); ++b) part.mass[b] *= with[b];
  }
}

/// log of Normal(x; m, τ²) added to a block over m.
void add_kernel(double x, double spread, const numeric::KronrodArray& m, numeric::KronrodArray& out) {
  const double front = -std::log(spread * std::sqrt(2.0 * std::numbers::pi));
  for (std::size_t i = 0; i < m.size(); ++i) {
    const double z = (x - m[i]) / spread;
    out[i] += front - 0.5 * z * z;
  }
}

/// out[j] += weight·∫ row(m)·Normal(x[j]; m, τ²) dm, each by one panel of 31 points over the part of the row
/// within 6.2 τ of x[j]; all points are evaluated together.
void add_clipped(const Row& row, const PriorBlock& prior, double weight, std::span<const double> x,
                 std::span<double> out) {
  constexpr double reach = 6.2;
  constexpr std::size_t n = numeric::kronrod_points;
  const numeric::KronrodRule& rule = numeric::kronrod_rule();
  std::array<double, n * numeric::chebyshev_points> m;
  std::array<double, n * numeric::chebyshev_points> g;
  std::array<double, numeric::chebyshev_points> half{};
  for (std::size_t j = 0; j < x.size(); ++j) {
    const double low = std::clamp(x[j] - reach * row.spread, row.window.low, row.window.high);
    const double high = std::clamp(x[j] + reach * row.spread, row.window.low, row.window.high);
    const double middle = low + 0.5 * (high - low);
    half[j] = 0.5 * (high - low);
    for (std::size_t i = 0; i < n; ++i) m[j * n + i] = middle + half[j] * rule.x[i];
  }
  const std::size_t count = n * x.size();
  row.log_density(prior, {m.data(), count}, {g.data(), count});
  const double inv = 1.0 / row.spread;
  for (std::size_t j = 0; j < x.size(); ++j)
    for (std::size_t i = 0; i < n; ++i) {
      const double z = (x[j] - m[j * n + i]) * inv;
      g[j * n + i] -= 0.5 * z * z;
    }
  numeric::exp_shifted(g.data(), 0.0, count);
  const double front = weight * inv / std::sqrt(2.0 * std::numbers::pi);
  for (std::size_t j = 0; j < x.size(); ++j) {
    double sum = 0.0;
    for (std::size_t i = 0; i < n; ++i) sum += rule.weight[i] * g[j * n + i];
    out[j] += front * half[j] * sum;
  }
}

/// ∫ row(m)·Normal(x; m, τ²) dm by adaptive quadrature.
double convolve_adaptive(const Row& row, const PriorBlock& prior, double x) {
  constexpr double reach = 8.0;
  const double low = std::max(row.window.low, x - reach * row.spread);
  const double high = std::min(row.window.high, x + reach * row.spread);
  if (!(low < high)) return 0.0;
  std::vector<double> edges{low};
  for (const auto& panel : row.curve.panels())
    if (panel.low > low && panel.low < high) edges.push_back(panel.low);
  edges.push_back(high);
  std::vector<double> marks{x, row.window.best};
  const PriorShape& shape = prior.shape();
  if (std::isfinite(shape.scale) && shape.scale * 4.0 < high - low)
    for (const double offset : {-32.0, -4.0, 0.0, 4.0, 32.0})
      marks.push_back(shape.center + offset * shape.scale);
  const auto g = [&](std::size_t, const numeric::KronrodArray& m, numeric::KronrodArray& out) {
    row.log_density(prior, m, out);
    add_kernel(x, row.spread, m, out);
  };
  const auto ignore = [](std::size_t, const numeric::KronrodArray&, const numeric::KronrodArray&) {};
  return numeric::integrate_log(merge_marks(edges, marks, 1e-3 * (high - low)), 0.0, 1e-9, g, ignore).value;
}

void add_part(const Part& part, const PriorBlock& prior, std::span<const double> x, std::span<double> out) {
  if (part.way == Way::nodes) {
    std::array<double, numeric::chebyshev_points> one{};
    add_mixture(part.centre.data(), part.mass.data(), part.centre.size(), 1.0 / part.row->spread, x.data(),
                one.data(), x.size());
    const double front = part.weight / (part.row->spread * std::sqrt(2.0 * std::numbers::pi));
    for (std::size_t j = 0; j < x.size(); ++j) out[j] += front * one[j];
    return;
  }
  if (part.way == Way::clipped) {
    add_clipped(part.shape(), prior, part.weight, x, out);
    return;
  }
  for (std::size_t j = 0; j < x.size(); ++j)
    out[j] += part.weight * convolve_adaptive(part.shape(), prior, x[j]);
}

/// Where the density may live, and its peak.
struct Extent {
  double low, high, best, width;
};

/// Rows' windows widened by their spreads: a Normal tail beyond 7.5 standard deviations holds 1e-13.
Extent extent(const std::vector<Part>& parts) {
  Extent out{};
  double heaviest = 0.0;
  bool first = true;
  for (const Part& part : parts) {
    const Row& row = *part.row;
    const double low = row.window.low - 7.5 * row.spread;
    const double high = row.window.high + 7.5 * row.spread;
    out.low = first ? low : std::min(out.low, low);
    out.high = first ? high : std::max(out.high, high);
    if (part.weight > heaviest) {
      heaviest = part.weight;
      out.best = row.window.best;
      out.width = std::hypot(row.window.width, row.spread);
    }
    first = false;
  }
  return out;
}

/// Narrows the extent by the study's own likelihood; returns the log of that likelihood's largest value.
double narrow(Extent& where, const std::vector<Part>& parts, const Field& field, std::size_t study) {
  SearchSpace space;
  space.low = where.low;
  space.high = where.high;
  space.start = {where.best, where.best - where.width, where.best + where.width};
  for (const Part& part : parts)
    if (std::fabs(part.weight) > 1e-2) {
      const double s = std::hypot(part.row->spread, part.row->sd);
      for (const double offset : {-4.0, -1.5, 1.5, 4.0}) space.start.push_back(part.row->mean + offset * s);
    }
  space.log_integrand = [&](std::span<const double> x, std::span<double> out) {
    field.evaluate_one(study, 0.0, x, out);
  };
  const Window likelihood = find_window(space);
  where.low = std::max(where.low, likelihood.low);
  where.high = std::min(where.high, likelihood.high);
  const double a = 1.0 / (likelihood.width * likelihood.width);
  const double b = 1.0 / (where.width * where.width);
  where.best = std::clamp((a * likelihood.best + b * where.best) / (a + b), where.low, where.high);
  where.width = 1.0 / std::sqrt(a + b);
  return likelihood.log_best;
}

}  // namespace

numeric::DensityCurve own_effect_density(const RandomMarginal& random, const PriorBlock& prior,
                                         const Field& field, std::optional<std::size_t> study) {
  std::vector<Part> parts = make_parts(random, prior);
  Extent where = extent(parts);
  double log_own = 0.0;
  if (study) {
    take_out(parts, prior, field, *study);
    log_own = narrow(where, parts, field, *study);
  }
  const numeric::BlockFunction density = [&](std::span<const double> x, std::span<double> out) {
    std::fill(out.begin(), out.end(), 0.0);
    for (const Part& part : parts) add_part(part, prior, x, out);
    if (!study) return;
    std::array<double, numeric::chebyshev_points> own{};
    field.evaluate_one(*study, 0.0, x, {own.data(), x.size()});
    for (std::size_t j = 0; j < x.size(); ++j) out[j] *= std::exp(own[j] - log_own);
  };
  Neighbourhood neighbourhood{where.low, where.high, {where.best}};
  for (const double offset : {1.0, 2.5, 5.0, 9.0, 40.0, 300.0}) {
    neighbourhood.look.push_back(where.best - offset * where.width);
    neighbourhood.look.push_back(where.best + offset * where.width);
  }
  return through_logarithm(density, neighbourhood);
}

}  // namespace steelyard::pool_room
