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

std::string weight(const std::optional<LogBayesFactor>& bf) { return bf ? decibans_text(bf->log_bf) : "–"; }

std::vector<std::string> triple_row(const std::string& name, const EvidenceTriple& t) {
  return {name, weight(t.fixed), weight(t.random), weight(t.averaged)};
}

std::string evidence(const ReplicateAnalysis& a, const TextStyle& style) {
  const ReplicateResult& r = a.result;
  std::vector<std::vector<std::string>> rows = {{"Evidence in decibans", "same", "varying", "averaged"}};
  rows.push_back(triple_row("Replications, from the originals' posterior (flat)", r.flat));
  rows.push_back(triple_row("Added by the replications (all over originals)", r.carried));
  rows.push_back(triple_row("An effect? Originals alone", r.originals_alone));
  rows.push_back(triple_row("An effect? Replications alone", r.replications_alone));
  rows.push_back(triple_row("An effect? All studies", r.all));
  rows.push_back(triple_row("All, originals selected for significance", r.selected_all));
  rows.push_back(triple_row("Added, originals so selected", r.selected_carried));
  std::string out = table(rows, style);
  for (const EvidenceTriple* t : {&r.flat, &r.carried, &r.selected_all}) {
    if (!t->reason.empty()) out += paragraph(t->reason, style, 2);
  }
  return out + "\n";
}

std::string summary_text(const Summary& s) {
  if (!s.median) return s.reason.empty() ? "–" : s.reason;
  return fmt::format("{} [{}, {}]", figure::number_text(*s.median, 2),
                     figure::number_text(s.lower.value_or(0), 2),
                     figure::number_text(s.upper.value_or(0), 2));
}

std::string estimates(const ReplicateAnalysis& a, const TextStyle& style) {
  const ReplicateResult& r = a.result;
  std::vector<std::vector<std::string>> rows = {
      {"Mean effect", fmt::format("median [{:g}% interval]", 100 * a.options.level)},
      {"originals", summary_text(r.effect_originals)},
      {"originals, read as selected", summary_text(r.effect_selected)},
      {"replications", summary_text(r.effect_replications)},
      {"all", summary_text(r.effect_all)}};
  std::string out = table(rows, style);
  if (r.shrinkage) {
    out += paragraph(fmt::format("From the originals to all studies the effect keeps {:.0f} % of its size.",
                                 100 * *r.shrinkage),
                     style, 2);
  }
  return out + "\n";
}

std::string prediction_sentence(const ReplicateAnalysis& a, const Prediction& p) {
  const std::string label = a.rows.studies[p.study].label;
  if (p.inside && p.below) {
    return fmt::format(
        "{} lies {} the {:g} % interval that the originals predict (predictive probability of less: {:.3f}).",
        label, *p.inside ? "inside" : "outside", 100 * a.options.level, *p.below);
  }
  if (p.band)
    return fmt::format("{} is known as a bound, which the originals gave a probability of {:.3f}.", label,
                       *p.band);
  return fmt::format("{}: {}", label, p.reason);
}

}  // namespace

std::string render_text(const ReplicateAnalysis& a, const TextStyle& style) {
  std::string out = paragraph("Did it replicate? " + replicate_verdict(a), style) + "\n";
  out += evidence(a, style) + estimates(a, style);
  out += heading("As predicted?", style);
  for (const Prediction& p : a.result.predictions) out += paragraph(prediction_sentence(a, p), style, 2, 2);
  out += "\n";
  for (const std::string& label : a.rows.left_out)
    out += paragraph(fmt::format("Left out as asked: {}.", label), style);
  for (const Diagnostic& d : a.rows.cautions) out += paragraph("Caution: " + d.what, style, 0, 2);
  return out + paragraph(usual_caution(), style);
}

}  // namespace steelyard
