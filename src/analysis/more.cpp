// weigh, stress and replicate, joined with the rows they speak of.
#include <fmt/format.h>

#include <string>
#include <utility>

#include "steelyard/analysis.hpp"

namespace steelyard {

namespace {

template <class Whole, class Result>
Outcome<Whole> joined(Whole whole, Outcome<Result>&& result) {
  if (!result.ok()) return {std::nullopt, std::move(result.diagnostics)};
  whole.result = std::move(*result.value);
  for (Diagnostic& d : result.diagnostics) whole.rows.cautions.push_back(std::move(d));
  return {std::move(whole), {}};
}

Diagnostic group_problem(const Table& table, const char* code, std::size_t line, std::string what,
                         std::string remedy) {
  Diagnostic problem;
  problem.code = code;
  problem.where = Place{table.file, line, 0};
  problem.what = std::move(what);
  problem.remedy = std::move(remedy);
  return problem;
}

// What stands in a column, for each study.
Outcome<std::vector<std::string>> labels_of(const Gathered& rows, const std::string& by) {
  const Table& table = rows.input.table;
  if (table.index_of(by) < 0) {
    const std::vector<std::string_view> names(table.names.begin(), table.names.end());
    const std::string_view near = nearest_word(by, names);
    return {std::nullopt,
            {group_problem(table, "by-unknown", 0,
                           fmt::format("There is no column \"{}\" to make groups of.", by),
                           near.empty() ? "Give the name of a column of the file."
                                        : fmt::format("Did you mean \"{}\"?", near))}};
  }
  Outcome<std::vector<std::string>> outcome;
  std::vector<std::string> labels;
  for (const Study& study : rows.studies) {
    const Cell* cell = table.cell(table.rows[study.row], by);
    if (cell == nullptr || cell->empty()) {
      outcome.diagnostics.push_back(
          group_problem(table, "by-empty", study.line,
                        fmt::format("\"{}\" has nothing in the column \"{}\".", study.label, by),
                        "Fill the cell, or leave the study out."));
      continue;
    }
    labels.push_back(cell->text);
  }
  if (outcome.diagnostics.empty()) outcome.value = std::move(labels);
  return outcome;
}

bool has_two_groups(const std::vector<std::string>& labels) {
  for (const std::string& label : labels) {
    if (label != labels.front()) return true;
  }
  return false;
}

}  // namespace

Outcome<WeighAnalysis> analyse_weigh(Gathered rows, const WeighOptions& options) {
  auto result = weigh(rows.studies, rows.options.priors.effect, options);
  return joined(WeighAnalysis{std::move(rows), options, {}}, std::move(result));
}

Outcome<StressAnalysis> analyse_stress(Gathered rows, StressOptions options, const std::string& by) {
  std::optional<GroupResult> groups;
  if (!by.empty()) {
    auto labels = labels_of(rows, by);
    if (!labels.ok()) return {std::nullopt, std::move(labels.diagnostics)};
    options.groups = *labels.value;
    if (has_two_groups(options.groups)) {
      GroupOptions group_options;
      group_options.level = options.pool.level;
      auto compared = compare_groups(rows.studies, options.groups, rows.options.priors, group_options);
      if (!compared.ok()) return {std::nullopt, std::move(compared.diagnostics)};
      groups = std::move(*compared.value);
    }
  }
  auto result = stress(rows.studies, rows.options.priors, options);
  return joined(StressAnalysis{std::move(rows), std::move(options), by, {}, std::move(groups)},
                std::move(result));
}

Outcome<ReplicateAnalysis> analyse_replicate(Gathered rows, const ReplicateOptions& options) {
  auto result = replicate(rows.studies, rows.options.priors, options);
  if (result.ok()) {
    for (const Diagnostic& d : result.value->cautions) rows.cautions.push_back(d);
  }
  return joined(ReplicateAnalysis{std::move(rows), options, {}}, std::move(result));
}

}  // namespace steelyard
