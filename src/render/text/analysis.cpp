// `pool` for people, from top to bottom: the answer, the forest, then the numbers behind them.
#include <cmath>
#include <string>

#include <fmt/format.h>

#include "render/text/page.hpp"
#include "render/words.hpp"

namespace steelyard {
namespace {

using namespace render;
using namespace render::text;

constexpr std::size_t forest_limit = 200;  // more studies than this: an excerpt
constexpr std::size_t excerpt_rows = 40;
constexpr std::size_t most_listed = 20;  // findings and cautions

std::string title(const Analysis& analysis) {
  const std::size_t count = analysis.studies.size();
  return fmt::format("{}: {} {} pooled", analysis.input.file, count, count == 1 ? "study" : "studies");
}

std::string size_sentence(const Analysis& analysis) {
  const std::string sentence = effect_size_sentence(analysis);
  return sentence.empty() ? "" : "How large? " + sentence;
}

std::string models(const Analysis& analysis, const TextStyle& style) {
  std::vector<std::vector<std::string>> rows = {{"Model", "before", "after", "log marginal", "error"}};
  for (const ModelResult& model : analysis.result.models) rows.push_back(model_row(model));
  return heading("Models", style) + table(rows, style);
}

std::string evidence(const Analysis& analysis, const TextStyle& style) {
  std::vector<std::vector<std::string>> rows = {{"Evidence", "Bayes factor", "in favour of", "decibans"}};
  for (const EvidenceRow& row : evidence_rows(analysis))
    rows.push_back({row.question, row.ratio, row.favours, row.weight});
  return table(rows, style);
}

std::string estimates(const Analysis& analysis, const TextStyle& style) {
  const std::string interval = fmt::format("{:g}% interval", 100 * analysis.options.pool.level);
  std::vector<std::vector<std::string>> rows = {{"Estimates", "mean", "sd", "median", interval}};
  std::string reasons;
  for (const EstimateRow& row : estimate_rows(analysis)) {
    rows.push_back({row.name, row.mean, row.sd, row.median, row.interval});
    if (!row.reason.empty()) reasons += paragraph(row.name + ": " + row.reason, style, 2, 2);
  }
  return table(rows, style) + reasons;
}

std::string findings(const Analysis& analysis, const TextStyle& style) {
  if (analysis.findings.empty()) return "";
  std::string out = heading("Printed numbers that disagree", style);
  std::size_t listed = 0;
  for (const Finding& finding : analysis.findings) {
    if (++listed > most_listed) break;
    out += paragraph(finding_sentence(analysis, finding), style, 2, 2);
  }
  if (analysis.findings.size() > most_listed)
    out += paragraph(
        fmt::format("... and {} more; `steelyard check` lists all.", analysis.findings.size() - most_listed),
        style, 2);
  return out + "\n";
}

std::string cautions(const Analysis& analysis, const TextStyle& style) {
  const std::vector<std::string> sentences = caution_sentences(analysis);
  std::string out = heading("Cautions", style);
  for (std::size_t i = 0; i < sentences.size() && i < most_listed; ++i)
    out += paragraph(sentences[i], style, 2, 2);
  if (sentences.size() > most_listed)
    out += paragraph(fmt::format("... and {} more; `--json` carries all.", sentences.size() - most_listed),
                     style, 2);
  return out + paragraph(usual_caution(), style, 2, 2);
}

}  // namespace

std::string render_text(const Analysis& analysis, const TextStyle& style) {
  const std::size_t count = analysis.studies.size();
  const figure::Forest forest =
      figure::forest(analysis, {count > forest_limit ? excerpt_rows : std::max<std::size_t>(count, 1)});
  std::string out = heading(title(analysis), style) + "\n";
  out += paragraph("Is there an effect? " + forest.verdict.effect, style);
  out += paragraph("Does it vary? " + forest.verdict.heterogeneity, style);
  const std::string size = size_sentence(analysis);
  if (!size.empty()) out += paragraph(size, style);
  out += "\n" + render_text(forest, style) + "\n";
  out +=
      models(analysis, style) + "\n" + evidence(analysis, style) + "\n" + estimates(analysis, style) + "\n";
  out += paragraph(priors_sentence(analysis), style) + "\n";
  out += findings(analysis, style);
  return out + cautions(analysis, style);
}

}  // namespace steelyard
