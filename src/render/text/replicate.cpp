// `replicate` for people: did it replicate, by which definition, and as predicted?
#include <fmt/format.h>

#include <string>
#include <vector>

#include "render/firmness_words.hpp"
#include "render/text/page.hpp"

namespace steelyard {

namespace {

using namespace render;
using namespace render::text;

using Rows = std::vector<std::vector<std::string>>;

std::string weight(const std::optional<LogBayesFactor>& bf) { return bf ? decibans_text(bf->log_bf) : "–"; }

std::vector<std::string> triple_row(const std::string& name, const EvidenceTriple& t) {
  return {name, weight(t.fixed), weight(t.random), weight(t.averaged)};
}

std::string evidence(const ReplicateAnalysis& a, const TextStyle& style) {
  const ReplicateResult& r = a.result;
  Rows rows = {{"Evidence for an effect, in decibans", "same", "varying", "averaged"}};
  rows.push_back(triple_row("Originals alone", r.originals_alone));
  rows.push_back(triple_row("What replications add to them [1]", r.carried));
  rows.push_back(triple_row("All together", r.all));
  rows.push_back(triple_row("Replications alone", r.replications_alone));
  rows.push_back(triple_row("Added, originals from a flat prior [2]", r.flat));
  rows.push_back(triple_row("All, originals read as selected [3]", r.selected_all));
  rows.push_back(triple_row("Added to originals so read [3]", r.selected_carried));
  std::string out = table(rows, style);
  out += paragraph("[1] Ly, Etz, Marsman & Wagenmakers (2019): m(all)/m(originals), an effect against none.",
                   style, 2, 4);
  out += paragraph(
      "[2] Verhagen & Wagenmakers (2014): the originals' posterior from a flat prior. " + r.flat.reason,
      style, 2, 4);
  out += paragraph(
      fmt::format("[3] Their likelihood divided by the probability of p < {:g}. ", a.options.alpha) +
          r.selected_all.reason,
      style, 2, 4);
  return out + "\n";
}

std::string number(const std::optional<double>& value) {
  return value ? figure::number_text(*value, 2) : "–";
}

std::vector<std::string> summary_row(const std::string& name, const Summary& s) {
  return {name, number(s.median),
          s.lower && s.upper ? fmt::format("[{}, {}]", number(s.lower), number(s.upper)) : "–"};
}

std::string estimates(const ReplicateAnalysis& a, const TextStyle& style) {
  const ReplicateResult& r = a.result;
  const std::string level = fmt::format("{:g}% interval", 100 * a.options.level);
  Rows rows = {{"Mean effect, if there is one", "median", level}};
  rows.push_back(summary_row("originals", r.effect_originals));
  rows.push_back(summary_row("originals, read as selected", r.effect_selected));
  rows.push_back(summary_row("replications", r.effect_replications));
  rows.push_back(summary_row("all", r.effect_all));
  return table(rows, style) + "\n";
}

std::string observed_effect(const Study& study) {
  const auto effect = figure::printed_effect(study);
  return effect ? figure::number_text(*effect, 2) : "–";
}

std::string predictions(const ReplicateAnalysis& a, const TextStyle& style) {
  Rows rows = {{"Replication", "observed", "predicted", "inside?", "P(less)"}};
  std::string notes;
  for (const Prediction& p : a.result.predictions) {
    const Study& study = a.rows.studies[p.study];
    const std::string interval = p.effect ? fmt::format("[{}, {}]", figure::number_text(p.effect->low, 2),
                                                        figure::number_text(p.effect->high, 2))
                                          : "–";
    rows.push_back({study.label, observed_effect(study), interval,
                    p.inside ? (*p.inside ? "yes" : "no") : "–",
                    p.below ? fmt::format("{:.3f}", *p.below) : "–"});
    if (p.band) {
      notes +=
          paragraph(fmt::format("{} is known as a range only; the originals gave it a probability of {:.3f}.",
                                study.label, *p.band),
                    style, 2, 2);
    }
  }
  return table(rows, style) + notes + "\n";
}

std::string discounts(const ReplicateAnalysis& a, const TextStyle& style) {
  Rows rows = {{"If the originals count with weight", "same", "varying", "averaged"}};
  for (const Discounted& d : a.result.discounted) {
    rows.push_back(triple_row(figure::number_text(d.weight, 2), d.effect));
  }
  return table(rows, style) +
         paragraph("Decibans for an effect from all studies; 0 leaves the originals out, 1 takes them whole.",
                   style, 2) +
         "\n";
}

std::string cautions(const ReplicateAnalysis& a, const TextStyle& style) {
  std::string out = heading("Cautions", style);
  for (const std::string& sentence : caution_sentences(a.rows, a.result.cautions)) {
    out += paragraph(sentence, style, 2, 2);
  }
  if (!a.result.accurate) {
    out += paragraph("Not every integral reached its accuracy; `--json` shows which errors to expect.", style,
                     2, 2);
  }
  return out + paragraph(usual_caution(), style, 2, 2);
}

}  // namespace

std::string render_text(const ReplicateAnalysis& a, const TextStyle& style) {
  std::string out = paragraph("Did it replicate? " + replicate_verdict(a), style);
  for (const std::string& sentence : {prediction_sentence(a), shrinkage_sentence(a)}) {
    if (!sentence.empty()) out += paragraph(sentence, style);
  }
  out += "\n" + evidence(a, style) + estimates(a, style) + predictions(a, style) + discounts(a, style);
  return out + paragraph(assumed_sentence(a.rows, true), style) + "\n" + cautions(a, style);
}

}  // namespace steelyard
