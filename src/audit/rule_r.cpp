// The point-biserial r against t and df.
#include <fmt/format.h>

#include <cmath>

#include "audit/statistic.hpp"

namespace steelyard::auditing {

namespace {

constexpr std::string_view id = "r-against-test";

void check(const RowView& row) {
  const auto test = printed_test(row);
  const auto df = dfs(row);
  if (!row.has(Col::r) || !test || !df) return;
  const Range expected =
      over(std::array<Range, 2>{size(test->t), df->range},
           [](const std::array<double, 2>& v) { return v[0] / std::sqrt(v[0] * v[0] + v[1]); });
  if (meet(size(row.range(Col::r)), expected)) return;
  row.report(id, df->firm ? Grade::impossible : Grade::worth_a_look,
             fmt::format("{} gives |r| between {:.3g} and {:.3g}, but r is printed as {}.", test->words,
                         expected.low, expected.high, row.text(Col::r)),
             "Check r, the test and its df.");
}

}  // namespace

Rule rule_r() { return {{id, "r = t/√(t² + df)", "Tate (1954)"}, check}; }

}  // namespace steelyard::auditing
