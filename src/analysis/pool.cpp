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

Outcome<Analysis> analyse_table(Input input, const AnalysisOptions& options,
                                std::vector<Diagnostic> cautions) {
  Outcome<Analysis> outcome;
  auto fail = [&outcome](std::vector<Diagnostic>&& diagnostics) {
    for (Diagnostic& d : diagnostics) outcome.diagnostics.push_back(std::move(d));
    outcome.value.reset();
  };

  Analysis analysis;
  analysis.options = options;
  analysis.input = std::move(input);
  analysis.cautions = std::move(cautions);
  const Table& table = analysis.input.table;

  auto kept = analysis::keep_rows(table, options.without);
  if (!kept.ok()) {
    fail(std::move(kept.diagnostics));
    return outcome;
  }
  analysis.left_out = kept.value->left_out;
  const bool whole = analysis.left_out.empty();
  const Table part = whole ? Table{} : analysis::subset(table, kept.value->rows);
  const Table& used = whole ? table : part;

  auto rebuilt = rebuild_all(used, options.rebuild);
  std::vector<Diagnostic> errors;
  analysis::sort_out(std::move(rebuilt.diagnostics), errors, analysis.cautions);
  if (!rebuilt.ok()) {
    for (Diagnostic& d : analysis.cautions) errors.push_back(std::move(d));
    fail(std::move(errors));
    return outcome;
  }
  analysis.studies = std::move(*rebuilt.value);
  analysis.findings = audit(used, analysis.studies, options.rebuild);
  if (!whole) {
    analysis::point_at_whole_table(std::span<Study>(analysis.studies), table, kept.value->rows);
    analysis::point_at_whole_table(std::span<Finding>(analysis.findings), kept.value->rows);
  }
  if (auto problem = priors_needed(analysis.studies, options, analysis.input.file)) {
    fail({std::move(*problem)});
    return outcome;
  }

  auto pooled = pool(analysis.studies, options.priors, options.pool);
  if (!pooled.ok()) {
    fail(std::move(pooled.diagnostics));
    return outcome;
  }
  analysis.result = std::move(*pooled.value);
  for (Diagnostic& d : pooled.diagnostics) analysis.cautions.push_back(std::move(d));
  for (const Diagnostic& d : analysis.result.cautions) analysis.cautions.push_back(d);
  outcome.diagnostics = analysis.cautions;
  outcome.value = std::move(analysis);
  return outcome;
}

Outcome<Analysis> analyse_pool(std::string_view text, const std::string& file,
                               const AnalysisOptions& options) {
  auto table = read_table(text, file);
  if (!table.ok()) return {std::nullopt, std::move(table.diagnostics)};
  return analyse_table(Input{file, sha256(text), std::move(*table.value)}, options,
                       std::move(table.diagnostics));
}

}  // namespace steelyard
