// Originals against their replications.
#include "steelyard/replicate.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <utility>
#include <variant>

#include "replicate/evidence.hpp"
#include "replicate/prediction.hpp"
#include "replicate/selection.hpp"

namespace steelyard {

namespace {

using namespace replicating;

Diagnostic refusal(std::string code, std::string what, std::string remedy, std::size_t line = 0) {
  return {Severity::error, std::move(code), {{}, line, 0}, std::move(what), std::move(remedy)};
}

Diagnostic caution(std::string code, std::string what, std::string remedy) {
  return {Severity::caution, std::move(code), {}, std::move(what), std::move(remedy)};
}

std::vector<Diagnostic> option_problems(const ReplicateOptions& options) {
  std::vector<Diagnostic> found;
  if (!(options.alpha > 0.0 && options.alpha < 1.0)) {
    found.push_back(refusal("alpha-out-of-range",
                            fmt::format("The level at which originals are selected is {}.", options.alpha),
                            "It must lie between 0 and 1, for instance 0.05."));
  }
  if (options.weights < 2 || options.weights > 1001) {
    found.push_back(refusal("weights-out-of-range",
                            fmt::format("{} weights of the originals were asked for.", options.weights),
                            "Ask for 2 to 1001; they are spread evenly from 0 to 1."));
  }
  return found;
}

// Puts the rows into their roles; the diagnostics say what is missing.
std::vector<Diagnostic> sort_roles(std::span<const Study> studies, ReplicateResult& result) {
  std::vector<Diagnostic> found;
  for (std::size_t i = 0; i < studies.size(); ++i) {
    if (studies[i].role == "original") {
      result.originals.push_back(i);
    } else if (studies[i].role == "replication") {
      result.replications.push_back(i);
    } else {
      found.push_back(
          refusal("role-missing", fmt::format("\"{}\" has no role.", studies[i].label),
                  "Write `original` or `replication` into its `role` cell, or leave it out with --without.",
                  studies[i].line));
    }
  }
  const auto need = [&](const std::vector<std::size_t>& rows, const char* role) {
    if (!rows.empty()) return;
    found.push_back(refusal(fmt::format("no-{}", role), fmt::format("No row is marked as {}.", role),
                            fmt::format("Write `{}` into the `role` cell of at least one row.", role)));
  };
  need(result.originals, "original");
  need(result.replications, "replication");
  return found;
}

std::vector<Study> chosen(std::span<const Study> studies, const std::vector<std::size_t>& indices) {
  std::vector<Study> some;
  for (const std::size_t i : indices) some.push_back(studies[i]);
  return some;
}

std::vector<Likelihood> likelihoods(std::span<const Study> studies) {
  std::vector<Likelihood> all;
  for (const Study& study : studies) all.push_back(likelihood(study));
  return all;
}

std::vector<Likelihood> joined(std::vector<Likelihood> first, const std::vector<Likelihood>& second) {
  first.insert(first.end(), second.begin(), second.end());
  return first;
}

// Under a flat prior the originals' posterior is proper when one of them bounds the effect on both sides.
bool bounds_both_sides(const Study& study) {
  const auto* band = std::get_if<BandT>(&study.evidence);
  if (band == nullptr) return true;
  return std::all_of(band->bands.begin(), band->bands.end(),
                     [](const Interval& b) { return std::isfinite(b.low) && std::isfinite(b.high); });
}

struct Sides {
  std::vector<Study> originals, replications;
  std::vector<Likelihood> o, r, all;
};

void weigh_sides(ReplicateResult& result, const Sides& s, const Priors& priors) {
  const Marginals o = marginals(s.o, priors.effect, priors.spread);
  const Marginals r = marginals(s.r, priors.effect, priors.spread);
  const Marginals all = marginals(s.all, priors.effect, priors.spread);
  result.originals_alone = evidence(o, priors);
  result.replications_alone = evidence(r, priors);
  result.all = evidence(all, priors);
  result.carried = evidence_beyond(all, o, priors);
  result.accurate = accurate(o) && accurate(r) && accurate(all);
}

// Returns whether the originals' posterior from a flat prior is proper.
bool weigh_flat(ReplicateResult& result, const Sides& s, const Priors& priors) {
  if (std::none_of(s.originals.begin(), s.originals.end(), bounds_both_sides)) {
    result.flat.reason =
        "No original bounds its effect on both sides, so a flat prior leaves no proper posterior to carry "
        "over.";
    return false;
  }
  const EffectPrior flat{FlatPrior{}, Direction::either};
  const Marginals o = marginals(s.o, flat, priors.spread);
  const Marginals all = marginals(s.all, flat, priors.spread);
  result.flat = evidence_beyond(all, o, priors);
  result.accurate = result.accurate && accurate(o) && accurate(all);
  return true;
}

void weigh_selected(ReplicateResult& result, const Sides& s, const Priors& priors,
                    const ReplicateOptions& options) {
  const Selected selected = selected_originals(s.originals, options.alpha);
  if (!selected.reason.empty()) {
    result.selected_all.reason = selected.reason;
    result.selected_carried.reason = selected.reason;
    result.effect_selected.reason = selected.reason;
    return;
  }
  const Marginals o = marginals(selected.originals, priors.effect, priors.spread);
  const Marginals all = marginals(joined(selected.originals, s.r), priors.effect, priors.spread);
  result.selected_all = evidence(all, priors);
  result.selected_carried = evidence_beyond(all, o, priors);
  result.effect_selected = fixed_summary(selected.originals, s.originals, priors.effect, options.level);
  result.accurate = result.accurate && accurate(o) && accurate(all);
}

void discount(ReplicateResult& result, const Sides& s, const Priors& priors, std::size_t steps) {
  for (std::size_t j = 0; j < steps; ++j) {
    const double weight = static_cast<double>(j) / static_cast<double>(steps - 1);
    std::vector<Likelihood> originals = s.o;
    for (Likelihood& original : originals) original.power = weight;
    const Marginals m = weight > 0.0
                            ? marginals(joined(std::move(originals), s.r), priors.effect, priors.spread)
                            : marginals(s.r, priors.effect, priors.spread);
    result.discounted.push_back({weight, evidence(m, priors)});
    result.accurate = result.accurate && accurate(m);
  }
}

// Pooled effects of each side; the errors of a pooling that is refused.
std::vector<Diagnostic> summarize(ReplicateResult& result, const Sides& s, std::span<const Study> studies,
                                  const Priors& priors, double level) {
  PoolOptions options;
  options.level = level;
  options.shrunken = false;
  const auto pooled = [&](std::span<const Study> some, Summary& summary) -> std::vector<Diagnostic> {
    Outcome<PoolResult> outcome = pool(some, priors, options);
    if (!outcome.ok()) return std::move(outcome.diagnostics);
    summary = outcome.value->pooled_effect;
    return {};
  };
  if (auto found = pooled(studies, result.effect_all); !found.empty()) return found;
  if (auto found = pooled(s.originals, result.effect_originals); !found.empty()) return found;
  if (auto found = pooled(s.replications, result.effect_replications); !found.empty()) return found;
  const bool means = result.effect_all.mean && result.effect_originals.mean;
  const auto& all = means ? result.effect_all.mean : result.effect_all.median;
  const auto& before = means ? result.effect_originals.mean : result.effect_originals.median;
  if (all && before && *before != 0.0) result.shrinkage = *all / *before;
  return {};
}

void add_cautions(ReplicateResult& result, const Sides& s, bool proper) {
  if (!proper) {
    result.cautions.push_back(caution("flat-improper", result.flat.reason,
                                      "Predictions use the effect prior instead; the definition that starts "
                                      "from a flat prior is left out."));
  }
  const bool unsigned_original = std::any_of(s.originals.begin(), s.originals.end(),
                                             [](const Study& study) { return is_folded(study.evidence); });
  if (unsigned_original) {
    result.cautions.push_back(
        caution("original-unsigned",
                "The sign of an original is not known, so a replication in either direction agrees with it.",
                "Give its `sign`, a t with its sign, or the means."));
  }
  if (s.originals.size() + s.replications.size() < 6) {
    result.cautions.push_back(caution(
        "few-studies",
        "With so few studies the spread is hardly known: under varying effects without a mean effect large t "
        "values are almost as well explained as by an effect.",
        "Read the same-effect and the varying-effects answers beside the average."));
  }
}

}  // namespace

Outcome<ReplicateResult> replicate(std::span<const Study> studies, const Priors& priors,
                                   const ReplicateOptions& options) {
  ReplicateResult result;
  std::vector<Diagnostic> problems = option_problems(options);
  for (Diagnostic& d : sort_roles(studies, result)) problems.push_back(std::move(d));
  if (!problems.empty()) return {std::nullopt, std::move(problems)};
  Sides s;
  s.originals = chosen(studies, result.originals);
  s.replications = chosen(studies, result.replications);
  s.o = likelihoods(s.originals);
  s.r = likelihoods(s.replications);
  s.all = joined(s.o, s.r);
  if (auto found = summarize(result, s, studies, priors, options.level); !found.empty()) {
    return {std::nullopt, std::move(found)};
  }
  weigh_sides(result, s, priors);
  const bool proper = weigh_flat(result, s, priors);
  weigh_selected(result, s, priors, options);
  discount(result, s, priors, options.weights);
  const EffectPrior start = proper ? EffectPrior{FlatPrior{}, Direction::either} : priors.effect;
  for (std::size_t i = 0; i < s.replications.size(); ++i) {
    result.predictions.push_back(
        predict(s.o, start, s.replications[i], result.replications[i], options.level));
  }
  add_cautions(result, s, proper);
  return {std::move(result), {}};
}

}  // namespace steelyard
