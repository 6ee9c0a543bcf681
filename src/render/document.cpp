#include "render/document.hpp"

#include <algorithm>
#include <cmath>

#include <fmt/format.h>

#include "render/words.hpp"

namespace steelyard::render {
namespace {

using figure::number_text;

constexpr std::size_t forest_rows = 60;  // more would be too small to read on one printed page

template <class Figure>
FigureBlock figure_block(const std::string& id, const Figure& figure, bool with_figures) {
  FigureBlock out{id, figure.words.title + ". " + figure.words.finding, "", ""};
  if (!with_figures) return out;
  out.wide = render_svg(figure, {FigureWidth::two_columns, true, id});
  out.narrow = render_svg(figure, {FigureWidth::one_column, true, id + "-narrow"});
  return out;
}

std::vector<TableCell> plain_cells(const std::vector<std::string>& texts) {
  std::vector<TableCell> out;
  for (const std::string& text : texts) out.push_back({text, std::nullopt});
  return out;
}

Section forest_section(const Report& report, bool with_figures) {
  const figure::Forest forest = figure::forest(report.analysis, {forest_rows});
  Section out{"forest", "The studies and what they say together", {}};
  out.blocks.emplace_back(figure_block("forest", forest, with_figures));
  return out;
}

/// Prior and posterior odds of the class that holds the models a and b.
std::pair<std::string, std::string> odds(const Analysis& analysis, Model a, Model b, double log_bf) {
  double yes = 0, no = 0;
  for (const ModelResult& model : analysis.result.models) {
    if (!model.integral) continue;
    (model.model == a || model.model == b ? yes : no) += model.prior_probability;
  }
  if (!(yes > 0) || !(no > 0)) return {"–", "–"};
  return {odds_text(std::log(yes / no)), odds_text(std::log(yes / no) + log_bf)};
}

Section evidence_section(const Analysis& analysis) {
  Section out{"evidence", "The two questions", {}};
  TableBlock questions{"questions",
                       "Bayes factors, the right way round, with the weight of evidence in decibans",
                       {"Question", "Bayes factor", "in favour of", "decibans"},
                       {},
                       {},
                       false};
  for (const EvidenceRow& row : evidence_rows(analysis))
    questions.rows.push_back(plain_cells({row.question, row.ratio, row.favours, row.weight}));
  out.blocks.emplace_back(questions);
  TableBlock table{"odds", "Odds before and after the data", {"Odds of", "assumed before", "after"}, {}, {},
                   false};
  if (analysis.result.effect) {
    const auto [before, after] =
        odds(analysis, Model::fixed_effect, Model::random_effect, analysis.result.effect->log_bf);
    table.rows.push_back(plain_cells({"an effect, against none", before, after}));
  }
  if (analysis.result.heterogeneity) {
    const auto [before, after] =
        odds(analysis, Model::random_null, Model::random_effect, analysis.result.heterogeneity->log_bf);
    table.rows.push_back(plain_cells({"varying effects, against one shared", before, after}));
  }
  if (!table.rows.empty()) out.blocks.emplace_back(table);
  TableBlock models{
      "models",
      "Models: probabilities before and after, log marginal likelihood (natural) and its error bound",
      {"Model", "before", "after", "log marginal", "error"},
      {},
      {},
      false};
  for (const ModelResult& model : analysis.result.models)
    models.rows.push_back(plain_cells(model_row(model)));
  out.blocks.emplace_back(models);
  return out;
}

Section estimates_section(const Analysis& analysis) {
  Section out{"estimates", "How large", {}};
  TableBlock table{
      "estimates-table",
      "Estimates after the data",
      {"Quantity", "mean", "sd", "median", fmt::format("{:g}% interval", 100 * analysis.options.pool.level)},
      {},
      {},
      false};
  std::vector<std::string> reasons;
  for (const EstimateRow& row : estimate_rows(analysis)) {
    table.rows.push_back(plain_cells({row.name, row.mean, row.sd, row.median, row.interval}));
    if (!row.reason.empty()) reasons.push_back(row.name + ": " + row.reason);
  }
  out.blocks.emplace_back(table);
  if (!reasons.empty()) out.blocks.emplace_back(ListBlock{reasons});
  return out;
}

std::string ratio_words(double log_bf) {
  return ratio_text(std::fabs(log_bf)) + (log_bf >= 0 ? " for an effect" : " for no effect");
}

/// The widths at the spread scale that is nearest to the one in use.
TableBlock width_table(const figure::PriorGrid& grid) {
  TableBlock out{"widths",
                 "Evidence for an effect at other prior widths",
                 {grid.width_name, "Bayes factor", "decibans"},
                 {},
                 {},
                 false};
  std::size_t nearest = 0;
  for (std::size_t j = 0; j < grid.scales.size(); ++j) {
    const auto distance = [&](std::size_t k) {
      return std::fabs(std::log(grid.scales[k] / grid.scale_used));
    };
    if (distance(j) < distance(nearest)) nearest = j;
  }
  for (std::size_t i = 0; i < grid.widths.size(); ++i) {
    const auto& value = grid.log_bf[i * grid.scales.size() + nearest];
    out.rows.push_back({{fmt::format("{:.3g}", grid.widths[i]), grid.widths[i]},
                        {value ? ratio_words(*value) : "–", std::nullopt},
                        {value ? decibans_text(*value) : "–",
                         value ? std::optional<double>(decibans(*value)) : std::nullopt}});
  }
  out.caption += fmt::format(", with a {} of {:.3g}", grid.scale_name, grid.scales[nearest]);
  return out;
}

Section firmness_section(const Report& report, bool with_figures) {
  Section out{"firmness", "How firm is it?", {}};
  if (report.prior_grid) {
    if (const auto map = figure::prior_map(*report.prior_grid); map.ok()) {
      out.blocks.emplace_back(figure_block("priors", *map.value, with_figures));
      out.blocks.emplace_back(width_table(*report.prior_grid));
    }
  }
  const auto& effect = report.analysis.result.effect;
  if (!report.without.empty())
    out.blocks.emplace_back(figure_block(
        "sway", figure::sway(effect ? std::optional<double>(effect->log_bf) : std::nullopt, report.without),
        with_figures));
  if (!report.cumulative.empty())
    out.blocks.emplace_back(figure_block("ladder", figure::ladder(report.cumulative), with_figures));
  if (out.blocks.empty())
    out.blocks.emplace_back(
        Paragraph{"Other priors, leave-one-out and cumulative analyses were not computed for this report."});
  return out;
}

Section shapes_section(const Analysis& analysis, bool with_figures) {
  Section out{"shapes", "What is known after the data", {}};
  if (const auto belief = figure::belief(analysis); belief.ok())
    out.blocks.emplace_back(figure_block("belief", *belief.value, with_figures));
  if (const auto surface = figure::surface(analysis); surface.ok())
    out.blocks.emplace_back(figure_block("surface", *surface.value, with_figures));
  if (const auto funnel = figure::funnel(analysis); funnel.ok())
    out.blocks.emplace_back(figure_block("funnel", *funnel.value, with_figures));
  return out;
}

TableCell number_cell(const std::optional<double>& value, int decimals) {
  return value ? TableCell{number_text(*value, decimals), value} : TableCell{"–", std::nullopt};
}

std::string notes_of(const Analysis& analysis, const Study& study) {
  std::string out;
  for (const Finding& finding : analysis.findings)
    if (finding.row == study.row)
      out += fmt::format("{}{}: {}", out.empty() ? "" : " ", to_text(finding.grade), finding.what);
  for (const std::string& caution : study.cautions) out += (out.empty() ? "" : " ") + caution;
  return out;
}

Section studies_section(const Analysis& analysis) {
  Section out{"studies", "Every study: how it was read and what it says alone", {}};
  const std::string level = fmt::format("{:g}%", 100 * analysis.options.pool.level);
  TableBlock table{"study-table",
                   "t, degrees of freedom and effective n as rebuilt; g (or the estimate) as printed; the "
                   "study's own effect after pooling",
                   {"Study", "line", "t", "df", "effective n", "g", "after pooling", level, "decibans alone",
                    "rebuilt from", "notes"},
                   {},
                   {},
                   true};
  for (std::size_t i = 0; i < analysis.studies.size(); ++i) {
    const Study& study = analysis.studies[i];
    const StudyResult& result = analysis.result.studies[i];
    const auto centre = result.shrunken.mean ? result.shrunken.mean : result.shrunken.median;
    const std::string interval = result.shrunken.lower && result.shrunken.upper
                                     ? fmt::format("[{}, {}]", number_text(*result.shrunken.lower, 2),
                                                   number_text(*result.shrunken.upper, 2))
                                     : "–";
    table.rows.push_back({{study.label, std::nullopt},
                          {fmt::format("{}", study.line), static_cast<double>(study.line)},
                          number_cell(t_value(study), 2),
                          number_cell(degrees_of_freedom(study), 0),
                          number_cell(effective_n(study), 1),
                          number_cell(figure::printed_effect(study), 2),
                          number_cell(centre, 2),
                          {interval, std::nullopt},
                          {decibans_text(result.log_bf), decibans(result.log_bf)},
                          {study.how.empty() ? study.route : study.how, std::nullopt},
                          {notes_of(analysis, study), std::nullopt}});
    table.row_keys.push_back(fmt::format("{}", i));
  }
  out.blocks.emplace_back(table);
  if (!analysis.left_out.empty())
    out.blocks.emplace_back(
        Paragraph{"Left out on request: " + fmt::format("{}", fmt::join(analysis.left_out, ", ")) + "."});
  return out;
}

Section assumptions_section(const Analysis& analysis) {
  Section out{"assumptions", "What was assumed", {}};
  out.blocks.emplace_back(ListBlock{assumptions(analysis)});
  return out;
}

Section methods_section(const Analysis& analysis) {
  const Methods text = methods(analysis);
  Section out{"methods", "Methods, ready to paste", {}};
  out.blocks.emplace_back(Paragraph{text.paragraph});
  out.blocks.emplace_back(ListBlock{text.references});
  return out;
}

Section again_section(const Report& report) {
  Section out{"again", "To get it again", {}};
  if (!report.command.empty()) out.blocks.emplace_back(CodeBlock{report.command});
  out.blocks.emplace_back(
      Paragraph{fmt::format("Steelyard {}. Input: {}, SHA-256 {}. The same input gives the same bytes.",
                            STEELYARD_VERSION, report.analysis.input.file, report.analysis.input.sha256)});
  return out;
}

Section cautions_section(const Analysis& analysis) {
  Section out{"cautions", "Cautions", {}};
  std::vector<std::string> items = caution_sentences(analysis);
  items.push_back(usual_caution());
  out.blocks.emplace_back(ListBlock{items});
  return out;
}

/// One sentence on how firm the answer is, for the first screen.
std::string firm_sentence(const Report& report) {
  std::string out;
  const auto& effect = report.analysis.result.effect;
  if (!report.without.empty() && effect) out += figure::sway(effect->log_bf, report.without, 1).words.finding;
  if (report.prior_grid)
    if (const auto map = figure::prior_map(*report.prior_grid); map.ok())
      out += (out.empty() ? "" : " ") + map.value->words.finding;
  return out;
}

}  // namespace

Document document(const Report& report, bool with_figures) {
  const Analysis& analysis = report.analysis;
  const Verdict answer = verdict(analysis.result, analysis.options.priors, analysis.studies);
  Document out;
  const std::size_t count = analysis.studies.size();
  out.title = fmt::format("{}: {} {}", analysis.input.file, count, count == 1 ? "study" : "studies pooled");
  out.verdict = {{"Is there an effect? " + answer.effect, true},
                 {"Does it vary? " + answer.heterogeneity, true}};
  if (const std::string size = effect_size_sentence(analysis); !size.empty())
    out.verdict.push_back({"How large? " + size, false});
  if (const std::string firm = firm_sentence(report); !firm.empty())
    out.verdict.push_back({"How firm? " + firm, false});
  out.sections.push_back(forest_section(report, with_figures));
  out.sections.push_back(evidence_section(analysis));
  out.sections.push_back(estimates_section(analysis));
  out.sections.push_back(firmness_section(report, with_figures));
  out.sections.push_back(shapes_section(analysis, with_figures));
  out.sections.push_back(studies_section(analysis));
  out.sections.push_back(assumptions_section(analysis));
  out.sections.push_back(cautions_section(analysis));
  out.sections.push_back(methods_section(analysis));
  out.sections.push_back(again_section(report));
  return out;
}

}  // namespace steelyard::render
