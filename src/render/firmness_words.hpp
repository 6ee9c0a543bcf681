// The sentences of `weigh`, `stress` and `replicate`, the same in every format.
#pragma once

#include <string>
#include <string_view>
#include <vector>

#include "steelyard/analysis.hpp"

namespace steelyard::render {

/// "study", "order", "width", ...
[[nodiscard]] std::string_view change_word(Change change);

/// "21.0 to 1 for an effect", "3.20 to 1 for no effect", "even" from a log Bayes factor of an effect.
[[nodiscard]] std::string side_text(double log_bf, Direction direction = Direction::either);

/// "Without "Alder 1994" the evidence moves from 407 to 1 for an effect to 2.40 to 1 for an effect: ..."
[[nodiscard]] std::string turn_sentence(const StressAnalysis& analysis, const Turn& turn);

/// "Every leave-one-out stays above 10 to 1 for an effect (at least 14.2 to 1)."
[[nodiscard]] std::string firmness_sentence(const Firmness& firmness);

/// The smallest change that turns the verdict, or that nothing that was tried does.
[[nodiscard]] std::string stress_verdict(const StressAnalysis& analysis);

/// Whether groups differ; "" without a comparison.
[[nodiscard]] std::string groups_sentence(const StressAnalysis& analysis);

/// What one study says, and the prior odds at which one would still doubt it.
[[nodiscard]] std::string weigh_sentence(const Weighing& weighing, const Study& study, Direction direction);

/// How the evidence of the rows is distributed; of a single row what it says.
[[nodiscard]] std::string weigh_verdict(const WeighAnalysis& analysis);

/// Negligible or not, signs, new studies: one sentence each.
[[nodiscard]] std::vector<std::string> region_sentences(const RegionResult& region);

/// Whether the replications speak for what the originals found.
[[nodiscard]] std::string replicate_verdict(const ReplicateAnalysis& analysis);

/// How many replications lie where the originals predicted; "" when none can be placed.
[[nodiscard]] std::string prediction_sentence(const ReplicateAnalysis& analysis);

/// From original to pooled effect; "" when not known.
[[nodiscard]] std::string shrinkage_sentence(const ReplicateAnalysis& analysis);

/// Everything assumed beforehand, without spread and model probabilities when `models` is false.
[[nodiscard]] std::string assumed_sentence(const Gathered& rows, bool models);

/// Cautions of reading, rebuilding and of the studies, each once; what was left out comes first.
[[nodiscard]] std::vector<std::string> caution_sentences(const Gathered& rows,
                                                         const std::vector<Diagnostic>& more = {});

/// "The data are 4.48 times as probable under X as under Y (+6.5 decibans)." for a log Bayes factor.
[[nodiscard]] std::string favour_sentence(double log_bf, std::string_view numerator,
                                          std::string_view denominator);

}  // namespace steelyard::render
