#include "audit/effect.hpp"

#include <cmath>

#include "rebuild/scores.hpp"

namespace steelyard::auditing {

namespace {

double scores_df(const RowView& row) { return row.frame->people - (is_two_groups(row) ? 2.0 : 1.0); }

// J, exact or by the usual approximation, of the df that follow from the sizes or of the printed ones.
Range small_sample_factor(const RowView& row) {
  Range factor{1.0, 1.0};
  bool first = true;
  for (const double df : {scores_df(row), row.frame->df}) {
    if (!(df > 1.0)) continue;
    for (const double j :
         {hedges_j(df), 1.0 - 3.0 / (4.0 * df - 1.0), 1.0 - 3.0 / (4.0 * (df + 2.0) - 1.0)}) {
      factor = first ? Range{j, j} : join(factor, {j, j});
      first = false;
    }
  }
  return factor;
}

void add(const RowView& row, std::vector<Range>& to, const Range& d) {
  to.push_back(d);
  if (!row.frame) return;
  const Range factor = small_sample_factor(row);
  if (factor.low > 0.0) to.push_back({d.low * factor.low, d.high * factor.high});
}

// Ratio of the pooled d to Welch's t over all ratios of variances.
Range welch_factor(double n1, double n2) {
  const double only1 = std::sqrt((n1 + n2 - 2.0) / (n1 * (n1 - 1.0)));
  const double only2 = std::sqrt((n1 + n2 - 2.0) / (n2 * (n2 - 1.0)));
  return {std::min(only1, only2), std::max(only1, only2)};
}

void two_groups_from_test(const RowView& row, const Range& t, std::vector<Range>& to) {
  const double people = row.frame->people;
  add(row, to, times(t, 1.0 / std::sqrt(row.frame->n_scores)));
  add(row, to, times(t, 2.0 / std::sqrt(row.frame->df)));
  add(row, to, times(t, 2.0 / std::sqrt(people)));
  if (!row.has(Col::n1) || !row.has(Col::n2)) {
    // Only a total: anything from an even split to 1:9.
    add(row, to, {2.0 / std::sqrt(people) * t.low, 10.0 / (3.0 * std::sqrt(people)) * t.high});
    return;
  }
  const bool student =
      row.x.facts().word(Col::welch) == "no" || (row.has(Col::df) && row.value(Col::df) == people - 2.0);
  if (student) return;
  const double n1 = row.value(Col::n1);
  const double n2 = row.value(Col::n2);
  if (n1 < 2.0 || n2 < 2.0 || n1 == n2) return;
  const Range factor = welch_factor(n1, n2);
  add(row, to, {t.low * factor.low, t.high * factor.high});
}

Range quotient(const Range& diff, const Range& sd) {
  return size(
      over(std::array<Range, 2>{diff, sd}, [](const std::array<double, 2>& v) { return v[0] / v[1]; }));
}

void two_sds(const RowView& row, const Range& diff, const Range& a, const Range& b, std::vector<Range>& to) {
  add(row, to, quotient(diff, a));
  add(row, to, quotient(diff, b));
  add(row, to, quotient(diff, {(a.low + b.low) / 2.0, (a.high + b.high) / 2.0}));
  const auto root_mean_square = [](double x, double y) { return std::sqrt((x * x + y * y) / 2.0); };
  add(row, to, quotient(diff, {root_mean_square(a.low, b.low), root_mean_square(a.high, b.high)}));
  if (!row.has(Col::n1) || !row.has(Col::n2) || !is_two_groups(row)) return;
  const double n1 = row.value(Col::n1);
  const double n2 = row.value(Col::n2);
  const Range pooled{rebuilding::pooled_sd(a.low, n1, b.low, n2),
                     rebuilding::pooled_sd(a.high, n1, b.high, n2)};
  add(row, to, quotient(diff, pooled));
  add(row, to, quotient(diff, times(pooled, std::sqrt((n1 + n2 - 2.0) / (n1 + n2)))));
}

}  // namespace

std::vector<Range> effects_from_test(const RowView& row, const Source& test) {
  std::vector<Range> found;
  if (!row.frame) return found;
  const Range t = size(test.t);
  if (is_two_groups(row)) {
    two_groups_from_test(row, t, found);
    return found;
  }
  const Range by_differences = times(t, 1.0 / std::sqrt(row.frame->n_scores));
  add(row, found, by_differences);
  if (!is_pairs(row)) return found;
  // By the SD of the scores: times √(2(1 − r)), which is anything below 2 while r is not known.
  Range ratio{0.0, 2.0};
  if (row.has(Col::r_pair)) {
    const Range r = row.range(Col::r_pair);
    ratio = {std::sqrt(2.0 * std::max(1.0 - r.high, 0.0)), std::sqrt(2.0 * (1.0 - r.low))};
  }
  add(row, found, {by_differences.low * ratio.low, by_differences.high * ratio.high});
  return found;
}

std::vector<Range> effects_from_scores(const RowView& row) {
  std::vector<Range> found;
  const auto diff = difference(row);
  if (!diff) return found;
  if (row.has(Col::sd_diff)) add(row, found, quotient(*diff, row.range(Col::sd_diff)));
  const auto a = sd_of(row, 1);
  const auto b = sd_of(row, 2);
  if (a && b) two_sds(row, *diff, *a, *b, found);
  if (a && !b && row.design == Design::one_sample) add(row, found, quotient(*diff, *a));
  if (!is_pairs(row)) return found;
  if (const auto t = from_means(row)) {
    for (const Range& d : effects_from_test(row, *t)) found.push_back(d);
  } else if (const auto test = printed_test(row)) {
    for (const Range& d : effects_from_test(row, *test)) found.push_back(d);
  } else {
    // The SD of differences is somewhere between |s1 − s2| and s1 + s2.
    if (a && b) found.push_back({size(*diff).low / (a->high + b->high), infinity});
  }
  return found;
}

Range hull(const std::vector<Range>& ranges) {
  Range all{infinity, -infinity};
  for (const Range& range : ranges) all = join(all, range);
  return all;
}

bool meets_any(const Range& range, const std::vector<Range>& ranges) {
  return std::any_of(ranges.begin(), ranges.end(), [&](const Range& other) { return meet(range, other); });
}

}  // namespace steelyard::auditing
