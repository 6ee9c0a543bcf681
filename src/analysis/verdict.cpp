// The two plain sentences that answer "is there an effect?" and "does it vary?".
#include <cmath>
#include <string>

#include <fmt/format.h>

#include "steelyard/analysis.hpp"

namespace steelyard {
namespace {

/// One question with its two answers, as they stand in a sentence.
struct Question {
  std::string yes;              ///< "an effect"
  std::string no;               ///< "no effect"
  std::string if_yes;           ///< "if there is an effect"
  std::string if_no;            ///< "if there is none"
  std::string brief_no;         ///< `no` once it has been named
  double log_prior_odds = 0.0;  ///< of yes against no
};

/// "prior odds of 1 to 1 become 34.2 to 1 for an effect", in the direction that the data favour.
std::string odds_clause(const Question& question, double log_bf) {
  const bool up = log_bf >= 0;
  const double prior = up ? question.log_prior_odds : -question.log_prior_odds;
  const double posterior = prior + std::fabs(log_bf);
  const std::string& favoured = up ? question.yes : question.brief_no;
  const std::string& other = up ? question.brief_no : question.yes;
  const std::string result = posterior >= 0 ? fmt::format("{} for {}", odds_text(posterior), favoured)
                                            : fmt::format("{}, still for {}", odds_text(-posterior), other);
  const bool even = odds_text(prior) == "1 to 1";
  return even ? fmt::format("assumed prior odds of 1 to 1 become {}", result)
              : fmt::format("assumed prior odds of {} for {} become {}", odds_text(prior), favoured, result);
}

std::string answer(const Question& question, double log_bf) {
  const std::string ratio = ratio_text(std::fabs(log_bf));
  if (ratio == "1.00") {
    return fmt::format(
        "The data do not tell {} from {}: they are equally probable under both ({} decibans), so the assumed "
        "prior odds of {} stand.",
        question.yes, question.no, decibans_text(log_bf), odds_text(question.log_prior_odds));
  }
  const bool up = log_bf > 0;
  return fmt::format("The data favour {}: they are {} times as probable {} as {} ({} decibans), so {}.",
                     up ? question.yes : question.no, ratio, up ? question.if_yes : question.if_no,
                     up ? question.if_no : question.if_yes, decibans_text(log_bf),
                     odds_clause(question, log_bf));
}

double mass(const PoolResult& result, const Priors& priors, Model a, Model b) {
  double sum = 0.0;
  for (const Model model : {a, b})
    if (result.at(model).integral) sum += priors.model[static_cast<std::size_t>(model)];
  return sum;
}

std::string effect_sentence(const PoolResult& result, const Priors& priors) {
  const double yes = mass(result, priors, Model::fixed_effect, Model::random_effect);
  const double no = mass(result, priors, Model::fixed_null, Model::random_null);
  const std::string phrase = effect_phrase(priors.effect.direction);
  if (!result.effect || yes <= 0 || no <= 0) {
    return fmt::format(
        "Whether there is {} was not weighed: the assumed model probabilities leave room for one answer "
        "only.",
        phrase);
  }
  return answer(
      {phrase, "no effect", "if there is " + phrase, "if there is none", "no effect", std::log(yes / no)},
      result.effect->log_bf);
}

std::string heterogeneity_sentence(const PoolResult& result, const Priors& priors, std::size_t studies) {
  if (studies < 2) return "Whether the effect varies from study to study can't be told from one study.";
  const double yes = mass(result, priors, Model::random_null, Model::random_effect);
  const double no = mass(result, priors, Model::fixed_null, Model::fixed_effect);
  if (!result.heterogeneity || yes <= 0 || no <= 0) {
    return "Whether the effect varies from study to study was not weighed: the assumed model probabilities "
           "leave room for one answer only.";
  }
  return answer({"varying effects", "one effect shared by all studies", "if effects vary",
                 "if all share one effect", "one shared effect", std::log(yes / no)},
                result.heterogeneity->log_bf);
}

}  // namespace

Verdict verdict(const PoolResult& result, const Priors& priors, std::span<const Study> studies) {
  return {effect_sentence(result, priors), heterogeneity_sentence(result, priors, studies.size())};
}

}  // namespace steelyard
