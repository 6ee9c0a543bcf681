// All rules over all rows.
#include "steelyard/audit.hpp"

#include <algorithm>
#include <iterator>

#include "audit/rule.hpp"
#include "rebuild/check_cells.hpp"

namespace steelyard {

namespace auditing {

void RowView::report(std::string_view rule, Grade grade, std::string what, std::string remedy) const {
  findings.push_back({std::string(rule), grade, row, {}, std::move(what), std::move(remedy)});
}

void TableView::report(std::string_view rule, std::size_t row, std::vector<std::size_t> others,
                       std::string what, std::string remedy) const {
  findings.push_back(
      {std::string(rule), Grade::worth_a_look, row, std::move(others), std::move(what), std::move(remedy)});
}

namespace {

// Cells that can't be what their column says are errors already: nothing can be computed from them.
bool usable(const rebuilding::Facts& facts) {
  const auto problems = rebuilding::check_cells(facts);
  return std::none_of(problems.begin(), problems.end(),
                      [](const Diagnostic& d) { return d.severity == Severity::error; });
}

void audit_row(const Table& table, const rebuilding::Header& header, std::size_t row,
               const RebuildOptions& options, std::vector<Finding>& findings) {
  const rebuilding::Facts facts(table, header, table.rows[row]);
  if (!usable(facts)) return;
  rebuilding::Numbers x(facts, options);
  x.mute(true);
  const auto design = rebuilding::design_of(x);
  const RowView view{row, x, design, design ? rebuilding::frame_of(x) : std::nullopt, findings};
  for (const Rule& rule : registry()) {
    if (rule.within != nullptr) rule.within(view);
  }
}

}  // namespace

std::span<const Rule> registry() {
  static const std::vector<Rule> all = {rule_p(),
                                        rule_one_tailed(),
                                        rule_p_side(),
                                        rule_t_f(),
                                        rule_means(),
                                        rule_difference(),
                                        rule_d(),
                                        rule_d_means(),
                                        rule_r(),
                                        rule_interval(),
                                        rule_interval_middle(),
                                        rule_df(),
                                        rule_welch_df(),
                                        rule_sign(),
                                        rule_grim(),
                                        rule_sd_integers(),
                                        rule_scale(),
                                        rule_se_for_sd(),
                                        rule_words(),
                                        rule_same_test(),
                                        rule_same_label(),
                                        rule_label_case(),
                                        rule_far()};
  return all;
}

}  // namespace auditing

std::string_view to_text(Grade grade) {
  switch (grade) {
    case Grade::impossible:
      return "impossible";
    case Grade::changes_the_verdict:
      return "changes the verdict";
    case Grade::worth_a_look:
      break;
  }
  return "worth a look";
}

std::span<const RuleInfo> audit_rules() {
  static const std::vector<RuleInfo> all = [] {
    std::vector<RuleInfo> infos;
    const auto rules = auditing::registry();
    std::transform(rules.begin(), rules.end(), std::back_inserter(infos),
                   [](const auditing::Rule& rule) { return rule.info; });
    return infos;
  }();
  return all;
}

std::vector<Finding> audit(const Table& table, std::span<const Study> studies,
                           const RebuildOptions& options) {
  std::vector<Finding> findings;
  const rebuilding::Header header(table);
  for (std::size_t row = 0; row < table.rows.size(); ++row) {
    auditing::audit_row(table, header, row, options, findings);
  }
  const auditing::TableView view{table, studies, findings};
  for (const auditing::Rule& rule : auditing::registry()) {
    if (rule.across != nullptr) rule.across(view);
  }
  std::stable_sort(findings.begin(), findings.end(),
                   [](const Finding& a, const Finding& b) { return a.row < b.row; });
  return findings;
}

}  // namespace steelyard
