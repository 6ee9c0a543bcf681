// The interval of the difference against the test, or against means and SDs where no test is printed.
#include <fmt/format.h>

#include "audit/statistic.hpp"

namespace steelyard::auditing {

namespace {

constexpr std::string_view id = "interval-against-test";

void check(const RowView& row) {
  const auto interval = from_interval(row);
  if (!interval) return;
  auto other = printed_test(row);
  if (!other) other = from_se(row);
  if (!other) other = from_means(row);
  if (!other || meet(size(interval->t), size(other->t))) return;
  const Range t = size(interval->t);
  row.report(
      id, may_be_of_larger_analysis(row) ? Grade::worth_a_look : Grade::impossible,
      fmt::format("{} means |t| between {:.3g} and {:.3g}, but {} says {:.3g} to {:.3g}.", interval->words,
                  t.low, t.high, other->words, size(other->t).low, size(other->t).high),
      "Check both ends of the interval, and its level.");
}

}  // namespace

Rule rule_interval() {
  return {{id, "the interval of the difference (by t or z) fits the test, or the means and SDs",
           "Cochrane Handbook 5.1, 7.7.3.3"},
          check};
}

}  // namespace steelyard::auditing
