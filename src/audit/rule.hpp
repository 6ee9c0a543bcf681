// What a rule is. One file per rule; the registry lists them in the order of the documentation.
#pragma once

#include <optional>
#include <span>
#include <string>
#include <vector>

#include "audit/range.hpp"
#include "rebuild/facts.hpp"
#include "rebuild/frame.hpp"
#include "steelyard/audit.hpp"

namespace steelyard::auditing {

using rebuilding::Col;

/// A row as the rules within a row see it.
struct RowView {
  std::size_t row;
  rebuilding::Numbers& x;
  std::optional<Design> design;            ///< absent: the row doesn't tell
  std::optional<rebuilding::Frame> frame;  ///< of the printed test; absent without sizes
  std::vector<Finding>& findings;

  [[nodiscard]] bool has(Col col) const { return x.has(col); }
  [[nodiscard]] Range range(Col col) const { return honest(x.printed(col)); }
  [[nodiscard]] double value(Col col) const { return x.printed(col).value; }
  [[nodiscard]] std::string_view text(Col col) const { return x.facts().text(col); }
  void report(std::string_view rule, Grade grade, std::string what, std::string remedy) const;
};

/// The table as the rules across rows see it.
struct TableView {
  const Table& table;
  std::span<const Study> studies;
  std::vector<Finding>& findings;

  void report(std::string_view rule, std::size_t row, std::vector<std::size_t> others, std::string what,
              std::string remedy) const;
};

struct Rule {
  RuleInfo info;
  void (*within)(const RowView&) = nullptr;  ///< one of the two
  void (*across)(const TableView&) = nullptr;
};

[[nodiscard]] std::span<const Rule> registry();

// Rules within a row.
Rule rule_p();
Rule rule_one_tailed();
Rule rule_p_side();
Rule rule_t_f();
Rule rule_means();
Rule rule_difference();
Rule rule_d();
Rule rule_d_means();
Rule rule_r();
Rule rule_interval();
Rule rule_interval_middle();
Rule rule_df();
Rule rule_welch_df();
Rule rule_sign();
Rule rule_grim();
Rule rule_sd_integers();
Rule rule_scale();
Rule rule_se_for_sd();
Rule rule_words();
// Rules across rows.
Rule rule_same_test();
Rule rule_same_label();
Rule rule_label_case();
Rule rule_far();

}  // namespace steelyard::auditing
