// p against the test statistic and its df.
#include <fmt/format.h>

#include "audit/p_of_t.hpp"

namespace steelyard::auditing {

namespace {

constexpr std::string_view id = "p-against-test";

void check(const RowView& row) {
  const auto p = printed_p(row);
  if (!p) return;
  const auto implied = implied_p(row);
  if (!implied) return;
  const Range& expected = says_one_tailed(row) ? implied->one_tailed : implied->two_tailed;
  if (meet(*p, expected)) return;
  // One tail printed as two, and the other way round, have a rule of their own.
  if (meet(*p, says_one_tailed(row) ? implied->two_tailed : implied->one_tailed)) return;
  const bool firm = row.has(Col::t) || row.has(Col::f) || !may_be_of_larger_analysis(row);
  row.report(id, firm ? Grade::impossible : Grade::worth_a_look,
             fmt::format("{} gives p between {} and {}, but p is printed as {}.", implied->words,
                         short_p(expected.low), short_p(expected.high), words_of_p(row)),
             "Check the test statistic, its df and p for slips of single digits.");
}

}  // namespace

Rule rule_p() {
  return {{id, "p follows from t or F and df (from means, SE or interval where no test is printed)",
           "Student (1908)"},
          check};
}

}  // namespace steelyard::auditing
