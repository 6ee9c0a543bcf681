// A study far from the others: the chance of so extreme a result, given all the others.
#include <fmt/format.h>

#include <cmath>
#include <map>

#include "audit/rule.hpp"
#include "rebuild/student.hpp"
#include "steelyard/model.hpp"
#include "steelyard/numeric.hpp"

namespace steelyard::auditing {

namespace {

constexpr std::string_view id = "far-from-others";
constexpr std::size_t fewest = 4;       // studies of one metric; the spread of three others is hardly known
constexpr double line = 0.01;           // adjusted for the number of studies
constexpr double worth_exact = 0.5;     // a rough adjusted p above this is left at that
constexpr std::size_t most_exact = 25;  // suspects looked at, the most extreme first
constexpr std::size_t most_studies = 500;  // beyond that the rough p, which is then nearly right, has to do

// A signed estimate with its approximate variance.
struct Point {
  const Study* study = nullptr;
  double estimate = 0.0, variance = 0.0;
};

std::optional<Point> point_of(const Study& study) {
  if (is_folded(study.evidence)) return std::nullopt;
  if (const auto* normal = std::get_if<NormalEstimate>(&study.evidence)) {
    return Point{&study, normal->estimate, normal->se * normal->se};
  }
  const auto* exact = std::get_if<ExactT>(&study.evidence);
  if (exact == nullptr) return std::nullopt;
  const double d = exact->t / std::sqrt(exact->n_effective);
  return Point{&study, d, 1.0 / exact->n_effective + d * d / (2.0 * exact->df)};
}

// Weighted mean and its variance at a spread, and the moment estimate of the spread, without one point.
struct Others {
  double mean = 0.0, variance = 0.0, spread2 = 0.0;
};

struct Sums {
  double w = 0.0, we = 0.0, wee = 0.0, ww = 0.0, n = 0.0;
  void add(const Point& p, double sign) {
    const double weight = sign / p.variance;
    w += weight;
    we += weight * p.estimate;
    wee += weight * p.estimate * p.estimate;
    ww += sign / (p.variance * p.variance);
    n += sign;
  }
};

double moment_spread2(const Sums& s) {
  const double q = s.wee - s.we * s.we / s.w;
  const double c = s.w - s.ww / s.w;
  return c > 0.0 ? std::max((q - (s.n - 1.0)) / c, 0.0) : 0.0;
}

Others without(const std::vector<Point>& points, std::size_t skip, double spread2) {
  double w = 0.0, we = 0.0;
  for (std::size_t i = 0; i < points.size(); ++i) {
    if (i == skip) continue;
    const double weight = 1.0 / (points[i].variance + spread2);
    w += weight;
    we += weight * points[i].estimate;
  }
  return {we / w, 1.0 / w, spread2};
}

double adjusted(double p, std::size_t k) {
  return -std::expm1(static_cast<double>(k) * std::log1p(-std::min(p, 1.0)));
}

// log P of a result above (below) the study's own, given mean and spread.
double log_tail(const Study& study, double mean, double spread, bool above) {
  if (const auto* normal = std::get_if<NormalEstimate>(&study.evidence)) {
    const double z = (normal->estimate - mean) / std::hypot(normal->se, spread);
    return numeric::log_normal_upper(above ? z : -z);
  }
  const auto& exact = std::get<ExactT>(study.evidence);
  const double s = std::sqrt(1.0 + exact.n_effective * spread * spread);
  const double ncp = mean * std::sqrt(exact.n_effective) / s;
  return above ? numeric::log_noncentral_t_upper(exact.t / s, exact.df, ncp)
               : numeric::log_noncentral_t_cdf(exact.t / s, exact.df, ncp);
}

// Two-sided predictive p by quadrature over (mean, spread), both with flat priors: spread as scale·10·u² on a
// grid of u, the mean on a grid of its own standard error.
double exact_p(const std::vector<Point>& points, std::size_t target, double scale) {
  constexpr int spread_nodes = 24;
  constexpr int half_nodes = 12;
  double log_all = -infinity, log_above = -infinity, log_below = -infinity;
  for (int j = 0; j < spread_nodes; ++j) {
    const double u = (j + 0.5) / spread_nodes;
    const double spread = 10.0 * scale * u * u;
    const Others others = without(points, target, spread * spread);
    const double step = 0.5 * std::sqrt(others.variance);
    for (int i = -half_nodes; i <= half_nodes; ++i) {
      const double mean = others.mean + step * i;
      double log_weight = std::log(u * step);
      for (std::size_t k = 0; k < points.size(); ++k) {
        if (k != target) log_weight += log_likelihood(likelihood(*points[k].study), mean, spread);
      }
      log_all = numeric::log_add(log_all, log_weight);
      log_above =
          numeric::log_add(log_above, log_weight + log_tail(*points[target].study, mean, spread, true));
      log_below =
          numeric::log_add(log_below, log_weight + log_tail(*points[target].study, mean, spread, false));
    }
  }
  return std::min(2.0 * std::exp(std::min(log_above, log_below) - log_all), 1.0);
}

struct Suspect {
  std::size_t index = 0;
  double rough = 1.0, scale = 0.0;
};

std::vector<Suspect> suspects(const std::vector<Point>& points) {
  Sums all;
  for (const Point& p : points) all.add(p, 1.0);
  std::vector<Suspect> found;
  for (std::size_t i = 0; i < points.size(); ++i) {
    Sums s = all;
    s.add(points[i], -1.0);
    const double spread2 = moment_spread2(s);
    const double weight = s.w / (1.0 + spread2 * s.w / s.n);
    const double z =
        (points[i].estimate - s.we / s.w) / std::sqrt(points[i].variance + spread2 + 1.0 / weight);
    const double rough = adjusted(rebuilding::two_sided_p_normal(z), points.size());
    const double scale = std::sqrt(spread2 + s.n / s.w);
    if (rough < worth_exact) found.push_back({i, rough, scale});
  }
  std::sort(found.begin(), found.end(), [](const Suspect& a, const Suspect& b) {
    return a.rough != b.rough ? a.rough < b.rough : a.index < b.index;
  });
  if (found.size() > most_exact) found.resize(most_exact);
  return found;
}

void check_metric(const TableView& view, const std::vector<Point>& points) {
  if (points.size() < fewest) return;
  for (const Suspect& suspect : suspects(points)) {
    const double p = points.size() > most_studies
                         ? suspect.rough
                         : adjusted(exact_p(points, suspect.index, suspect.scale), points.size());
    if (!(p < line)) continue;
    const Study& study = *points[suspect.index].study;
    view.report(
        id, study.row, {},
        fmt::format("\"{}\" lies far from the other {} studies: given them, the chance that any of {} is so "
                    "extreme is "
                    "{:.2g}.",
                    study.label, points.size() - 1, points.size(), p),
        "Check its numbers and its direction, and whether it is the same question; if it is sound, keep it.");
  }
}

void check(const TableView& view) {
  std::map<std::string, std::vector<Point>> metrics;
  for (const Study& study : view.studies) {
    if (const auto point = point_of(study)) metrics[study.metric].push_back(*point);
  }
  for (const auto& [metric, points] : metrics) check_metric(view, points);
}

}  // namespace

Rule rule_far() {
  return {{id, "one study far from the others: exact predictive p, adjusted for the number of studies",
           "Šidák (1967) for the adjustment; docs/audit.md"},
          nullptr,
          check};
}

}  // namespace steelyard::auditing
