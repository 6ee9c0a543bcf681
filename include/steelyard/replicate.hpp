// Room "replicate": originals against their replications.
#pragma once

#include <cstddef>
#include <optional>
#include <span>
#include <string>
#include <vector>

#include "steelyard/base.hpp"
#include "steelyard/pool.hpp"
#include "steelyard/study.hpp"

namespace steelyard {

struct ReplicateOptions {
  double level = 0.95;       ///< of intervals, 0 < level < 1
  double alpha = 0.05;       ///< two-sided level at which originals are read as selected, 0 < alpha < 1
  std::size_t weights = 11;  ///< steps of the original's weight from 0 to 1, ≥ 2
};

/// A Bayes factor under the three pairs of models. Absent where not identified.
struct EvidenceTriple {
  std::optional<LogBayesFactor> fixed;     ///< the same effect everywhere
  std::optional<LogBayesFactor> random;    ///< effects vary
  std::optional<LogBayesFactor> averaged;  ///< both, by the model probabilities
  std::string reason;                      ///< why something is absent
};

/// Where a replication falls among what the originals predict (same effect), exactly.
struct Prediction {
  std::size_t study = 0;  ///< index into the studies given
  /// Central predictive interval of the replication's t (or z = estimate/se), and of its effect.
  std::optional<Interval> statistic, effect;
  std::optional<double> below;  ///< predictive P(T ≤ the observed t)
  std::optional<bool> inside;
  std::optional<double> band;  ///< a replication known as a band: predictive P(T in the band)
  double error = 0.0;          ///< absolute, of the probabilities
  std::string reason;          ///< why something is absent
};

/// The answer when the originals count with this weight (a power of their likelihood).
struct Discounted {
  double weight = 1.0;
  EvidenceTriple effect;  ///< evidence for an effect from all studies
};

/// Formulas and sources: docs/methods.md.
struct ReplicateResult {
  std::vector<std::size_t> originals, replications;  ///< indices into the studies given
  /// p(replications | the originals' posterior from a flat prior) ÷ p(replications | no effect):
  /// Verhagen & Wagenmakers (2014).
  EvidenceTriple flat;
  /// m(all)/m(originals) under the effect prior ÷ the same under no effect: Ly et al. (2019).
  EvidenceTriple carried;
  EvidenceTriple originals_alone, replications_alone, all;  ///< evidence for an effect
  /// Originals read as seen only because p < alpha: their likelihood divided by P(p < alpha). Absent, with
  /// the reason, when an original isn't significant at that level.
  EvidenceTriple selected_all, selected_carried;
  Summary effect_originals, effect_replications, effect_all;  ///< pooled, averaged
  Summary effect_selected;  ///< from the originals read as selected alone (same effect)
  std::optional<double>
      shrinkage;  ///< pooled mean of all ÷ of the originals (of medians where means don't exist)
  std::vector<Prediction> predictions;  ///< one a replication
  std::vector<Discounted> discounted;   ///< weights rising from 0 to 1
  std::vector<Diagnostic> cautions;
  bool accurate = true;
};

/// Studies without a role are an error, as are a set without an original or without a replication, mixed
/// metrics and unusable priors. Pure.
[[nodiscard]] Outcome<ReplicateResult> replicate(std::span<const Study> studies, const Priors& priors,
                                                 const ReplicateOptions& options = {});

}  // namespace steelyard
