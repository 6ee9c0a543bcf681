// The effect in a new study, and a study's own effect: the mean's posterior seen through the spread.
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

/// How a row's density is convolved with Normal(0, τ²).
enum class Way {
  nodes,    ///< τ is large beside the row's width: a sum over fixed nodes of the mean
  clipped,  ///< τ is small and the row smooth: 31 Kronrod points over the part of the row within 7.5 τ
  adaptive  ///< the row has structure finer than τ
};

struct Part {
  const Row* row = nullptr;
  double weight = 0.0;
  Way way = Way::adaptive;
  std::vector<double> centre;  ///< nodes of the mean
  std::vector<double> mass;
};

/// An equally spaced rule on ±6.5 standard deviations is exact to 1e-10 for a shape near the Normal; whether
/// it is shows in its sum and mean. Otherwise the nodes of the row's own quadrature serve.
bool equally_spaced_nodes(const Row& row, const PriorBlock& prior, Part& part) {
  constexpr int half = 10;
  constexpr double step = 0.65;
  std::array<double, 2 * half + 1> x;
  std::array<double, 2 * half + 1> g;
  for (int i = -half; i <= half; ++i)
    x[static_cast<std::size_t>(i + half)] = row.mean + row.sd * step * static_cast<double>(i);
  row.log_density(prior, x, g);
  double sum = 0.0;
  double mean = 0.0;
  double square = 0.0;
  for (std::size_t j = 0; j < x.size(); ++j) {
    g[j] = std::exp(g[j]) * row.sd * step;
    const double z = (x[j] - row.mean) / row.sd;
    sum += g[j];
    mean += g[j] * z;
    square += g[j] * z * z;
  }
  if (!(std::fabs(sum - 1.0) < 3e-9 && std::fabs(mean) < 3e-9 && std::fabs(square - 1.0) < 1e-8))
    return false;
  for (std::size_t j = 0; j < x.size(); ++j) {
    if (g[j] < 1e-10) continue;
    part.centre.push_back(x[j]);
    part.mass.push_back(g[j] / sum);
  }
  return true;
}

/// The nodes of the row's own quadrature.
void own_nodes(const Row& row, Part& part) {
  for (const Node& node : row.nodes) {
    if (node.mass < 1e-12) continue;
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
      const double width = std::max(row.sd, std::min(row.window.width, 4.0 * row.sd));
      if (row.spread > 0.6 * width) {
        part.way = Way::nodes;
        if (!equally_spaced_nodes(row, prior, part)) own_nodes(row, part);
      } else if (row.curve.panels().size() == 1 && prior.shape().scale > 0.5 * row.sd) {
        part.way = Way::clipped;
      }
      parts.push_back(std::move(part));
    }
  return parts;
}

using LogDivisor = std::function<void(std::span<const double>, std::span<double>)>;

/// ∫ density of the row(m)/divisor(m)·Normal(x; m, τ²) dm for a block of x by a fixed rule.
void convolve_clipped(const Row& row, const PriorBlock& prior, std::span<const double> x,
                      std::span<double> out, const LogDivisor& log_divisor) {
  constexpr double reach = 7.5;
  const numeric::KronrodRule& rule = numeric::kronrod_rule();
  const double front = 1.0 / (row.spread * std::sqrt(2.0 * std::numbers::pi));
  for (std::size_t j = 0; j < x.size(); ++j) {
    const double low = std::max(row.window.low, x[j] - reach * row.spread);
    const double high = std::min(row.window.high, x[j] + reach * row.spread);
    out[j] = 0.0;
    if (!(low < high)) continue;
    const double middle = low + 0.5 * (high - low);
    const double half = 0.5 * (high - low);
    numeric::KronrodArray m;
    numeric::KronrodArray g;
    for (std::size_t i = 0; i < m.size(); ++i) m[i] = middle + half * rule.x[i];
    row.log_density(prior, m, g);
    if (log_divisor) {
      numeric::KronrodArray divisor{};
      log_divisor(m, divisor);
      for (std::size_t i = 0; i < m.size(); ++i) g[i] -= divisor[i];
    }
    for (std::size_t i = 0; i < m.size(); ++i) {
      const double z = (x[j] - m[i]) / row.spread;
      g[i] -= 0.5 * z * z;
    }
    numeric::exp_shifted(g.data(), 0.0, g.size());
    double sum = 0.0;
    for (std::size_t i = 0; i < m.size(); ++i) sum += rule.weight[i] * g[i];
    out[j] = front * half * sum;
  }
}

/// ∫ density of the row(m)·h(m)·Normal(x; m, τ²) dm for one x by adaptive quadrature over m, where the row
/// has structure finer than the spread. `log_divisor`, if any, is subtracted from the log density.
double convolve_at(const Row& row, const PriorBlock& prior, double x, const LogDivisor& log_divisor) {
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
  const std::vector<double> breaks = merge_marks(edges, marks, 1e-3 * (high - low));
  const double log_front = -std::log(row.spread) - 0.5 * std::log(2.0 * std::numbers::pi);
  const auto g = [&](std::size_t, const numeric::KronrodArray& m, numeric::KronrodArray& out) {
    row.log_density(prior, m, out);
    if (log_divisor) {
      numeric::KronrodArray divisor{};
      log_divisor(m, divisor);
      for (std::size_t j = 0; j < m.size(); ++j) out[j] -= divisor[j];
    }
    for (std::size_t j = 0; j < m.size(); ++j) {
      const double z = (x - m[j]) / row.spread;
      out[j] += log_front - 0.5 * z * z;
    }
  };
  const auto ignore = [](std::size_t, const numeric::KronrodArray&, const numeric::KronrodArray&) {};
  return numeric::integrate_log(breaks, 0.0, 1e-9, g, ignore).value;
}

