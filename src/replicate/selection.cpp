#include "replicate/selection.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <utility>
#include <variant>

#include "pool/line.hpp"
#include "steelyard/numeric.hpp"

namespace steelyard::replicating {

namespace {

// The critical value of the study's statistic, and whether what was printed can be significant.
struct Threshold {
  double critical = 0.0;
  bool reached = false;
};

// A t that rounds to the critical value counts as having reached it.
constexpr double slack = 1e-9;

Threshold threshold(const ExactT& e, double alpha) {
  const double c = numeric::student_t_upper_quantile(0.5 * alpha, e.df);
  return {std::min(c, std::abs(e.t)), std::abs(e.t) >= c * (1.0 - slack)};
}
Threshold threshold(const NormalEstimate& e, double alpha) {
  const double c = numeric::normal_upper_quantile(0.5 * alpha);
  const double z = std::abs(e.estimate / e.se);
  return {std::min(c, z), z >= c * (1.0 - slack)};
}
Threshold threshold(const BandT& e, double alpha) {
  const double c = numeric::student_t_upper_quantile(0.5 * alpha, e.df);
  const bool reached = std::all_of(e.bands.begin(), e.bands.end(), [c](const Interval& band) {
    return band.low >= c * (1.0 - slack) || band.high <= -c * (1.0 - slack);
  });
  return {c, reached};
}

// Points between which the posterior has no hidden features: around each estimate, around the prior's
// centre, and far out.
std::vector<double> breaks(std::span<const Study> studies, const EffectPrior& prior) {
  const PriorShape s = shape(prior);
  std::vector<double> at = {0.0, s.center};
  const auto around = [&at](double center, double scale) {
    for (double reach = 0.25 * scale; reach < 1e4 * scale; reach *= 2.0) {
      at.push_back(center - reach);
      at.push_back(center + reach);
    }
  };
  around(s.center, s.scale);
  for (const Study& study : studies) {
    if (const auto* e = std::get_if<ExactT>(&study.evidence)) {
      around(e->t / std::sqrt(e->n_effective), 1.0 / std::sqrt(e->n_effective));
      if (e->folded) around(-e->t / std::sqrt(e->n_effective), 1.0 / std::sqrt(e->n_effective));
    } else if (const auto* n = std::get_if<NormalEstimate>(&study.evidence)) {
      around(n->estimate, n->se);
      if (n->folded) around(-n->estimate, n->se);
    }
  }
  if (std::isfinite(s.low)) at.push_back(s.low);
  if (std::isfinite(s.high)) at.push_back(s.high);
  std::erase_if(at, [&s](double x) { return x < s.low || x > s.high; });
  std::sort(at.begin(), at.end());
  at.erase(std::unique(at.begin(), at.end()), at.end());
  return at;
}

}  // namespace

Selected selected_originals(std::span<const Study> originals, double alpha) {
  Selected selected;
  for (const Study& study : originals) {
    const Threshold t = std::visit([alpha](const auto& e) { return threshold(e, alpha); }, study.evidence);
    if (!t.reached) {
      selected.originals.clear();
      selected.reason =
          fmt::format("\"{}\" is not significant at {} (two-sided), so it can't have been selected for that.",
                      study.label, alpha);
      return selected;
    }
    Likelihood one = likelihood(study);
    one.selected_above = t.critical;
    selected.originals.push_back(std::move(one));
  }
  return selected;
}

Summary fixed_summary(std::span<const Likelihood> studies, std::span<const Study> originals,
                      const EffectPrior& prior, double level) {
  const pool_room::Line line(
      [&](double mean) {
        double sum = log_density(prior, mean);
        for (std::size_t i = 0; i < studies.size() && std::isfinite(sum); ++i) {
          sum += log_likelihood(studies[i], mean, 0.0);
        }
        return sum;
      },
      breaks(originals, prior));
  Summary summary;
  if (!std::isfinite(line.log_total())) {
    summary.reason = "The prior and the originals have no effect in common.";
    return summary;
  }
  const bool bounded = std::any_of(originals.begin(), originals.end(), [](const Study& study) {
    return !std::holds_alternative<BandT>(study.evidence);
  });
  summary.median = line.quantile(0.5);
  summary.lower = line.quantile(0.5 * (1.0 - level));
  summary.upper = line.quantile(0.5 * (1.0 + level));
  const double order = bounded ? 3.0 : tail_order(prior);
  if (order > 1.0) summary.mean = line.expectation([](double x) { return x; });
  if (order > 2.0) {
    const double mean = *summary.mean;
    summary.sd = std::sqrt(line.expectation([mean](double x) { return (x - mean) * (x - mean); }));
  }
  if (!summary.sd)
    summary.reason = "Only bounds are printed for the originals, and the prior's tails are too heavy.";
  return summary;
}

}  // namespace steelyard::replicating
