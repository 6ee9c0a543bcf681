// `weigh` for people: a sentence, then each study on a line, then what else can be said of each.
#include <fmt/format.h>

#include <cmath>
#include <string>
#include <vector>

#include "render/firmness_words.hpp"
#include "render/text/page.hpp"

namespace steelyard {

namespace {

using namespace render;
using namespace render::text;

std::string number(std::optional<double> value) { return value ? figure::number_text(*value, 2) : "–"; }

std::string interval(const Summary& s) {
  return s.lower && s.upper ? fmt::format("[{}, {}]", number(s.lower), number(s.upper)) : "–";
}

std::string weight(const std::optional<LogBayesFactor>& bf) { return bf ? decibans_text(bf->log_bf) : "–"; }

std::string range(const Weighing& w) {
  if (!w.rounding) return "–";
  const auto end = [](std::optional<double> log_bf) { return log_bf ? decibans_text(*log_bf) : "no end"; };
  return fmt::format("{} to {}", end(w.rounding->low), end(w.rounding->high));
}

std::string rows_table(const WeighAnalysis& a, const TextStyle& style) {
  const std::string level = fmt::format("{:g}% interval", 100 * a.options.level);
  std::vector<std::vector<std::string>> rows = {
      {"Study", "Bayes factor", "decibans", "by rounding", "effect", level}};
  for (const Weighing& w : a.result.rows) {
    const bool for_it = w.bf.log_bf >= 0.0;
    rows.push_back(
        {a.rows.studies[w.study].label,
         fmt::format("{} for {}", ratio_text(std::abs(w.bf.log_bf)), for_it ? "an effect" : "none"),
         decibans_text(w.bf.log_bf), range(w), number(w.effect.median), interval(w.effect)});
  }
  return table(rows, style);
}

std::string width_sentence(const Weighing& w, const EffectPrior& prior) {
  if (!w.turning_factor || !w.turning_width) return "No width of the prior turns the evidence.";
  const bool wider = *w.turning_factor > 1.0;
  return fmt::format("With a prior {} than {:.3g} ({} as stated) the evidence would turn to {}.",
                     wider ? "wider" : "narrower", *w.turning_width, figure::number_text(*width_of(prior), 3),
                     w.bf.log_bf >= 0.0 ? "no effect" : "an effect");
}

std::string directions_sentence(const Weighing& w) {
  if (!w.greater || !w.less || !w.either) return "";
  return fmt::format("Positive effects only: {} decibans; negative only: {}; either: {}. ", weight(w.greater),
                     weight(w.less), weight(w.either));
}

std::string attitudes_sentence(const Weighing& w) {
  if (!w.sceptic || !w.enthusiast) return "";
  return fmt::format("A sceptic's prior gives {} decibans, an enthusiast's (for a {} effect) {}. ",
                     weight(w.sceptic), w.enthusiast_side == "less" ? "negative" : "positive",
                     weight(w.enthusiast));
}

std::string units_sentence(const Weighing& w, const Study& study) {
  std::string text;
  if (w.superiority) {
    text += fmt::format("{} {:.2f} [{:.2f}, {:.2f}]. ",
                        study.design == Design::one_sample
                            ? "Chance that a random score lies above the comparison value:"
                            : "Chance that a random member of group 1 beats one of group 2:",
                        w.superiority->median, w.superiority->lower, w.superiority->upper);
  }
  if (w.raw) {
    text += fmt::format("In raw units the effect is {:.3g} [{:.3g}, {:.3g}]. ", w.raw->median, w.raw->lower,
                        w.raw->upper);
  }
  return text;
}

// What would change the reading of a study, a sentence each.
std::string sentences(const Weighing& w, const Study& study, const EffectPrior& prior) {
  std::string text = directions_sentence(w) + attitudes_sentence(w) + width_sentence(w, prior);
  text += fmt::format(" No prior could make more of it than {} decibans", decibans_text(w.bound.log_bf));
  if (w.log_p_bound) text += fmt::format("; its p alone no more than {}", decibans_text(*w.log_p_bound));
  return text + ". " + units_sentence(w, study);
}

constexpr std::size_t most_described = 20;

}  // namespace

std::string render_text(const RegionResult& region, const TextStyle& style) {
  std::string out;
  for (const std::string& sentence : region_sentences(region)) out += paragraph(sentence, style);
  return out;
}

std::string render_text(const WeighAnalysis& a, const TextStyle& style) {
  std::string out = paragraph(weigh_verdict(a), style) + "\n" + rows_table(a, style) + "\n";
  out += heading("One by one", style);
  for (std::size_t i = 0; i < a.result.rows.size() && i < most_described; ++i) {
    const Weighing& w = a.result.rows[i];
    const Study& study = a.rows.studies[w.study];
    out += paragraph(fmt::format("{} (line {}): {}", study.label, study.line, study.how), style, 0, 2);
    if (a.result.rows.size() > 1) {
      out += paragraph(weigh_sentence(w, study, a.rows.options.priors.effect.direction), style, 2);
    }
    out += paragraph(sentences(w, study, a.rows.options.priors.effect), style, 2);
    if (w.region) {
      for (const std::string& sentence : region_sentences(*w.region)) out += paragraph(sentence, style, 2);
    }
    for (const Diagnostic& d : w.cautions) out += paragraph("Caution: " + d.what, style, 2);
    for (const std::string& caution : study.cautions) out += paragraph("Caution: " + caution, style, 2);
  }
  if (a.result.rows.size() > most_described) {
    out += paragraph(
        fmt::format("... and {} more; `--json` carries all.", a.result.rows.size() - most_described), style);
  }
  out +=
      "\n" +
      paragraph(fmt::format("Assumed: effect {}, {} effects allowed.", to_text(a.rows.options.priors.effect),
                            a.rows.options.priors.effect.direction == Direction::either    ? "all"
                            : a.rows.options.priors.effect.direction == Direction::greater ? "only positive"
                                                                                           : "only negative"),
                style);
  for (const std::string& label : a.rows.left_out)
    out += paragraph(fmt::format("Left out as asked: {}.", label), style);
  for (const Diagnostic& d : a.rows.cautions) out += paragraph("Caution: " + d.what, style, 0, 2);
  return out + paragraph(usual_caution(), style);
}

}  // namespace steelyard
