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

// What would change the reading of a study, a sentence each.
std::string sentences(const Weighing& w) {
  std::string text;
  if (w.sceptic && w.enthusiast) {
    text += fmt::format("A sceptic finds {} decibans, an enthusiast {}. ", weight(w.sceptic),
                        weight(w.enthusiast));
  }
  if (w.turning_width) {
    text += fmt::format("The evidence turns at a prior {:.3g} times as wide. ", *w.turning_factor);
  } else {
    text += "No width of the prior turns the evidence. ";
  }
  if (w.bf.log_bf > 0.0) {
    text += fmt::format("Whoever holds prior odds of more than {} against an effect still doubts. ",
                        odds_text(w.bf.log_bf));
  }
  text += fmt::format("No prior could make more of it than {} decibans", decibans_text(w.bound.log_bf));
  if (w.log_p_bound) text += fmt::format(" (from p alone: {})", decibans_text(*w.log_p_bound));
  text += ". ";
  if (w.superiority) {
    text += fmt::format("Chance that a member of group 1 beats one of group 2: {:.2f} [{:.2f}, {:.2f}]. ",
                        w.superiority->median, w.superiority->lower, w.superiority->upper);
  }
  if (w.raw) {
    text += fmt::format("In raw units: {:.3g} [{:.3g}, {:.3g}]. ", w.raw->median, w.raw->lower, w.raw->upper);
  }
  return text;
}

std::string region_sentence(const RegionResult& r) {
  std::string text = fmt::format("Region {:g} to {:g}: ", r.asked.region.low, r.asked.region.high);
  if (r.negligible) {
    text += favour_sentence(r.negligible->log_bf, "an effect inside", "one outside");
  } else {
    text += r.reason;
  }
  text += fmt::format(" Given an effect, it lies inside with probability {:.3f} (before the data {:.3f}).",
                      r.mean_effect.inside, r.prior_inside);
  if (r.log_sign_odds) text += fmt::format(" Odds of a positive effect: {}.", odds_text(*r.log_sign_odds));
  if (r.above_threshold) {
    text += fmt::format(" P(effect in a new study > {:g}) = {:.3f}.", *r.asked.threshold, *r.above_threshold);
  }
  return text;
}

constexpr std::size_t most_described = 20;

}  // namespace

std::string render_text(const RegionResult& region, const TextStyle& style) {
  return paragraph(region_sentence(region), style);
}

std::string render_text(const WeighAnalysis& a, const TextStyle& style) {
  std::string out = paragraph(weigh_verdict(a), style) + "\n" + rows_table(a, style) + "\n";
  out += heading("One by one", style);
  for (std::size_t i = 0; i < a.result.rows.size() && i < most_described; ++i) {
    const Weighing& w = a.result.rows[i];
    const Study& study = a.rows.studies[w.study];
    out += paragraph(fmt::format("{} (line {}): {}", study.label, study.line, study.how), style, 0, 2);
    out += paragraph(sentences(w), style, 2);
    if (w.region) out += paragraph(region_sentence(*w.region), style, 2);
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
