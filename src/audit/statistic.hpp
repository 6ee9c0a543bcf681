// The test statistic that a row's other numbers imply, over all that honest authors may have done.
#pragma once

#include <optional>
#include <string>
#include <vector>

#include "audit/rule.hpp"

namespace steelyard::auditing {

/// Values of t that one source allows, and how it is told: "t = 2.20", "the means and SDs".
struct Source {
  std::string words;
  Range t;
  bool is_sized = false;  ///< only |t| is known
};

/// The row's own test statistic: t, else the root of F(1, df).
[[nodiscard]] std::optional<Source> printed_test(const RowView& row);

/// t from the means with SDs or SEs, Student's and Welch's joined; pairs without a correlation bound it from
/// below only.
[[nodiscard]] std::optional<Source> from_means(const RowView& row);

/// t from the interval of the difference (t or z) with the difference, or its middle.
[[nodiscard]] std::optional<Source> from_interval(const RowView& row);

/// t from the difference and its SE.
[[nodiscard]] std::optional<Source> from_se(const RowView& row);

/// Mean 1 minus mean 2 (one sample: minus mu0), or mean_diff.
[[nodiscard]] std::optional<Range> difference(const RowView& row);

/// The df that the row's test may have had. `firm`: printed. Not printed: from Welch's least to Student's.
struct Dfs {
  Range range;
  bool firm = false;
};
[[nodiscard]] std::optional<Dfs> dfs(const RowView& row);

/// Whether the printed test may be of another analysis than the means' own t: adjusted, factorial (a df below
/// that of the sizes), or of several groups.
[[nodiscard]] bool may_be_of_larger_analysis(const RowView& row);

/// SD of group 1 or 2 from its SD, SE or interval cell.
[[nodiscard]] std::optional<Range> sd_of(const RowView& row, int group);
[[nodiscard]] bool is_pairs(const RowView& row);
[[nodiscard]] bool is_two_groups(const RowView& row);

}  // namespace steelyard::auditing
