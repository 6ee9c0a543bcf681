#include "analysis/rows.hpp"

#include <algorithm>
#include <iterator>
#include <string>
#include <utility>

#include <fmt/format.h>

namespace steelyard {

namespace {

bool names_row(const Table& table, std::size_t row, std::string_view name) {
  return name == row_label(table, row) || name == fmt::format("row {}", row + 1);
}

Diagnostic unknown_name(const Table& table, const std::string& name) {
  std::vector<std::string> labels;
  for (std::size_t row = 0; row < table.rows.size(); ++row) labels.push_back(row_label(table, row));
  const std::vector<std::string_view> words(labels.begin(), labels.end());
  const std::string_view near = nearest_word(name, words);
  Diagnostic problem;
  problem.code = "without-unknown";
  problem.where.file = table.file;
  problem.what = fmt::format("No study is called \"{}\", so it can't be left out.", name);
  problem.remedy = near.empty() ? "Give a label from the study column, or a row as in \"row 3\"."
                                : fmt::format("Did you mean \"{}\"?", near);
  return problem;
}

Diagnostic nothing_left(const Table& table) {
  Diagnostic problem;
  problem.code = "without-everything";
  problem.where.file = table.file;
  problem.what = "Every study of the file is left out, so nothing remains.";
  problem.remedy = "Leave out fewer studies.";
  return problem;
}

}  // namespace

std::string row_label(const Table& table, std::size_t row) {
  const Cell* cell = table.cell(table.rows[row], "study");
  return cell != nullptr && !cell->empty() ? cell->text : fmt::format("row {}", row + 1);
}

Outcome<std::vector<std::size_t>> rows_without(const Table& table, std::span<const std::string> without) {
  std::vector<bool> out(table.rows.size(), false);
  Outcome<std::vector<std::size_t>> outcome;
  for (const std::string& name : without) {
    bool found = false;
    for (std::size_t row = 0; row < out.size(); ++row) {
      if (!names_row(table, row, name)) continue;
      out[row] = true;
      found = true;
    }
    if (!found) outcome.diagnostics.push_back(unknown_name(table, name));
  }
  std::vector<std::size_t> kept;
  for (std::size_t row = 0; row < out.size(); ++row) {
    if (!out[row]) kept.push_back(row);
  }
  if (kept.empty() && !without.empty()) outcome.diagnostics.push_back(nothing_left(table));
  if (outcome.diagnostics.empty()) outcome.value = std::move(kept);
  return outcome;
}

namespace analysis {

Outcome<KeptRows> keep_rows(const Table& table, std::span<const std::string> without) {
  auto rows = rows_without(table, without);
  Outcome<KeptRows> outcome;
  outcome.diagnostics = std::move(rows.diagnostics);
  if (!rows.ok()) return outcome;
  KeptRows kept;
  kept.rows = std::move(*rows.value);
  std::size_t next = 0;
  for (std::size_t row = 0; row < table.rows.size(); ++row) {
    if (next < kept.rows.size() && kept.rows[next] == row) {
      ++next;
    } else {
      kept.left_out.push_back(row_label(table, row));
    }
  }
  outcome.value = std::move(kept);
  return outcome;
}

Table subset(const Table& table, std::span<const std::size_t> rows) {
  Table part = table;
  part.rows.clear();
  for (const std::size_t row : rows) part.rows.push_back(table.rows[row]);
  return part;
}

void sort_out(std::vector<Diagnostic>&& diagnostics, std::vector<Diagnostic>& errors,
              std::vector<Diagnostic>& cautions) {
  for (Diagnostic& diagnostic : diagnostics) {
    (diagnostic.severity == Severity::error ? errors : cautions).push_back(std::move(diagnostic));
  }
}

void point_at_whole_table(std::span<Study> studies, const Table& table, std::span<const std::size_t> rows) {
  for (Study& study : studies) {
    study.row = rows[study.row];
    study.label = row_label(table, study.row);
  }
}

void point_at_whole_table(std::span<Finding> findings, std::span<const std::size_t> rows) {
  for (Finding& finding : findings) {
    finding.row = rows[finding.row];
    for (std::size_t& other : finding.others) other = rows[other];
  }
}

}  // namespace analysis
}  // namespace steelyard
