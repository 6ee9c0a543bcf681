// The forest: each study's likelihood, own effect and weight of evidence, and the pooled answers.
#include <algorithm>
#include <cmath>
#include <cstddef>
#include <numeric>  // std::iota
#include <optional>
#include <string>
#include <vector>

#include <fmt/format.h>

#include "figure/likelihood_curve.hpp"
#include "steelyard/figure.hpp"

namespace steelyard::figure {
namespace {

Estimate estimate(const Summary& summary) {
  Estimate out{summary.mean ? summary.mean : summary.median, summary.lower, summary.upper, summary.reason};
  if (!out.centre && out.reason.empty()) out.reason = "not computed";
  return out;
}

/// Indices of the rows to show: all, or those whose evidence weighs most, in file order.
std::vector<std::size_t> chosen_rows(const Analysis& analysis, std::size_t most) {
  std::vector<std::size_t> rows(analysis.studies.size());
  std::iota(rows.begin(), rows.end(), std::size_t{0});
  if (rows.size() <= most) return rows;
  const auto weight = [&](std::size_t i) { return std::fabs(analysis.result.studies[i].log_bf); };
  std::stable_sort(rows.begin(), rows.end(),
                   [&](std::size_t a, std::size_t b) { return weight(a) > weight(b); });
  rows.resize(most);
  std::sort(rows.begin(), rows.end());
  return rows;
}

double nth(std::vector<double> values, double fraction) {
  const auto at = static_cast<std::size_t>(fraction * static_cast<double>(values.size() - 1) + 0.5);
  std::nth_element(values.begin(), values.begin() + static_cast<std::ptrdiff_t>(at), values.end());
  return values[at];
}

/// A frame that holds the pooled answers and what most studies say; one wild study can't squash the rest.
Scale effect_scale(const Analysis& analysis, const std::vector<std::size_t>& rows) {
  std::vector<double> lows, highs;
  for (const std::size_t i : rows) {
    const Extent where = extent(analysis.studies[i].evidence);
    lows.push_back(where.low);
    highs.push_back(where.high);
  }
  double low = std::min(nth(lows, 0.1), 0.0);
  double high = std::max(nth(highs, 0.9), 0.0);
  for (const Summary* pooled : {&analysis.result.pooled_effect_fixed, &analysis.result.pooled_effect,
                                &analysis.result.pooled_effect_random}) {
    if (!pooled->lower || !pooled->upper) continue;
    low = std::min(low, *pooled->lower);
    high = std::max(high, *pooled->upper);
  }
  const double span = high - low > 0 ? high - low : 1.0;
  low = std::max(low - span, std::min(low, nth(lows, 0.0)));
  high = std::min(high + span, std::max(high, nth(highs, 1.0)));
  const double margin = 0.03 * (high - low);
  return {low - margin, high + margin, false, effect_name(analysis.studies)};
}

/// Symmetrical decibans made for comparing the studies: what goes far beyond most of them, as the pooled
/// evidence often does, is drawn cut, and said to be.
Scale weight_scale(const Forest& forest) {
  std::vector<double> sizes;
  for (const auto& study : forest.studies) sizes.push_back(std::fabs(decibans(study.log_bf)));
  const double common = std::max(10.0, 2.0 * nth(sizes, 0.9));
  for (const auto& pooled : forest.pooled)
    if (pooled.log_bf) sizes.push_back(std::fabs(decibans(*pooled.log_bf)));
  double limit = std::min(std::max(nth(sizes, 1.0), 5.0), common);
  // From 4 to 5 times a power of ten, three ticks of a round step don't fit: take 5.
  const double power = std::pow(10.0, std::floor(std::log10(limit)));
  if (limit >= 3.8 * power && limit < 5 * power) limit = 5 * power;
  return {-limit * 1.04, limit * 1.04, false, "weight of evidence, decibans"};
}

std::string mark_of(const Study& study) {
  if (std::holds_alternative<BandT>(study.evidence)) return "bound only";
  return is_folded(study.evidence) ? "sign unknown" : "";
}

ForestPooled pooled_row(const Analysis& analysis, const std::string& label, const Summary& summary,
                        const std::optional<LogBayesFactor>& evidence, std::string no_bf, const Scale& scale,
                        double (Posterior::*density)(Within, double) const, Within within) {
  ForestPooled out{label, {}, estimate(summary), {}, ""};
  if (evidence) {
    out.log_bf = evidence->log_bf;
  } else {
    out.no_bf = std::move(no_bf);
  }
  if (analysis.result.posterior && out.estimate.centre && out.estimate.lower && out.estimate.upper) {
    const double width = (*out.estimate.upper - *out.estimate.lower) / 4;
    out.density = sampled([&](double x) { return (analysis.result.posterior.get()->*density)(within, x); },
                          sample_points(scale.low, scale.high, {*out.estimate.centre}, width));
  }
  return out;
}

std::vector<ForestPooled> pooled_rows(const Analysis& analysis, const Scale& scale) {
  const PoolResult& result = analysis.result;
  const std::string missing = "not identified";
  const auto effect = &Posterior::effect_density;
  std::vector<ForestPooled> out;
  out.push_back(pooled_row(analysis, "Same effect", result.pooled_effect_fixed, result.effect_fixed, missing,
                           scale, effect, Within::fixed_effect));
  if (analysis.studies.size() > 1) {
    out.push_back(pooled_row(analysis, "Varying effects", result.pooled_effect_random, result.effect_random,
                             missing, scale, effect, Within::random_effect));
    out.push_back(pooled_row(analysis, "Averaged", result.pooled_effect, result.effect, missing, scale,
                             effect, Within::average));
  }
  out.push_back(pooled_row(analysis, "New study", result.new_study, {}, "", scale,
                           &Posterior::new_study_density, Within::average));
  return out;
}

std::string finding(const Analysis& analysis, const Forest& forest) {
  std::string out = forest.verdict.effect + " " + forest.verdict.heterogeneity;
  const Summary& pooled = analysis.result.pooled_effect;
  if (pooled.median && pooled.lower && pooled.upper) {
    out += fmt::format(" If there is one, the mean effect is {} [{}, {}], {}% credible interval.",
                       number_text(pooled.mean.value_or(*pooled.median), forest.decimals),
                       number_text(*pooled.lower, forest.decimals),
                       number_text(*pooled.upper, forest.decimals), fmt::format("{:g}", 100 * forest.level));
  }
  return out;
}

void add_notes(Forest& forest) {
  if (forest.studies.size() < forest.of) {
    forest.notes.push_back(fmt::format(
        "Shown: the {} studies whose evidence weighs most, of {}, in file order. All {} are pooled.",
        forest.studies.size(), forest.of, forest.of));
  }
  std::size_t cut = 0, outside = 0;
  const auto is_cut = [&](double log_bf) { return std::fabs(decibans(log_bf)) > forest.weight.high; };
  for (const auto& study : forest.studies) {
    cut += is_cut(study.log_bf) ? 1 : 0;
    outside += study.likelihood.empty() ? 1 : 0;
  }
  for (const auto& pooled : forest.pooled) cut += pooled.log_bf && is_cut(*pooled.log_bf) ? 1 : 0;
  if (cut > 0)
    forest.notes.push_back(fmt::format("{} cut at the frame: the number beside the bar holds.",
                                       cut == 1 ? "One bar is" : fmt::format("{} bars are", cut)));
  if (outside > 0) {
    forest.notes.push_back(
        fmt::format("{} outside the frame: an arrow shows where.",
                    outside == 1 ? "One likelihood lies" : fmt::format("{} likelihoods lie", outside)));
  }
}

}  // namespace

std::string effect_name(std::span<const Study> studies) {
  if (studies.empty() || studies.front().metric == "smd") return "standardized mean difference";
  const std::string& metric = studies.front().metric;
  return metric.empty() ? "effect, in the units of the estimates" : metric;
}

std::optional<double> printed_effect(const Study& study) {
  return study.effect.g ? study.effect.g : study.effect.d;
}

Forest forest(const Analysis& analysis, const ForestOptions& options) {
  Forest out;
  out.level = analysis.options.pool.level;
  out.of = analysis.studies.size();
  out.verdict = verdict(analysis.result, analysis.options.priors, analysis.studies);
  const std::vector<std::size_t> rows = chosen_rows(analysis, std::max<std::size_t>(options.most_rows, 1));
  out.effect = effect_scale(analysis, rows);
  out.decimals = decimals_for(out.effect.high - out.effect.low);
  for (const std::size_t i : rows) {
    const Study& study = analysis.studies[i];
    const StudyResult& result = analysis.result.studies[i];
    out.studies.push_back({i, study.label, likelihood_curve(study, out.effect.low, out.effect.high),
                           estimate(result.shrunken), result.log_bf, mark_of(study)});
  }
  out.pooled = pooled_rows(analysis, out.effect);
  out.weight = weight_scale(out);
  out.words = {fmt::format("Forest of {} {}", out.of, out.of == 1 ? "study" : "studies"),
               finding(analysis, out)};
  add_notes(out);
  return out;
}

}  // namespace steelyard::figure
