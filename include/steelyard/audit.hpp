// Room "audit": do the printed numbers agree with each other?
#pragma once

#include <cstddef>
#include <span>
#include <string>
#include <string_view>
#include <vector>

#include "steelyard/base.hpp"
#include "steelyard/read.hpp"
#include "steelyard/rebuild.hpp"
#include "steelyard/study.hpp"

namespace steelyard {

enum class Grade { worth_a_look, changes_the_verdict, impossible };
[[nodiscard]] std::string_view to_text(Grade grade);  ///< "worth a look", ...

/// One disagreement that rounding can't explain, or an oddity.
struct Finding {
  std::string rule;  ///< id of the rule, kebab-case
  Grade grade = Grade::worth_a_look;
  std::size_t row = 0;              ///< index into Table::rows
  std::vector<std::size_t> others;  ///< further rows concerned
  std::string what;                 ///< a sentence with the numbers, printed and recomputed
  std::string remedy;               ///< what to check in the paper
};

/// One audit rule; the registry lists them in the order of the documentation.
struct RuleInfo {
  std::string_view id;
  std::string_view checks;  ///< one line
  std::string_view source;
};
[[nodiscard]] std::span<const RuleInfo> audit_rules();

/// All findings, by row. `studies` are the rebuilt rows (a row that couldn't be rebuilt is audited too).
[[nodiscard]] std::vector<Finding> audit(const Table& table, std::span<const Study> studies,
                                         const RebuildOptions& options = {});

}  // namespace steelyard
