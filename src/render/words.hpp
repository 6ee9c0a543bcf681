// The rows and sentences that every format for people shows, so that text, HTML and Markdown say the same.
#pragma once

#include <string>
#include <vector>

#include "steelyard/render.hpp"

namespace steelyard::render {

/// "a mean effect; effects vary", ...
[[nodiscard]] std::string model_name(Model model, Direction direction = Direction::either);

/// Name, prior and posterior probability, log marginal likelihood, its error bound.
[[nodiscard]] std::vector<std::string> model_row(const ModelResult& model);

struct EvidenceRow {
  std::string question;  ///< "An effect? Averaged"
  std::string ratio;     ///< ≥ 1, the right way round; "–" when absent
  std::string favours;   ///< the side it speaks for
  std::string weight;    ///< decibans, signed
};
[[nodiscard]] std::vector<EvidenceRow> evidence_rows(const Analysis& analysis);

struct EstimateRow {
  std::string name, mean, sd, median, interval;
  std::string reason;  ///< why something is absent
};
[[nodiscard]] std::vector<EstimateRow> estimate_rows(const Analysis& analysis);

/// "If there is an effect, its mean is ...", or "" when there is no estimate.
[[nodiscard]] std::string effect_size_sentence(const Analysis& analysis);
/// Everything assumed beforehand.
[[nodiscard]] std::string priors_sentence(const Analysis& analysis);
[[nodiscard]] std::string finding_sentence(const Analysis& analysis, const Finding& finding);
/// Cautions of all rooms and of the studies, each once; what was left out comes first.
[[nodiscard]] std::vector<std::string> caution_sentences(const Analysis& analysis);
/// A probability with enough digits near 0 and 1.
[[nodiscard]] std::string probability_text(double probability);

}  // namespace steelyard::render
