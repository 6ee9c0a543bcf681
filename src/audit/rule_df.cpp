// Printed df against the sizes.
#include <fmt/format.h>

#include <cmath>

#include "audit/statistic.hpp"

namespace steelyard::auditing {

namespace {

constexpr std::string_view id = "df-against-sizes";

struct Limits {
  double least_fractional, most;
  std::string_view rule;
};

std::optional<Limits> limits(const RowView& row) {
  if (row.x.present(Col::compare) || row.has(Col::n3)) return std::nullopt;
  if (row.has(Col::df1) && row.value(Col::df1) != 1.0) return std::nullopt;
  if (is_two_groups(row)) {
    if (!row.has(Col::n1) || !row.has(Col::n2)) return std::nullopt;
    const double a = row.value(Col::n1);
    const double b = row.value(Col::n2);
    return Limits{std::min(a, b) - 1.0, a + b - 2.0, "n1 + n2 − 2"};
  }
  if (!row.design || !row.has(Col::n)) return std::nullopt;
  return Limits{row.value(Col::n) - 1.0, row.value(Col::n) - 1.0, "n − 1"};
}

void check(const RowView& row) {
  const auto limit = limits(row);
  if (!row.has(Col::df) || !limit) return;
  const double df = row.value(Col::df);
  const Range range = row.range(Col::df);
  if (range.low > limit->most && df > limit->most) {
    row.report(id, Grade::impossible,
               fmt::format("df is printed as {}, but the sizes leave only {} = {:g}.", row.text(Col::df),
                           limit->rule, limit->most),
               "Check df and the sizes; if the error term comes from more groups, give them all (n3, ...) "
               "and `compare`.");
    return;
  }
  const bool fractional = df != std::floor(df);
  if (fractional && range.high < limit->least_fractional) {
    row.report(
        id, Grade::impossible,
        fmt::format(
            "A fractional df of {} is below {:g}, the least that Welch's test can have with these sizes.",
            row.text(Col::df), limit->least_fractional),
        "Check df and the sizes.");
    return;
  }
  const bool of_welch = fractional || row.x.printed(Col::df).decimals > 0;
  if (of_welch || df >= limit->most / 2.0 || row.has(Col::covariates)) return;
  row.report(id, Grade::worth_a_look,
             fmt::format("df is printed as {}, less than half of {} = {:g}.", row.text(Col::df), limit->rule,
                         limit->most),
             "Check whether the test is of these groups, or of a part of them.");
}

}  // namespace

Rule rule_df() {
  return {
      {id,
       "df is n1 + n2 − 2 or n − 1, less in factorial designs, and for Welch's test at least min(n1, n2) − 1",
       "Student (1908); Welch (1947)"},
      check};
}

}  // namespace steelyard::auditing
