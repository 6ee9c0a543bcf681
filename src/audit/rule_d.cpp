// d or g against the test, where no SDs are printed.
#include <fmt/format.h>

#include <cmath>

#include "audit/effect.hpp"

namespace steelyard::auditing {

namespace {

constexpr std::string_view id = "d-against-test";

// The least d by one group's SD: that SD is at most √((N − 2)/(n − 1)) times the pooled one.
double least_by_one_group(const RowView& row, double pooled) {
  if (!row.has(Col::n1) || !row.has(Col::n2)) return 0.0;
  const double least = std::min(row.value(Col::n1), row.value(Col::n2));
  return pooled * std::sqrt(std::max(least - 1.0, 0.0) / (row.value(Col::n1) + row.value(Col::n2) - 2.0));
}

void check_one(const RowView& row, const Source& test, Col col) {
  if (!row.has(col)) return;
  const auto expected = effects_from_test(row, test);
  const Range printed = size(row.range(col));
  if (expected.empty() || meets_any(printed, expected)) return;
  const Range all = hull(expected);
  const bool too_small = is_two_groups(row) && !may_be_of_larger_analysis(row) &&
                         printed.high < least_by_one_group(row, all.low);
  const bool too_large = !is_two_groups(row) && printed.low > all.high;
  row.report(id, too_small || too_large ? Grade::impossible : Grade::worth_a_look,
             fmt::format(
                 "{} gives |{}| between {:.3g} and {:.3g} by the usual definitions, but it is printed as {}.",
                 test.words, name(col), all.low, all.high, row.text(col)),
             "Check the effect size and the test; by the SD of one group it may honestly differ.");
}

void check(const RowView& row) {
  const auto test = printed_test(row);
  if (!test || !effects_from_scores(row).empty()) return;
  check_one(row, *test, Col::d);
  check_one(row, *test, Col::g);
}

}  // namespace

Rule rule_d() {
  return {{id, "d or g follows from t or F and the sizes", "Borenstein et al. (2009), ch. 4; Hedges (1981)"},
          check};
}

}  // namespace steelyard::auditing
