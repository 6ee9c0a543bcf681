// Sentences about how firm an answer is, the same in text and JSON.
#pragma once

#include <string>
#include <string_view>

#include "steelyard/analysis.hpp"

namespace steelyard::render {

/// "study", "order", "width", ...
[[nodiscard]] std::string_view change_word(Change change);

/// "Without "Alder 1994" the odds for an effect fall from 407 to 1 to 2.40 to 1: undecided."
[[nodiscard]] std::string turn_sentence(const StressAnalysis& analysis, const Turn& turn);

/// "Every one of 10 leave-one-outs stays between 102 to 1 and 900 to 1."
[[nodiscard]] std::string firmness_sentence(const Firmness& firmness);

/// What turns the verdict, or that nothing that was tried does.
[[nodiscard]] std::string stress_verdict(const StressAnalysis& analysis);

/// How the evidence of the rows is distributed.
[[nodiscard]] std::string weigh_verdict(const WeighAnalysis& analysis);

/// Whether the replications speak for what the originals found.
[[nodiscard]] std::string replicate_verdict(const ReplicateAnalysis& analysis);

/// "The data favour an effect: they are 4.48 times as probable ... (+6.5 decibans)." for a log Bayes factor.
[[nodiscard]] std::string favour_sentence(double log_bf, std::string_view numerator,
                                          std::string_view denominator);

}  // namespace steelyard::render
