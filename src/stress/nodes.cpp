#include "stress/nodes.hpp"

#include <algorithm>
#include <array>
#include <cmath>
#include <limits>
#include <variant>

namespace steelyard::stressing {

namespace {

// Gauss-Legendre nodes and weights on [-1, 1] (Abramowitz & Stegun, table 25.4), positive half.
constexpr std::array<double, 2> x4 = {0.33998104358485626480, 0.86113631159405257522};
constexpr std::array<double, 2> w4 = {0.65214515486254614263, 0.34785484513745385737};
constexpr std::array<double, 3> x6 = {0.23861918608319690863, 0.66120938646626451366, 0.93246951420315202781};
constexpr std::array<double, 3> w6 = {0.46791393457269104739, 0.36076157304813860757, 0.17132449237917034504};

// Where a study puts its effect, roughly.
struct Rough {
  double estimate = 0.0;
  double se = 1.0;
};

Rough rough(const ExactT& e) {
  return {e.t / std::sqrt(e.n_effective), std::sqrt((1.0 + e.t * e.t / (2.0 * e.df)) / e.n_effective)};
}
Rough rough(const NormalEstimate& e) { return {e.estimate, e.se}; }
Rough rough(const BandT& e) {
  double nearest = std::numeric_limits<double>::infinity();
  for (const Interval& band : e.bands) {
    for (const double end : {band.low, band.high}) {
      if (std::abs(end) < std::abs(nearest)) nearest = end;
    }
  }
  return {std::isfinite(nearest) ? nearest / std::sqrt(e.n_effective) : 0.0, 1.0 / std::sqrt(e.n_effective)};
}

struct Extent {
  double low = 0.0, high = 0.0;  // of the estimates and their signs, a good way beyond
  double smallest_se = 1.0;      // of a single study
  double pooled_se = 1.0;        // of all together
};

Extent extent(std::span<const Study> studies) {
  Extent e;
  e.smallest_se = std::numeric_limits<double>::infinity();
  double information = 0.0;
  for (const Study& study : studies) {
    const Rough r = std::visit([](const auto& evidence) { return rough(evidence); }, study.evidence);
    const bool folded = is_folded(study.evidence);
    e.low = std::min(e.low, (folded ? -std::abs(r.estimate) : r.estimate) - 7.0 * r.se);
    e.high = std::max(e.high, (folded ? std::abs(r.estimate) : r.estimate) + 7.0 * r.se);
    e.smallest_se = std::min(e.smallest_se, r.se);
    information += 1.0 / (r.se * r.se);
  }
  e.pooled_se = 1.0 / std::sqrt(information);
  return e;
}

void tidy(std::vector<double>& breaks) {
  std::sort(breaks.begin(), breaks.end());
  const auto same = [](double a, double b) { return b - a < 1e-12 * (1.0 + std::abs(a)); };
  breaks.erase(std::unique(breaks.begin(), breaks.end(), same), breaks.end());
}

// The axis over panels between breaks; `log_density` of the prior joins the weights.
template <class LogDensity>
Axis axis(const std::vector<double>& breaks, int points, LogDensity log_density) {
  const auto nodes = points == 4 ? std::span<const double>(x4) : std::span<const double>(x6);
  const auto weights = points == 4 ? std::span<const double>(w4) : std::span<const double>(w6);
  Axis a;
  for (std::size_t i = 1; i < breaks.size(); ++i) {
    const double middle = 0.5 * (breaks[i - 1] + breaks[i]);
    const double half = 0.5 * (breaks[i] - breaks[i - 1]);
    for (std::size_t j = 2 * nodes.size(); j-- > 0;) {
      // Falling from the last negative node to the largest positive one.
      const bool negative = j >= nodes.size();
      const std::size_t k = negative ? j - nodes.size() : nodes.size() - 1 - j;
      const double x = middle + (negative ? -half : half) * nodes[k];
      const double log_prior = log_density(x);
      if (!std::isfinite(log_prior)) continue;
      a.x.push_back(x);
      a.log_weight.push_back(std::log(half * weights[k]) + log_prior);
    }
  }
  return a;
}

// At most `most` core panels: with more, the data are so rich that single panels don't matter.
std::vector<double> mean_breaks(std::span<const Study> studies, const PriorShape& s, double widest,
                                double most) {
  const Extent e = extent(studies);
  const double core = e.high - e.low;
  const double width = std::min(2.0 * e.pooled_se, widest);
  const auto panels = static_cast<int>(std::clamp(std::ceil(core / width), 8.0, most));
  std::vector<double> breaks;
  for (int i = 0; i <= panels; ++i) breaks.push_back(e.low + core * i / panels);
  // A t or an estimate leaves nothing far out; under a bound alone the prior's tail has to be followed.
  const bool any_bound = std::any_of(studies.begin(), studies.end(), [](const Study& study) {
    return std::holds_alternative<BandT>(study.evidence);
  });
  const double farthest = (any_bound ? 1e6 : 30.0) * (core + s.scale);
  for (double reach = core / panels; reach < farthest; reach *= 1.6) {
    breaks.push_back(e.high + reach);
    breaks.push_back(e.low - reach);
  }
  for (double reach = s.scale / 8.0; reach < 1e3 * s.scale; reach *= 1.6) {
    breaks.push_back(s.center + reach);
    breaks.push_back(s.center - reach);
  }
  breaks.push_back(s.center);
  breaks.push_back(0.0);
  for (const double end : {s.low, s.high}) {
    if (std::isfinite(end)) breaks.push_back(end);
  }
  tidy(breaks);
  return breaks;
}

std::vector<double> spread_breaks(std::span<const Study> studies, const SpreadPrior& prior) {
  const Extent e = extent(studies);
  const PriorShape s = shape(prior);
  const double median = quantile(prior, 0.5);
  const double first = 0.05 * std::min(e.pooled_se, median);
  const double last = 1e4 * std::max({e.high - e.low, median, s.scale});
  std::vector<double> breaks = {0.0};
  for (double x = first; x < last; x *= 1.7) breaks.push_back(x);
  for (const double p : {1e-6, 0.01, 0.25, 0.75, 0.99}) breaks.push_back(quantile(prior, p));
  for (const double end : {s.low, s.high}) {
    if (std::isfinite(end)) breaks.push_back(end);
  }
  tidy(breaks);
  return breaks;
}

}  // namespace

Axis mean_axis(std::span<const Study> studies, const EffectPrior& prior, int points) {
  const PriorShape s = shape(prior);
  std::vector<double> breaks = mean_breaks(studies, s, std::numeric_limits<double>::infinity(), 4000.0);
  std::erase_if(breaks, [&s](double x) { return x < s.low || x > s.high; });
  return axis(breaks, points, [&prior](double x) { return log_density(prior, x); });
}

Axis open_mean_axis(std::span<const Study> studies, const EffectPrior& prior, int points, double widest) {
  return axis(mean_breaks(studies, shape(prior), widest, 300.0), points, [](double) { return 0.0; });
}

Axis mean_axis_for_all(std::span<const Study> studies, std::span<const EffectPrior> priors, int points) {
  // The landmarks of the narrowest prior, followed as far as the widest one reaches.
  PriorShape s = shape(priors.front());
  const double widest = shape(priors.back()).scale;
  std::vector<double> breaks = mean_breaks(studies, s, std::numeric_limits<double>::infinity(), 4000.0);
  for (double reach = 1e3 * s.scale; reach < 1e3 * widest; reach *= 1.6) {
    breaks.push_back(s.center + reach);
    breaks.push_back(s.center - reach);
  }
  for (const EffectPrior& prior : priors) {
    s = shape(prior);
    for (const double end : {s.low, s.high}) {
      if (std::isfinite(end)) breaks.push_back(end);
    }
  }
  tidy(breaks);
  return axis(breaks, points, [](double) { return 0.0; });
}

Axis spread_axis_for_all(std::span<const Study> studies, std::span<const SpreadPrior> priors, int points) {
  const std::vector<double> narrow = spread_breaks(studies, priors.front());
  const double last = spread_breaks(studies, priors.back()).back();
  std::vector<double> breaks = narrow;
  for (double x = narrow.back() * 1.7; x < last; x *= 1.7) breaks.push_back(x);
  for (const SpreadPrior& prior : priors) {
    const PriorShape s = shape(prior);
    for (const double end : {s.low, s.high}) {
      if (std::isfinite(end)) breaks.push_back(end);
    }
  }
  tidy(breaks);
  return axis(breaks, points, [](double) { return 0.0; });
}

Axis spread_axis(std::span<const Study> studies, const SpreadPrior& prior, int points) {
  const PriorShape s = shape(prior);
  std::vector<double> breaks = spread_breaks(studies, prior);
  std::erase_if(breaks, [&s](double x) { return x < s.low || x > s.high; });
  return axis(breaks, points, [&prior](double x) { return log_density(prior, x); });
}

}  // namespace steelyard::stressing
