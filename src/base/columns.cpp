// The one table of columns. A new column is one line here; the reader, the routes, the command's
// options, the documentation and the schema follow.
#include <algorithm>
#include <iterator>

#include "steelyard/base.hpp"

namespace steelyard {

namespace {

constexpr ColumnKind text = ColumnKind::text;
constexpr ColumnKind number = ColumnKind::number;
constexpr ColumnKind count = ColumnKind::count;
constexpr ColumnKind choice = ColumnKind::choice;

// clang-format off
constexpr Column table[] = {
    // what the row is about
    {"study", text, "label of the study", "", ""},
    {"year", count, "year of publication; orders the studies", "year", ""},
    {"role", choice, "whether the study is an original or a replication", "", "original|replication"},
    {"design", choice, "how the scores were gathered", "", "two_groups|one_sample|paired"},
    // group sizes
    {"n1", count, "size of group 1", "people", ""},
    {"n2", count, "size of group 2", "people", ""},
    {"n", count, "size of the one sample, or number of pairs", "people", ""},
    {"n_total", count, "size of both groups together, when only that is printed", "people", ""},
    // means and spreads of the groups
    {"mean1", number, "mean of group 1, of the one sample, or of the first of the paired scores", "raw", ""},
    {"sd1", number, "standard deviation that belongs to mean1", "raw", ""},
    {"se1", number, "standard error of mean1", "raw", ""},
    {"ci_low1", number, "lower limit of the confidence interval of mean1", "raw", ""},
    {"ci_high1", number, "upper limit of the confidence interval of mean1", "raw", ""},
    {"mean2", number, "mean of group 2, or of the second of the paired scores", "raw", ""},
    {"sd2", number, "standard deviation that belongs to mean2", "raw", ""},
    {"se2", number, "standard error of mean2", "raw", ""},
    {"ci_low2", number, "lower limit of the confidence interval of mean2", "raw", ""},
    {"ci_high2", number, "upper limit of the confidence interval of mean2", "raw", ""},
    {"mu0", number, "the mean that a one-sample test tests against; 0 when absent", "raw", ""},
    // a difference of means
    {"mean_diff", number, "group 1 minus group 2, or the mean of the difference scores", "raw", ""},
    {"sd_diff", number, "standard deviation of the difference scores", "raw", ""},
    {"se_diff", number, "standard error of mean_diff", "raw", ""},
    // an interval
    {"ci_low", number, "lower limit of a confidence interval", "", ""},
    {"ci_high", number, "upper limit of a confidence interval", "", ""},
    {"ci_level", number, "level of every confidence interval of the row; 0.95 when absent", "probability", ""},
    {"ci_of", choice, "what ci_low and ci_high enclose, when more than one of these is printed", "",
     "mean_diff|mean|d|g|r|odds_ratio|correlation|estimate"},
    // tests
    {"t", number, "t statistic", "", ""},
    {"df", number, "degrees of freedom of t, or of the denominator of F", "", ""},
    {"welch", choice, "whether t is Welch's (unequal variances)", "", "yes|no"},
    {"f", number, "F statistic", "", ""},
    {"df1", number, "degrees of freedom of the numerator of F; 1 when absent", "", ""},
    {"p", number, "p value", "probability", ""},
    {"tails", choice, "tails of the test that p comes from; 2 when absent", "", "1|2"},
    {"sign", choice, "sign of the effect; for a one-tailed test the hypothesised direction", "", "+|-"},
    {"alpha", number, "the level that ns means; 0.05 when absent", "probability", ""},
    {"covariates", count, "number of covariates in the test (analysis of covariance)", "covariates", ""},
    {"covariate_r", number, "correlation of the scores with the covariates", "", ""},
    // effect sizes
    {"d", number, "Cohen's d", "SD", ""},
    {"g", number, "Hedges' g", "SD", ""},
    {"r", number, "correlation as an effect: point-biserial with two groups", "", ""},
    {"r_pair", number, "correlation of the paired scores (of the scores before and after)", "", ""},
    {"estimate", number, "an effect in the units named by metric", "metric", ""},
    {"se", number, "standard error of estimate, or of d or g", "metric", ""},
    {"metric", text, "name of the units of estimate; smd is the standardized mean difference", "", ""},
    // change from a baseline
    {"baseline_mean1", number, "mean of group 1 before", "raw", ""},
    {"baseline_sd1", number, "standard deviation of group 1 before", "raw", ""},
    {"baseline_mean2", number, "mean of group 2 before", "raw", ""},
    {"baseline_sd2", number, "standard deviation of group 2 before", "raw", ""},
    // medians
    {"median1", number, "median of group 1", "raw", ""},
    {"q1_1", number, "lower quartile of group 1", "raw", ""},
    {"q3_1", number, "upper quartile of group 1", "raw", ""},
    {"min1", number, "smallest score of group 1", "raw", ""},
    {"max1", number, "largest score of group 1", "raw", ""},
    {"median2", number, "median of group 2", "raw", ""},
    {"q1_2", number, "lower quartile of group 2", "raw", ""},
    {"q3_2", number, "upper quartile of group 2", "raw", ""},
    {"min2", number, "smallest score of group 2", "raw", ""},
    {"max2", number, "largest score of group 2", "raw", ""},
    // counts and odds
    {"events1", count, "people in group 1 to whom it happened", "people", ""},
    {"events2", count, "people in group 2 to whom it happened", "people", ""},
    {"odds_ratio", number, "odds in group 1 over odds in group 2", "ratio", ""},
    {"correlation", number, "Pearson's correlation of two measures, as an effect", "", ""},
    // further groups
    {"compare", text, "which groups are set against each other: 1-3, or 1+2-3 to merge groups first", "", ""},
    {"n3", count, "size of group 3", "people", ""},
    {"mean3", number, "mean of group 3", "raw", ""},
    {"sd3", number, "standard deviation of group 3", "raw", ""},
    {"se3", number, "standard error of mean3", "raw", ""},
    {"n4", count, "size of group 4", "people", ""},
    {"mean4", number, "mean of group 4", "raw", ""},
    {"sd4", number, "standard deviation of group 4", "raw", ""},
    {"se4", number, "standard error of mean4", "raw", ""},
    {"n5", count, "size of group 5", "people", ""},
    {"mean5", number, "mean of group 5", "raw", ""},
    {"sd5", number, "standard deviation of group 5", "raw", ""},
    {"se5", number, "standard error of mean5", "raw", ""},
    {"n6", count, "size of group 6", "people", ""},
    {"mean6", number, "mean of group 6", "raw", ""},
    {"sd6", number, "standard deviation of group 6", "raw", ""},
    {"se6", number, "standard error of mean6", "raw", ""},
    // which way the row points
    {"favours", choice, "the group that the result favours, when no sign is printed", "", "1|2"},
    {"reverse", choice, "yes where lower scores are better: the effect is turned round", "", "yes|no"},
    // the scale, for the audit
    {"items", count, "whole-number items that each score averages; 1 for a single rating", "items", ""},
    {"scale_min", number, "lowest possible score", "raw", ""},
    {"scale_max", number, "highest possible score", "raw", ""},
    // the paper's own words
    {"as_printed", text, "the line as the paper prints it: t(28) = 2.20, p = .036", "", ""},
};
// clang-format on

}  // namespace

std::span<const Column> columns() { return table; }

const Column* find_column(std::string_view name) {
  const auto* found =
      std::find_if(std::begin(table), std::end(table), [&](const Column& c) { return c.name == name; });
  return found == std::end(table) ? nullptr : found;
}

}  // namespace steelyard
