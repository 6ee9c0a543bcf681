#include <string>
#include <utility>

#include <fmt/format.h>

#include "analysis/rows.hpp"

namespace steelyard {

namespace {

// Default priors are in SD units; for any other metric they would be an assumption nobody made.
std::optional<Diagnostic> priors_needed(const std::vector<Study>& studies, const AnalysisOptions& options,
                                        const std::string& file) {
  if (options.explicit_priors) return std::nullopt;
  for (const Study& study : studies) {
    if (study.metric == "smd") continue;
    Diagnostic problem;
    problem.code = "priors-needed";
    problem.where = Place{file, study.line, 0};
    problem.what =
        fmt::format("\"{}\" is in the metric {}, and the default priors are in SD units.", study.label,
                    study.metric.empty() ? "\"\" (unnamed)" : fmt::format("\"{}\"", study.metric));
    problem.remedy =
        "State both priors in the units of the estimates, for instance "
        "--effect-prior \"normal(0, 10)\" --spread-prior \"half-normal(5)\".";
    return problem;
  }
  return std::nullopt;
}

}  // namespace

Outcome<Gathered> gather(Input input, const AnalysisOptions& options, std::vector<Diagnostic> cautions) {
  Gathered rows;
  rows.options = options;
  rows.input = std::move(input);
  rows.cautions = std::move(cautions);
  const Table& table = rows.input.table;
  auto kept = analysis::keep_rows(table, options.without);
  if (!kept.ok()) return {std::nullopt, std::move(kept.diagnostics)};
  rows.left_out = kept.value->left_out;
  const bool whole = rows.left_out.empty();
  const Table part = whole ? Table{} : analysis::subset(table, kept.value->rows);
  const Table& used = whole ? table : part;

  auto rebuilt = rebuild_all(used, options.rebuild);
  std::vector<Diagnostic> errors;
  analysis::sort_out(std::move(rebuilt.diagnostics), errors, rows.cautions);
  if (!rebuilt.ok()) {
    for (Diagnostic& d : rows.cautions) errors.push_back(std::move(d));
    return {std::nullopt, std::move(errors)};
  }
  rows.studies = std::move(*rebuilt.value);
  rows.findings = audit(used, rows.studies, options.rebuild);
  if (!whole) {
    analysis::point_at_whole_table(std::span<Study>(rows.studies), table, kept.value->rows);
    analysis::point_at_whole_table(std::span<Finding>(rows.findings), kept.value->rows);
  }
  if (auto problem = priors_needed(rows.studies, options, rows.input.file)) {
    return {std::nullopt, {std::move(*problem)}};
  }
  return {std::move(rows), {}};
}

Outcome<Analysis> analyse_table(Input input, const AnalysisOptions& options,
                                std::vector<Diagnostic> cautions) {
  auto gathered = gather(std::move(input), options, std::move(cautions));
  if (!gathered.ok()) return {std::nullopt, std::move(gathered.diagnostics)};
  Gathered& rows = *gathered.value;
  auto pooled = pool(rows.studies, options.priors, options.pool);
  if (!pooled.ok()) return {std::nullopt, std::move(pooled.diagnostics)};

  Analysis analysis;
  analysis.input = std::move(rows.input);
  analysis.options = options;
  analysis.studies = std::move(rows.studies);
  analysis.findings = std::move(rows.findings);
  analysis.left_out = std::move(rows.left_out);
  analysis.cautions = std::move(rows.cautions);
  analysis.result = std::move(*pooled.value);
  for (Diagnostic& d : pooled.diagnostics) analysis.cautions.push_back(std::move(d));
  for (const Diagnostic& d : analysis.result.cautions) analysis.cautions.push_back(d);
  std::vector<Diagnostic> said = analysis.cautions;
  return {std::move(analysis), std::move(said)};
}

Outcome<Analysis> analyse_pool(std::string_view text, const std::string& file,
                               const AnalysisOptions& options) {
  auto table = read_table(text, file);
  if (!table.ok()) return {std::nullopt, std::move(table.diagnostics)};
  return analyse_table(Input{file, sha256(text), std::move(*table.value)}, options,
                       std::move(table.diagnostics));
}

}  // namespace steelyard
