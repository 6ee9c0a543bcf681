#include "render/words.hpp"

#include <algorithm>
#include <cmath>

#include <fmt/format.h>

namespace steelyard {

std::string usual_caution() {
  return "This is a statistical summary of what was printed. Where it might guide treatment, safety or law, "
         "it is no "
         "substitute for a risk-of-bias assessment, local rules or licensed practice.";
}

namespace render {
namespace {

using figure::number_text;

const std::string absent = "–";

std::string signed_number(double value, int decimals) { return number_text(value, decimals); }

std::string or_absent(const std::optional<double>& value, int decimals) {
  return value ? signed_number(*value, decimals) : absent;
}

int decimals_of(const Summary& summary) {
  if (summary.lower && summary.upper) return figure::decimals_for((*summary.upper - *summary.lower) / 2);
  return 2;
}

EstimateRow estimate_row(const std::string& name, const Summary& summary) {
  const int decimals = decimals_of(summary);
  EstimateRow out{name,
                  or_absent(summary.mean, decimals),
                  or_absent(summary.sd, decimals),
                  or_absent(summary.median, decimals),
                  absent,
                  ""};
  if (summary.lower && summary.upper)
    out.interval =
        fmt::format("[{}, {}]", number_text(*summary.lower, decimals), number_text(*summary.upper, decimals));
  const bool complete = summary.mean && summary.sd && summary.median && summary.lower && summary.upper;
  if (!complete) out.reason = summary.reason.empty() ? "not computed" : summary.reason;
  return out;
}

EvidenceRow evidence_row(const std::string& question, const std::optional<LogBayesFactor>& bf,
                         const std::string& yes, const std::string& no) {
  if (!bf) return {question, absent, "not identified", absent};
  const std::string ratio = ratio_text(std::fabs(bf->log_bf));
  const std::string side = ratio == "1.00" ? "neither" : bf->log_bf > 0 ? yes : no;
  return {question, ratio, side, decibans_text(bf->log_bf)};
}

std::string probability_list(const Priors& priors) {
  std::string out;
  for (std::size_t i = 0; i < model_count; ++i)
    out += fmt::format("{}{} ({})",
                       i == 0                 ? ""
                       : i + 1 == model_count ? " and "
                                              : ", ",
                       probability_text(priors.model[i]),
                       model_name(static_cast<Model>(i), priors.effect.direction));
  return out;
}

}  // namespace

std::string probability_text(double probability) {
  if (probability == 0 || probability == 1) return fmt::format("{:.0f}", probability);
  if (probability < 0.001) return ratio_text(std::log(probability));
  if (probability > 0.9995) return "> 0.999";
  return fmt::format("{:.3f}", probability);
}

std::string model_name(Model model, Direction direction) {
  const std::string effect = effect_phrase(direction);
  switch (model) {
    case Model::fixed_null:
      return "no effect anywhere";
    case Model::fixed_effect:
      return effect + ", the same everywhere";
    case Model::random_null:
      return "no mean effect, effects vary";
    case Model::random_effect:
      break;
  }
  return effect + " on average, effects vary";
}

std::vector<std::string> model_row(const ModelResult& model) {
  if (!model.integral)
    return {model_name(model.model), probability_text(model.prior_probability), absent, "not identified",
            absent};
  const Integral& integral = *model.integral;
  const std::string error = fmt::format("{:.0e}", integral.abs_error);
  return {model_name(model.model), probability_text(model.prior_probability),
          probability_text(model.posterior_probability), number_text(integral.log_value, 3),
          integral.status == IntegralStatus::ok ? error : error + " (too large)"};
}

std::vector<EvidenceRow> evidence_rows(const Analysis& analysis) {
  const PoolResult& result = analysis.result;
  const std::string yes = effect_phrase(analysis.options.priors.effect.direction), no = "no effect";
  if (analysis.studies.size() < 2) return {evidence_row("An effect?", result.effect, yes, no)};
  return {evidence_row("An effect? Both kinds of model, averaged", result.effect, yes, no),
          evidence_row("An effect? If the same everywhere", result.effect_fixed, yes, no),
          evidence_row("An effect? If effects vary", result.effect_random, yes, no),
          evidence_row("Do effects vary?", result.heterogeneity, "varying", "the same")};
}

std::vector<EstimateRow> estimate_rows(const Analysis& analysis) {
  const PoolResult& result = analysis.result;
  std::vector<EstimateRow> out = {
      estimate_row("Mean effect, averaged", result.pooled_effect),
      estimate_row("The effect, if the same everywhere", result.pooled_effect_fixed)};
  if (analysis.studies.size() > 1) {
    out.push_back(estimate_row("Mean effect, if effects vary", result.pooled_effect_random));
    out.push_back(estimate_row("Spread of effects (SD), if they vary", result.spread));
    out.push_back(estimate_row("Share of variance between studies, I²", result.i2));
  }
  out.push_back(estimate_row("Effect in a new study, averaged", result.new_study));
  return out;
}

std::string effect_size_sentence(const Analysis& analysis) {
  const Summary& pooled = analysis.result.pooled_effect;
  if (!pooled.lower || !pooled.upper) return "";
  const int decimals = decimals_of(pooled);
  const auto centre = pooled.mean ? pooled.mean : pooled.median;
  const std::string level = fmt::format("{:g}%", 100 * analysis.options.pool.level);
  return fmt::format("If there is {}, its mean is {} ({} credible interval {} to {}; {}).",
                     effect_phrase(analysis.options.priors.effect.direction),
                     centre ? number_text(*centre, decimals) : "not defined", level,
                     number_text(*pooled.lower, decimals), number_text(*pooled.upper, decimals),
                     figure::effect_name(analysis.studies));
}

std::string priors_sentence(const Analysis& analysis) {
  const Priors& priors = analysis.options.priors;
  std::string direction;
  if (priors.effect.direction != Direction::either)
    direction = fmt::format(", only {} than 0", to_text(priors.effect.direction));
  return fmt::format("Assumed: effect {}{}; spread {}; model probabilities {}.", to_text(priors.effect),
                     direction, to_text(priors.spread), probability_list(priors));
}

std::string finding_sentence(const Analysis& analysis, const Finding& finding) {
  std::string label = fmt::format("row {}", finding.row + 1);
  for (const Study& study : analysis.studies)
    if (study.row == finding.row) label = study.label;
  return fmt::format("{} ({}): {} {} [{}]", label, to_text(finding.grade), finding.what, finding.remedy,
                     finding.rule);
}

std::vector<std::string> caution_sentences(const Analysis& analysis) {
  std::vector<std::string> out;
  const auto add = [&](std::string sentence) {
    if (std::find(out.begin(), out.end(), sentence) == out.end()) out.push_back(std::move(sentence));
  };
  for (const std::string& label : analysis.left_out) add("Left out on request: " + label + ".");
  if (!analysis.result.accurate)
    add("Not every integral reached its accuracy; the models table shows which, and by how much.");
  std::vector<std::string> said;
  for (const Diagnostic& caution : analysis.cautions) {
    const std::string line = caution.where.line > 0 ? fmt::format("Line {}: ", caution.where.line) : "";
    add(line + caution.what + (caution.remedy.empty() ? "" : " " + caution.remedy));
    said.push_back(caution.what);
  }
  for (const Study& study : analysis.studies) {
    for (const std::string& caution : study.cautions)
      if (std::none_of(said.begin(), said.end(),
                       [&](const std::string& s) { return s.find(caution) != std::string::npos; }))
        add(study.label + ": " + caution);
  }
  return out;
}

}  // namespace render
}  // namespace steelyard
