// What was assumed and how it was computed, in words that can be pasted into a paper.
#include <algorithm>
#include <variant>

#include <fmt/format.h>

#include "render/document.hpp"
#include "render/words.hpp"

namespace steelyard::render {
namespace {

struct Kinds {
  std::size_t exact = 0, folded = 0, bands = 0, estimates = 0;
};

Kinds kinds(const Analysis& analysis) {
  Kinds out;
  for (const Study& study : analysis.studies) {
    if (std::holds_alternative<BandT>(study.evidence)) {
      ++out.bands;
    } else if (is_folded(study.evidence)) {
      ++out.folded;
    } else if (std::holds_alternative<ExactT>(study.evidence)) {
      ++out.exact;
    } else {
      ++out.estimates;
    }
  }
  return out;
}

std::string count_of(std::size_t count) {
  return fmt::format("{} {}", count, count == 1 ? "study" : "studies");
}

bool default_spread(const Priors& priors) {
  const auto* family = std::get_if<InverseGammaPrior>(&priors.spread.family);
  return family != nullptr && family->shape == 1.0 && family->scale == 0.15;
}

bool cauchy_effect(const Priors& priors) { return std::holds_alternative<CauchyPrior>(priors.effect.family); }

std::string direction_clause(Direction direction) {
  if (direction == Direction::either) return "";
  return fmt::format(", restricted to mean effects {} than 0", to_text(direction));
}

/// Collects references and gives back the citation.
class References {
 public:
  std::string cite(const std::string& citation, const std::string& entry) {
    if (std::find(entries.begin(), entries.end(), entry) == entries.end()) entries.push_back(entry);
    return citation;
  }
  std::vector<std::string> entries;
};

std::string likelihood_sentence(const Kinds& kinds, References& references) {
  std::vector<std::string> parts;
  if (kinds.exact > 0)
    parts.push_back(fmt::format("the noncentral t density of the t value ({})", count_of(kinds.exact)));
  if (kinds.folded > 0)
    parts.push_back(fmt::format("the density summed over both signs where the sign is not printed ({})",
                                count_of(kinds.folded)));
  if (kinds.bands > 0)
    parts.push_back(fmt::format(
        "the probability of the interval of t values where only a bound is printed ({}), assuming "
        "coarsening at random {}",
        count_of(kinds.bands),
        references.cite("(Heitjan & Rubin, 1991)",
                        "Heitjan, D. F., & Rubin, D. B. (1991). Ignorability and coarse data. The Annals "
                        "of Statistics, 19, 2244–2253.")));
  if (kinds.estimates > 0)
    parts.push_back(fmt::format("a Normal density of the estimate with its printed standard error ({})",
                                count_of(kinds.estimates)));
  std::string out = "The likelihood of each study was exact: ";
  for (std::size_t i = 0; i < parts.size(); ++i)
    out += (i == 0 ? "" : i + 1 == parts.size() ? "; and " : "; ") + parts[i];
  return out + ".";
}

}  // namespace

Methods methods(const Analysis& analysis) {
  const Priors& priors = analysis.options.priors;
  References references;
  const Kinds kind = kinds(analysis);
  std::string text = fmt::format("We pooled {} from printed summary statistics with Steelyard {}. ",
                                 count_of(analysis.studies.size()), STEELYARD_VERSION);
  if (kind.exact + kind.folded + kind.bands > 0)
    text += fmt::format(
        "Effects are standardized mean differences; printed values of g use the exact small-sample factor "
        "{}. ",
        references.cite("(Hedges, 1981)",
                        "Hedges, L. V. (1981). Distribution theory for Glass's estimator of effect size and "
                        "related estimators. Journal of Educational Statistics, 6, 107–128."));
  text += likelihood_sentence(kind, references) + " ";
  text += fmt::format(
      "Four models were compared: no effect or an effect, each either the same in all studies or Normally "
      "distributed between "
      "studies. Before the data, the mean effect followed {}{}{}, the between-study SD {}{}, and the models "
      "had probabilities "
      "{}, {}, {} and {}. ",
      to_text(priors.effect), direction_clause(priors.effect.direction),
      cauchy_effect(priors)
          ? references.cite(" (after Rouder et al., 2009)",
                            "Rouder, J. N., Speckman, P. L., Sun, D., Morey, R. D., & Iverson, G. (2009). "
                            "Bayesian t tests for accepting and rejecting the null hypothesis. Psychonomic "
                            "Bulletin & Review, 16, 225–237.")
          : "",
      to_text(priors.spread),
      default_spread(priors)
          ? references.cite(" (Gronau et al., 2017)",
                            "Gronau, Q. F., Van Erp, S., Heck, D. W., Cesario, J., Jonas, K. J., & "
                            "Wagenmakers, E.-J. (2017). A "
                            "Bayesian model-averaged meta-analysis of the power pose effect with informed "
                            "and default priors: "
                            "The case of felt power. Comprehensive Results in Social Psychology, 2, 123–138.")
          : "",
      probability_text(priors.model[0]), probability_text(priors.model[1]), probability_text(priors.model[2]),
      probability_text(priors.model[3]));
  text += fmt::format(
      "Each study's own effect was integrated out in closed form and the remaining one or two dimensions by "
      "quadrature with error "
      "bounds, without sampling. Bayes factors for an effect and for heterogeneity are ratios of posterior "
      "to prior odds, averaged "
      "over the other question {}; they are also given as weight of evidence in decibans, 10·log10 of the "
      "Bayes factor {}. "
      "Intervals are central {:g}% credible intervals.",
      references.cite("(Hoeting et al., 1999)",
                      "Hoeting, J. A., Madigan, D., Raftery, A. E., & Volinsky, C. T. (1999). Bayesian model "
                      "averaging: A tutorial. Statistical Science, 14, 382–401."),
      references.cite("(Good, 1950)",
                      "Good, I. J. (1950). Probability and the weighing of evidence. Griffin."),
      100 * analysis.options.pool.level);
  return {text, references.entries};
}

std::vector<std::string> assumptions(const Analysis& analysis) {
  const Priors& priors = analysis.options.priors;
  const Kinds kind = kinds(analysis);
  std::vector<std::string> out;
  out.push_back(
      fmt::format("Effect: {}; all rows are on this scale.", figure::effect_name(analysis.studies)));
  if (kind.exact > 0)
    out.push_back(
        "t values: T given the effect follows a noncentral t distribution, so scores are taken as Normal "
        "within groups, with one SD.");
  if (kind.folded > 0) out.push_back("Unsigned tests: both signs are possible; none is assumed.");
  if (kind.bands > 0)
    out.push_back(
        "Bounds (such as p < .05): how coarsely a result was printed does not depend on the result beyond "
        "the bound itself.");
  if (kind.estimates > 0)
    out.push_back("Estimates with a standard error: Normal, the standard error taken as known.");
  out.push_back("The studies are independent of each other given their effects.");
  out.push_back("If effects vary, they vary as a Normal distribution around one mean.");
  out.push_back(
      "What was printed is all that was found: nothing here corrects for results that were not published.");
  out.push_back(priors_sentence(analysis));
  if (priors.effect.direction != Direction::either)
    out.push_back(
        "The direction restricts the mean effect, not each study's effect, nor the models without an "
        "effect.");
  return out;
}

}  // namespace steelyard::render
