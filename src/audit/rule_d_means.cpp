// d or g against means and SDs.
#include <fmt/format.h>

#include "audit/effect.hpp"

namespace steelyard::auditing {

namespace {

constexpr std::string_view id = "d-against-means";

void check_one(const RowView& row, Col col) {
  if (!row.has(col)) return;
  const auto expected = effects_from_scores(row);
  if (expected.empty() || meets_any(size(row.range(col)), expected)) return;
  const Range all = hull(expected);
  row.report(
      id, may_be_of_larger_analysis(row) ? Grade::worth_a_look : Grade::impossible,
      fmt::format(
          "The means and SDs give |{}| between {:.3g} and {:.3g}, by whichever SD, but it is printed as {}.",
          name(col), all.low, all.high, row.text(col)),
      "Check the effect size, the means and the SDs; SEs printed as SDs are common.");
}

void check(const RowView& row) {
  check_one(row, Col::d);
  check_one(row, Col::g);
}

}  // namespace

Rule rule_d_means() {
  return {
      {id,
       "d or g follows from means and SDs: pooled, one group's, averaged, of differences; with or without J",
       "Borenstein et al. (2009), ch. 4"},
      check};
}

}  // namespace steelyard::auditing
