// A fractional df against the SDs and sizes.
#include <fmt/format.h>

#include <cmath>

#include "audit/statistic.hpp"

namespace steelyard::auditing {

namespace {

constexpr std::string_view id = "welch-df-against-sds";

// Satterthwaite's df for shares u and 1−u of the variance of the difference.
double df_at(double u, double n1, double n2) {
  return 1.0 / (u * u / (n1 - 1.0) + (1.0 - u) * (1.0 - u) / (n2 - 1.0));
}

void check(const RowView& row) {
  if (!is_two_groups(row) || !row.has(Col::df) || !row.has(Col::n1) || !row.has(Col::n2)) return;
  const double df = row.value(Col::df);
  const auto a = sd_of(row, 1);
  const auto b = sd_of(row, 2);
  if (df == std::floor(df) || !a || !b) return;
  const double n1 = row.value(Col::n1);
  const double n2 = row.value(Col::n2);
  if (n1 < 2.0 || n2 < 2.0) return;
  const auto share = [&](double s1, double s2) {
    const double v1 = s1 * s1 / n1;
    return v1 / (v1 + s2 * s2 / n2);
  };
  const Range u{share(a->low, b->high), share(a->high, b->low)};
  Range expected{std::min(df_at(u.low, n1, n2), df_at(u.high, n1, n2)),
                 std::max(df_at(u.low, n1, n2), df_at(u.high, n1, n2))};
  // The df has its greatest value where u = (n1−1)/(n1+n2−2).
  const double best = (n1 - 1.0) / (n1 + n2 - 2.0);
  if (u.low < best && best < u.high) expected.high = n1 + n2 - 2.0;
  if (meet(row.range(Col::df), expected)) return;
  row.report(id, Grade::impossible,
             fmt::format("The SDs and sizes give Welch's test {:.4g} to {:.4g} df, but df is printed as {}.",
                         expected.low, expected.high, row.text(Col::df)),
             "Check df, the SDs and the sizes.");
}

}  // namespace

Rule rule_welch_df() {
  return {{id, "a fractional df of two groups is Welch's, by the SDs and sizes",
           "Welch (1947); Satterthwaite (1946)"},
          check};
}

}  // namespace steelyard::auditing
