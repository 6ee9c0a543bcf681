#include "audit/statistic.hpp"

#include <fmt/format.h>

#include <cmath>

#include "rebuild/groups.hpp"
#include "rebuild/intervals.hpp"
#include "rebuild/scores.hpp"
#include "rebuild/student.hpp"

namespace steelyard::auditing {

namespace {

bool several_groups(const RowView& row) {
  return row.x.present(Col::compare) || rebuilding::has_third_group(row.x) ||
         row.x.present(Col::baseline_mean1);
}

std::optional<rebuilding::Sizes> sizes(const RowView& row) {
  if (!row.has(Col::n1) || !row.has(Col::n2)) return std::nullopt;
  return rebuilding::Sizes{row.value(Col::n1), row.value(Col::n2)};
}

std::optional<double> single_n(const RowView& row) {
  if (row.has(Col::n)) return row.value(Col::n);
  if (row.has(Col::n1)) return row.value(Col::n1);
  return std::nullopt;
}

std::optional<Range> two_group_t(const RowView& row, const Range& diff) {
  const auto n = sizes(row);
  const auto a = sd_of(row, 1);
  const auto b = sd_of(row, 2);
  if (!n || !a || !b || n->n1 < 2.0 || n->n2 < 2.0) return std::nullopt;
  const std::array<Range, 3> box = {diff, *a, *b};
  const Range student = over(box, [&](const std::array<double, 3>& v) {
    return v[0] / (rebuilding::pooled_sd(v[1], n->n1, v[2], n->n2) * std::sqrt(1.0 / n->n1 + 1.0 / n->n2));
  });
  const Range welch = over(box, [&](const std::array<double, 3>& v) {
    return v[0] / std::sqrt(v[1] * v[1] / n->n1 + v[2] * v[2] / n->n2);
  });
  return join(student, welch);
}

// Of pairs: exact with the SD of differences or the correlation; without, the least spread of differences is
// |s1 − s2|.
std::optional<Range> paired_t(const RowView& row, const Range& diff) {
  const auto n = single_n(row);
  if (!n) return std::nullopt;
  const double root = std::sqrt(*n);
  if (row.has(Col::sd_diff)) {
    return over(std::array<Range, 2>{diff, row.range(Col::sd_diff)},
                [&](const std::array<double, 2>& v) { return v[0] / v[1] * root; });
  }
  const auto a = sd_of(row, 1);
  const auto b = sd_of(row, 2);
  if (!a || !b || !row.has(Col::r_pair)) return std::nullopt;
  return over(std::array<Range, 4>{diff, *a, *b, row.range(Col::r_pair)},
              [&](const std::array<double, 4>& v) {
                return v[0] / rebuilding::sd_of_differences(v[1], v[2], v[3]) * root;
              });
}

std::optional<Range> one_sample_t(const RowView& row, const Range& diff) {
  const auto n = single_n(row);
  const auto sd = row.has(Col::sd_diff) && row.has(Col::mean_diff) ? std::optional(row.range(Col::sd_diff))
                                                                   : sd_of(row, 1);
  if (!n || !sd) return std::nullopt;
  return over(std::array<Range, 2>{diff, *sd},
              [&](const std::array<double, 2>& v) { return v[0] / v[1] * std::sqrt(*n); });
}

}  // namespace

bool is_pairs(const RowView& row) { return row.design == Design::paired; }
bool is_two_groups(const RowView& row) { return row.design == Design::two_groups; }

std::optional<Range> sd_of(const RowView& row, int group) {
  const bool first = group == 1;
  const Col sd = first ? Col::sd1 : Col::sd2;
  if (row.has(sd)) return row.range(sd);
  const Col se = first ? Col::se1 : Col::se2;
  const Col size = first ? Col::n1 : Col::n2;
  const auto n = row.has(size) && is_two_groups(row) ? std::optional(row.value(size)) : single_n(row);
  if (!row.has(se) || !n) return std::nullopt;
  return times(row.range(se), std::sqrt(*n));
}

std::optional<Range> difference(const RowView& row) {
  if (several_groups(row)) return std::nullopt;
  if (row.has(Col::mean1) && row.has(Col::mean2)) {
    const Range a = row.range(Col::mean1);
    const Range b = row.range(Col::mean2);
    return Range{a.low - b.high, a.high - b.low};
  }
  if (row.has(Col::mean_diff)) return row.range(Col::mean_diff);
  if (row.design != Design::one_sample || !row.has(Col::mean1)) return std::nullopt;
  const double mu0 = row.has(Col::mu0) ? row.value(Col::mu0) : 0.0;
  const Range mean = row.range(Col::mean1);
  return Range{mean.low - mu0, mean.high - mu0};
}

std::optional<Source> printed_test(const RowView& row) {
  if (row.has(Col::t)) return Source{fmt::format("t = {}", row.text(Col::t)), row.range(Col::t), false};
  if (!row.has(Col::f) || (row.has(Col::df1) && row.value(Col::df1) != 1.0)) return std::nullopt;
  const Range f = row.range(Col::f);
  return Source{fmt::format("F = {}", row.text(Col::f)),
                {std::sqrt(std::max(f.low, 0.0)), std::sqrt(std::max(f.high, 0.0))},
                true};
}

std::optional<Source> from_means(const RowView& row) {
  const auto diff = difference(row);
  if (!diff || !row.design) return std::nullopt;
  const auto t = is_two_groups(row) ? two_group_t(row, *diff)
                 : is_pairs(row)    ? paired_t(row, *diff)
                                    : one_sample_t(row, *diff);
  if (!t) return std::nullopt;
  return Source{"the means and SDs", *t, false};
}

std::optional<Source> from_se(const RowView& row) {
  const auto diff = difference(row);
  if (!diff || !row.has(Col::se_diff)) return std::nullopt;
  const Range t = over(std::array<Range, 2>{*diff, row.range(Col::se_diff)},
                       [](const std::array<double, 2>& v) { return v[0] / v[1]; });
  return Source{"the difference and its SE", t, false};
}

std::optional<Source> from_interval(const RowView& row) {
  const rebuilding::CiOf of = rebuilding::ci_of(row.x);
  if (of != rebuilding::CiOf::difference && of != rebuilding::CiOf::mean) return std::nullopt;
  const auto df = dfs(row);
  if (!df || several_groups(row)) return std::nullopt;
  const Range low = row.range(Col::ci_low);
  const Range high = row.range(Col::ci_high);
  const double mu0 = of == rebuilding::CiOf::mean && row.has(Col::mu0) ? row.value(Col::mu0) : 0.0;
  const double tail = (1.0 - rebuilding::ci_level(row.x)) / 2.0;
  // Critical values from the largest that the df allow down to z.
  const Range critical{rebuilding::upper_z(tail), rebuilding::upper_t(tail, std::max(df->range.low, 1.0))};
  const Range t = over(std::array<Range, 3>{low, high, critical}, [&](const std::array<double, 3>& v) {
    return ((v[0] + v[1]) / 2.0 - mu0) / ((v[1] - v[0]) / 2.0) * v[2];
  });
  return Source{fmt::format("the interval from {} to {}", row.text(Col::ci_low), row.text(Col::ci_high)), t,
                false};
}

std::optional<Dfs> dfs(const RowView& row) {
  if (row.has(Col::df)) {
    const double df = row.value(Col::df);
    const Range range = row.range(Col::df);
    const bool expected = row.frame && df == row.frame->people - (is_two_groups(row) ? 2.0 : 1.0);
    return Dfs{expected ? Range{df, df} : Range{std::max(range.low, 0.5), range.high}, true};
  }
  if (!row.frame) return std::nullopt;
  const auto n = sizes(row);
  const double least = is_two_groups(row) && n && !(row.x.facts().word(Col::welch) == "no")
                           ? std::min(n->n1, n->n2) - 1.0
                           : row.frame->df;
  return Dfs{{std::max(std::min(least, row.frame->df), 1.0), row.frame->df}, false};
}

bool may_be_of_larger_analysis(const RowView& row) {
  if (several_groups(row) || row.x.present(Col::covariates) || row.x.present(Col::covariate_r)) return true;
  if (!row.frame || !row.has(Col::df)) return false;
  const double expected = row.frame->people - (is_two_groups(row) ? 2.0 : 1.0);
  const double df = row.value(Col::df);
  return df == std::floor(df) && df != expected;
}

}  // namespace steelyard::auditing
