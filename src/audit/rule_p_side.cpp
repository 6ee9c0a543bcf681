// A p on the other side of .05 than the p that the row's own numbers give.
#include <fmt/format.h>

#include "audit/p_of_t.hpp"

namespace steelyard::auditing {

namespace {

constexpr std::string_view id = "p-changes-side";
constexpr double line = 0.05;

void check(const RowView& row) {
  const auto p = printed_p(row);
  if (!p) return;
  const auto implied = implied_p(row);
  if (!implied) return;
  const Range& expected = says_one_tailed(row) ? implied->one_tailed : implied->two_tailed;
  if (meet(*p, expected)) return;
  const bool loses = p->high <= line && expected.low > line;
  const bool gains = p->low >= line && expected.high < line;
  if (!loses && !gains) return;
  row.report(id, Grade::changes_the_verdict,
             fmt::format("p is printed as {}, but {} gives {} to {}: on the other side of .05.",
                         words_of_p(row), implied->words, short_p(expected.low), short_p(expected.high)),
             "Check which of the numbers the paper's conclusion rests on.");
}

}  // namespace

Rule rule_p_side() {
  return {{id, "p is on the same side of .05 as the p recomputed", "common practice"}, check};
}

}  // namespace steelyard::auditing
