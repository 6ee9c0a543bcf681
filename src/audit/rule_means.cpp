// The printed t or F against the one that means and SDs (or the difference and its SE) give.
#include <fmt/format.h>

#include "audit/statistic.hpp"

namespace steelyard::auditing {

namespace {

constexpr std::string_view id = "test-against-means";

void compare(const RowView& row, const Source& test, const Source& other) {
  const Range expected = size(other.t);
  if (meet(size(test.t), expected)) return;
  // Without its df nobody can tell which analysis the test came from.
  const bool firm = row.has(Col::df);
  row.report(id, firm ? Grade::impossible : Grade::worth_a_look,
             fmt::format("{} give |t| between {:.3g} and {:.3g}, but the paper prints {}.", other.words,
                         expected.low, expected.high, test.words),
             "Check means, SDs, sizes and the test for slips; SEs printed as SDs are common.");
}

void check(const RowView& row) {
  const auto test = printed_test(row);
  // The test of an adjusted or factorial analysis has another error term than the groups' own SDs.
  if (!test || may_be_of_larger_analysis(row)) return;
  if (const auto means = from_means(row)) compare(row, *test, *means);
  if (const auto se = from_se(row)) compare(row, *test, *se);
}

}  // namespace

Rule rule_means() {
  return {{id, "t or F follows from the means, SDs and sizes, Student's or Welch's",
           "Student (1908); Welch (1938)"},
          check};
}

}  // namespace steelyard::auditing
