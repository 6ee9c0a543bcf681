// The funnel: effect against standard error, with the exact regions of the t likelihood.
#include <algorithm>
#include <cmath>
#include <map>
#include <utility>

#include <fmt/format.h>

#include "steelyard/figure.hpp"
#include "steelyard/numeric.hpp"

namespace steelyard::figure {
namespace {

constexpr int region_points = 80;
constexpr double tail = 0.025;

/// The effect d below which a printed effect falls with probability p, when the study's own effect is
/// Normal(mean, spread²): t/s is noncentral t with noncentrality mean·√n/s, s = √(1 + n·spread²).
double t_quantile(double p, double df, double n, double mean, double spread) {
  const double s = std::sqrt(1 + n * spread * spread), ncp = mean * std::sqrt(n) / s;
  double low = ncp - 2, high = ncp + 2;
  const auto below = [&](double t) {
    return p < 0.5 ? numeric::log_noncentral_t_cdf(t, df, ncp) < std::log(p)
                   : numeric::log_noncentral_t_upper(t, df, ncp) > std::log1p(-p);
  };
  for (double step = 4; below(high) && step < 1e5; step *= 2) high += step;
  for (double step = 4; !below(low) && step < 1e5; step *= 2) low -= step;
  for (int i = 0; i < 60 && high - low > 1e-9 * (1 + std::fabs(ncp)); ++i) {
    const double middle = (low + high) / 2;
    (below(middle) ? low : high) = middle;
  }
  return (low + high) / 2 * s / std::sqrt(n);
}

double normal_quantile(double p, double se, double mean, double spread) {
  const double z = numeric::normal_upper_quantile(p < 0.5 ? p : 1 - p);
  return mean + (p < 0.5 ? -1 : 1) * z * std::hypot(se, spread);
}

struct Region95 {
  double low, high;
};

Region95 region(const Evidence& evidence, double mean, double spread) {
  if (const auto* t = std::get_if<ExactT>(&evidence))
    return {t_quantile(tail, t->df, t->n_effective, mean, spread),
            t_quantile(1 - tail, t->df, t->n_effective, mean, spread)};
  const double se = std::get<NormalEstimate>(evidence).se;
  return {normal_quantile(tail, se, mean, spread), normal_quantile(1 - tail, se, mean, spread)};
}

/// The commonest way from effective n to degrees of freedom: two equal groups (4n − 2), else one sample (n −
/// 1).
double usual_df(const Analysis& analysis, double n) {
  std::size_t groups = 0, others = 0;
  for (const Study& study : analysis.studies) ++(study.design == Design::two_groups ? groups : others);
  return std::max(1.0, groups >= others ? 4 * n - 2 : n - 1);
}

/// The edge of a region as a curve over the standard error.
void add_region(const Analysis& analysis, const Scale& error, double mean, double spread, Curve& low,
                Curve& high) {
  const bool estimates = std::holds_alternative<NormalEstimate>(analysis.studies.front().evidence);
  for (int i = 0; i <= region_points; ++i) {
    const double se = error.high * (i == 0 ? 0.002 : static_cast<double>(i) / region_points);
    Evidence evidence = NormalEstimate{0, se, false};
    // Below a few hundredths of the frame the t region is the Normal one to the width of a line.
    if (!estimates && 1 / (se * se) < 1e6)
      evidence = ExactT{0, usual_df(analysis, 1 / (se * se)), 1 / (se * se), false};
    const Region95 edges = region(evidence, mean, spread);
    low.push_back({edges.low, i == 0 ? 0.0 : se});
    high.push_back({edges.high, i == 0 ? 0.0 : se});
  }
}

std::optional<FunnelStudy> place(const Analysis& analysis, std::size_t index) {
  const Study& study = analysis.studies[index];
  FunnelStudy out;
  out.index = index;
  out.label = study.label;
  if (const auto* t = std::get_if<ExactT>(&study.evidence)) {
    out.effect = t->t / std::sqrt(t->n_effective);
    out.error = 1 / std::sqrt(t->n_effective);
  } else if (const auto* normal = std::get_if<NormalEstimate>(&study.evidence)) {
    out.effect = normal->estimate;
    out.error = normal->se;
  } else {
    return std::nullopt;
  }
  return is_folded(study.evidence) ? std::nullopt : std::optional<FunnelStudy>(out);
}

Scale effect_frame(const Funnel& funnel, const std::string& title) {
  double low = std::min(0.0, funnel.centre), high = std::max(0.0, funnel.centre);
  for (const FunnelStudy& study : funnel.studies)
    low = std::min(low, study.effect), high = std::max(high, study.effect);
  const double span = high - low > 0 ? high - low : 1.0;
  // The regions may be wider than the studies, but never squash them.
  low = std::max(low - 0.6 * span, std::min(low, funnel.same_low.back().x));
  high = std::min(high + 0.6 * span, std::max(high, funnel.same_high.back().x));
  const double margin = 0.04 * (high - low);
  return {low - margin, high + margin, false, title};
}

std::string finding(const Funnel& funnel) {
  const auto count = [&](bool FunnelStudy::*flag) {
    return std::count_if(funnel.studies.begin(), funnel.studies.end(),
                         [&](const FunnelStudy& s) { return s.*flag; });
  };
  std::string out = fmt::format(
      "{} of {} studies lie outside the region in which 95% of printed effects would lie if all shared one "
      "effect of {}",
      count(&FunnelStudy::outside_same), funnel.studies.size(),
      number_text(funnel.centre, decimals_for(funnel.effect.high - funnel.effect.low)));
  if (!funnel.varying_low.empty())
    out +=
        fmt::format("; {} when effects may vary as much as estimated", count(&FunnelStudy::outside_varying));
  return out + ". A lopsided funnel can come from selective publication, and from small studies that differ.";
}

Diagnostic missing() {
  Diagnostic out;
  out.code = "no-funnel";
  out.what = "The funnel needs studies that print an effect with its sign, and a pooled estimate.";
  out.remedy = "Draw the forest instead: it also shows studies that give only a bound or an unsigned test.";
  return out;
}

}  // namespace

Outcome<Funnel> funnel(const Analysis& analysis) {
  Funnel out;
  std::size_t skipped = 0;
  for (std::size_t i = 0; i < analysis.studies.size(); ++i) {
    if (const auto study = place(analysis, i)) {
      out.studies.push_back(*study);
    } else {
      ++skipped;
    }
  }
  const Summary& shared = analysis.result.pooled_effect_fixed;
  const auto centre = shared.mean ? shared.mean : shared.median;
  if (out.studies.empty() || !centre) return {std::nullopt, {missing()}};
  out.centre = *centre;
  double most = 0;
  for (const FunnelStudy& study : out.studies) most = std::max(most, study.error);
  out.error = {0.0, 1.06 * most, false, "standard error if there were no effect"};
  add_region(analysis, out.error, out.centre, 0.0, out.same_low, out.same_high);
  const std::optional<double> spread =
      analysis.studies.size() > 1 ? analysis.result.spread.median : std::nullopt;
  const auto varying_centre = analysis.result.pooled_effect_random.median;
  if (spread && varying_centre)
    add_region(analysis, out.error, *varying_centre, *spread, out.varying_low, out.varying_high);
  for (FunnelStudy& study : out.studies) {
    const Evidence& evidence = analysis.studies[study.index].evidence;
    const Region95 same = region(evidence, out.centre, 0.0);
    study.outside_same = study.effect < same.low || study.effect > same.high;
    if (!spread || !varying_centre) continue;
    const Region95 varying = region(evidence, *varying_centre, *spread);
    study.outside_varying = study.effect < varying.low || study.effect > varying.high;
  }
  out.effect = effect_frame(out, "effect as printed: " + effect_name(analysis.studies));
  if (skipped > 0)
    out.notes.push_back(fmt::format("Not shown: {} {} whose sign or size is not printed.", skipped,
                                    skipped == 1 ? "study" : "studies"));
  out.words = {"Funnel: effects against their precision", finding(out)};
  return {std::move(out), {}};
}

}  // namespace steelyard::figure
