// A one-tailed p printed as if it were two-tailed, or the other way round.
#include <fmt/format.h>

#include "audit/p_of_t.hpp"

namespace steelyard::auditing {

namespace {

constexpr std::string_view id = "one-tailed-p";

void check(const RowView& row) {
  const auto p = printed_p(row);
  if (!p) return;
  const auto implied = implied_p(row);
  if (!implied) return;
  const bool one = says_one_tailed(row);
  const Range& expected = one ? implied->one_tailed : implied->two_tailed;
  const Range& other = one ? implied->two_tailed : implied->one_tailed;
  if (meet(*p, expected) || !meet(*p, other)) return;
  row.report(
      id, Grade::worth_a_look,
      fmt::format("p = {} is the {} p of {}; the {} p is {} to {}.", words_of_p(row),
                  one ? "two-tailed" : "one-tailed", implied->words, one ? "one-tailed" : "two-tailed",
                  short_p(expected.low), short_p(expected.high)),
      one ? "Set `tails` to 2 if the paper's p is two-tailed."
          : "Check whether the paper announced a one-tailed test; if it did, set `tails` to 1 and `sign`.");
}

}  // namespace

Rule rule_one_tailed() {
  return {{id, "p is not the half, or the double, of what its tails say", "common practice"}, check};
}

}  // namespace steelyard::auditing
