// An estimate that doesn't lie in the middle of its interval, or not even inside it.
#include <fmt/format.h>

#include <cmath>

#include "audit/statistic.hpp"
#include "rebuild/intervals.hpp"

namespace steelyard::auditing {

namespace {

constexpr std::string_view id = "estimate-against-interval";

using rebuilding::CiOf;

// The cell that the interval belongs to. Intervals of d, g, r and correlations needn't be symmetric.
struct Estimate {
  Col col;
  bool symmetric;
  bool log_scale = false;
};
std::optional<Estimate> estimate_of(const RowView& row) {
  switch (rebuilding::ci_of(row.x)) {
    case CiOf::difference:
      return Estimate{Col::mean_diff, true};
    case CiOf::mean:
      return Estimate{Col::mean1, true};
    case CiOf::d:
      return Estimate{Col::d, false};
    case CiOf::g:
      return Estimate{Col::g, false};
    case CiOf::r:
      return Estimate{Col::r, false};
    case CiOf::correlation:
      return Estimate{Col::correlation, false};
    case CiOf::odds_ratio:
      return Estimate{Col::odds_ratio, true, true};
    case CiOf::estimate:
      // Estimates of other metrics may be printed on a curved scale.
      return Estimate{Col::estimate, false};
    case CiOf::none:
      break;
  }
  return std::nullopt;
}

Range middle(const RowView& row, bool log_scale) {
  const std::array<Range, 2> ends = {row.range(Col::ci_low), row.range(Col::ci_high)};
  if (!log_scale) return over(ends, [](const std::array<double, 2>& v) { return (v[0] + v[1]) / 2.0; });
  return over(ends, [](const std::array<double, 2>& v) { return std::sqrt(std::max(v[0], 0.0) * v[1]); });
}

void check(const RowView& row) {
  const auto estimate = estimate_of(row);
  if (!estimate || !row.has(estimate->col)) return;
  const Range printed = row.range(estimate->col);
  const Range inside{row.range(Col::ci_low).low, row.range(Col::ci_high).high};
  const std::string interval = fmt::format("{} to {}", row.text(Col::ci_low), row.text(Col::ci_high));
  if (!meet(printed, inside)) {
    row.report(id, Grade::impossible,
               fmt::format("{} = {} lies outside its own interval, {}.", name(estimate->col),
                           row.text(estimate->col), interval),
               "Check the estimate, its sign and both ends; say in `ci_of` what the interval belongs to.");
    return;
  }
  const Range center = middle(row, estimate->log_scale);
  if (!estimate->symmetric || meet(printed, center)) return;
  row.report(
      id, Grade::worth_a_look,
      fmt::format("{} = {} is not in the middle of its interval, {}, which is {:.4g} to {:.4g}.",
                  name(estimate->col), row.text(estimate->col), interval, center.low, center.high),
      "Check the estimate and both ends; intervals by bootstrap or on another scale need not be symmetric.");
}

}  // namespace

Rule rule_interval_middle() {
  return {
      {id, "an estimate lies inside its interval, and a mean difference in its middle", "common practice"},
      check};
}

}  // namespace steelyard::auditing