/// Where the density may live: rows' windows widened by their spreads.
struct Extent {
  double low, high, best, width;
};

Extent extent(const std::vector<Part>& parts) {
  Extent out{};
  double heaviest = 0.0;
  bool first = true;
  for (const Part& part : parts) {
    const Row& row = *part.row;
    // A Normal tail of 7.5 standard deviations holds 1e-13.
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

}  // namespace

numeric::DensityCurve own_effect_density(const RandomMarginal& random, const PriorBlock& prior,
                                         const Field& field, std::optional<std::size_t> study) {
  std::vector<Part> parts = make_parts(random, prior);
  Extent where = extent(parts);
  double log_front = 0.0;  // keeps L_i(x)·(1/L_i(μ, τ)) near one
  std::vector<double> own;
  double level = 0.0;  // the size of −log L_i where the others' posterior lives, against overflow
  if (study) {
    bool first = true;
    for (const Part& part : parts) {
      double value = 0.0;
      field.evaluate_one(*study, part.row->spread, {&part.row->mean, 1}, {&value, 1});
      const double size = std::log(std::fabs(part.weight)) - value;
      level = first ? size : std::max(level, size);
      first = false;
    }
    for (Part& part : parts) {
      if (part.way != Way::nodes) continue;
      own.resize(part.centre.size());
      field.evaluate_one(*study, part.row->spread, part.centre, own);
      for (std::size_t b = 0; b < own.size(); ++b) part.mass[b] *= std::exp(-own[b] - level);
    }
    // The study's own likelihood narrows the place down.
    SearchSpace space;
    space.low = where.low;
    space.high = where.high;
    space.start = {where.best, where.best - where.width, where.best + where.width};
    for (const Part& part : parts)
      if (std::fabs(part.weight) > 1e-3) {
        const double s = std::hypot(part.row->spread, part.row->sd);
        for (const double offset : {-4.0, -1.5, 1.5, 4.0}) space.start.push_back(part.row->mean + offset * s);
      }
    space.log_integrand = [&](std::span<const double> x, std::span<double> out) {
      field.evaluate_one(*study, 0.0, x, out);
    };
    const Window likelihood = find_window(space);
    log_front = likelihood.log_best;
    where.low = std::max(where.low, likelihood.low);
    where.high = std::min(where.high, likelihood.high);
    // Precision-weighted guess of the peak.
    const double a = 1.0 / (likelihood.width * likelihood.width);
    const double b = 1.0 / (where.width * where.width);
    where.best = std::clamp((a * likelihood.best + b * where.best) / (a + b), where.low, where.high);
    where.width = 1.0 / std::sqrt(a + b);
  }
  const numeric::BlockFunction density = [&](std::span<const double> x, std::span<double> out) {
    std::array<double, numeric::chebyshev_points> one;
    std::fill(out.begin(), out.end(), 0.0);
    for (const Part& part : parts) {
      const double front = part.weight / (part.row->spread * std::sqrt(2.0 * std::numbers::pi));
      if (part.way == Way::nodes) {
        std::fill(one.begin(), one.end(), 0.0);
        add_mixture(part.centre.data(), part.mass.data(), part.centre.size(), 1.0 / part.row->spread,
                    x.data(), one.data(), x.size());
        for (std::size_t j = 0; j < x.size(); ++j) out[j] += front * one[j];
        continue;
      }
      LogDivisor divisor;
      if (study)
        divisor = [&](std::span<const double> m, std::span<double> values) {
          field.evaluate_one(*study, part.row->spread, m, values);
          for (double& value : values) value += level;
        };
      if (part.way == Way::clipped) {
        convolve_clipped(*part.row, prior, x, one, divisor);
        for (std::size_t j = 0; j < x.size(); ++j) out[j] += part.weight * one[j];
        continue;
      }
      for (std::size_t j = 0; j < x.size(); ++j)
        out[j] += part.weight * convolve_at(*part.row, prior, x[j], divisor);
    }
    if (!study) return;
    field.evaluate_one(*study, 0.0, x, {one.data(), x.size()});
    for (std::size_t j = 0; j < x.size(); ++j) out[j] *= std::exp(one[j] - log_front);
  };
  Neighbourhood neighbourhood{where.low, where.high, {where.best}};
  for (const double offset : {1.0, 2.5, 5.0, 9.0, 40.0, 300.0}) {
    neighbourhood.look.push_back(where.best - offset * where.width);
    neighbourhood.look.push_back(where.best + offset * where.width);
  }
  return through_logarithm(density, neighbourhood);
}

}  // namespace steelyard::pool_room
