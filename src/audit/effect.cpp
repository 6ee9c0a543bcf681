#include "audit/effect.hpp"

#include <cmath>

#include "rebuild/scores.hpp"

namespace steelyard::auditing {

namespace {

// Exact J and the usual approximation 1 − 3/(4·df − 1) differ in the third digit at small df only.
void add(std::vector<Range>& to, const Range& d, double df) {
  to.push_back(d);
  if (!(df > 1.0)) return;
  const double exact = hedges_j(df);
  const double usual = 1.0 - 3.0 / (4.0 * df - 1.0);
  const double by_n = 1.0 - 3.0 / (4.0 * (df + 2.0) - 1.0);
  to.push_back(join(times(d, std::min({exact, usual, by_n})), times(d, std::max({exact, usual, by_n}))));
}

double df_of(const RowView& row) { return row.frame ? row.frame->df : 0.0; }

// Ratio of the pooled d to Welch's t over all ratios of variances.
Range welch_factor(double n1, double n2) {
  const double only1 = std::sqrt((n1 + n2 - 2.0) / (n1 * (n1 - 1.0)));
  const double only2 = std::sqrt((n1 + n2 - 2.0) / (n2 * (n2 - 1.0)));
  return {std::min(only1, only2), std::max(only1, only2)};
}

void two_groups_from_test(const RowView& row, const Range& t, std::vector<Range>& to) {
  const double df = df_of(row);
  const double people = row.frame->people;
  add(to, times(t, 1.0 / std::sqrt(row.frame->n_scores)), df);
  add(to, times(t, 2.0 / std::sqrt(df)), df);
  add(to, times(t, 2.0 / std::sqrt(people)), df);
  const bool student =
      row.x.facts().word(Col::welch) == "no" || (row.has(Col::df) && row.value(Col::df) == people - 2.0);
  if (student || !row.has(Col::n1) || !row.has(Col::n2)) return;
  const double n1 = row.value(Col::n1);
  const double n2 = row.value(Col::n2);
  if (n1 < 2.0 || n2 < 2.0 || n1 == n2) return;
  const Range factor = welch_factor(n1, n2);
  add(to, {t.low * factor.low, t.high * factor.high}, df);
}

Range quotient(const Range& diff, const Range& sd) {
  return size(
      over(std::array<Range, 2>{diff, sd}, [](const std::array<double, 2>& v) { return v[0] / v[1]; }));
}

void two_sds(const RowView& row, const Range& diff, const Range& a, const Range& b, std::vector<Range>& to) {
  const double df = df_of(row);
  add(to, quotient(diff, a), df);
  add(to, quotient(diff, b), df);
  add(to, quotient(diff, {(a.low + b.low) / 2.0, (a.high + b.high) / 2.0}), df);
  const auto root_mean_square = [](double x, double y) { return std::sqrt((x * x + y * y) / 2.0); };
  add(to, quotient(diff, {root_mean_square(a.low, b.low), root_mean_square(a.high, b.high)}), df);
  if (!row.has(Col::n1) || !row.has(Col::n2) || !is_two_groups(row)) return;
  const double n1 = row.value(Col::n1);
  const double n2 = row.value(Col::n2);
  const Range pooled{rebuilding::pooled_sd(a.low, n1, b.low, n2),
                     rebuilding::pooled_sd(a.high, n1, b.high, n2)};
  add(to, quotient(diff, pooled), df);
  add(to, quotient(diff, times(pooled, std::sqrt((n1 + n2 - 2.0) / (n1 + n2)))), df);
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
  add(found, by_differences, row.frame->df);
  if (!is_pairs(row)) return found;
  // By the SD of the scores: times √(2(1 − r)), which is anything below 2 while r is not known.
  Range ratio{0.0, 2.0};
  if (row.has(Col::r_pair)) {
    const Range r = row.range(Col::r_pair);
    ratio = {std::sqrt(2.0 * std::max(1.0 - r.high, 0.0)), std::sqrt(2.0 * (1.0 - r.low))};
  }
  add(found, {by_differences.low * ratio.low, by_differences.high * ratio.high}, row.frame->df);
  return found;
}

std::vector<Range> effects_from_scores(const RowView& row) {
  std::vector<Range> found;
  const auto diff = difference(row);
  if (!diff) return found;
  if (row.has(Col::sd_diff)) add(found, quotient(*diff, row.range(Col::sd_diff)), df_of(row));
  const auto a = sd_of(row, 1);
  const auto b = sd_of(row, 2);
  if (a && b) two_sds(row, *diff, *a, *b, found);
  if (a && !b && row.design == Design::one_sample) add(found, quotient(*diff, *a), df_of(row));
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
