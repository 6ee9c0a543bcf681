#include <string>
#include <utility>

#include "analysis/rows.hpp"

namespace steelyard {

namespace {

// Row by row, so that one row that can't be rebuilt does not hide what the others say. What only
// the whole table can show (labels used twice, metrics) comes from rebuild_all and the audit.
void rebuild_each(const Table& table, const RebuildOptions& options, Check& check) {
  auto all = rebuild_all(table, options);
  analysis::sort_out(std::move(all.diagnostics), check.problems, check.cautions);
  if (all.ok()) {
    check.studies = std::move(*all.value);
    return;
  }
  for (const Row& row : table.rows) {
    auto study = rebuild(table, row, options);
    if (study.ok()) check.studies.push_back(std::move(*study.value));
  }
}

}  // namespace

Outcome<Check> analyse_check(std::string_view text, const std::string& file, const CheckOptions& options) {
  auto read = read_table(text, file);
  if (!read.ok()) return {std::nullopt, std::move(read.diagnostics)};
  Check check;
  check.options = options;
  check.cautions = std::move(read.diagnostics);
  check.input = Input{file, sha256(text), std::move(*read.value)};

  auto kept = analysis::keep_rows(check.input.table, options.without);
  if (!kept.ok()) return {std::nullopt, std::move(kept.diagnostics)};
  check.left_out = kept.value->left_out;
  const Table used = analysis::subset(check.input.table, kept.value->rows);
  rebuild_each(used, options.rebuild, check);
  check.findings = audit(used, check.studies, options.rebuild);
  analysis::point_at_whole_table(std::span<Study>(check.studies), check.input.table, kept.value->rows);
  analysis::point_at_whole_table(std::span<Finding>(check.findings), kept.value->rows);

  std::vector<Diagnostic> cautions = check.cautions;
  return {std::move(check), std::move(cautions)};
}

}  // namespace steelyard
