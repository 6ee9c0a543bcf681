// Means with SDs or SEs of two groups, of one sample, of pairs.
#include <cmath>

#include "rebuild/intervals.hpp"
#include "rebuild/routes.hpp"
#include "rebuild/scores.hpp"
#include "rebuild/student.hpp"

namespace steelyard::rebuilding {

namespace {

bool is(const Numbers& x, std::string_view design) {
  const std::string word = x.facts().word(Col::design);
  return word == design;
}

bool pairs(const Numbers& x) {
  return is(x, "paired") || (!x.present(Col::design) && x.has(Col::n) && x.present(Col::r_pair));
}

bool single(const Numbers& x) {
  return is(x, "one-sample") ||
         (!x.present(Col::design) && x.has(Col::n) && !x.has(Col::n1) && !x.has(Col::mean2));
}

// SD of a group from its SE; a group of one has no spread of its own.
double sd_from(double se, double n) { return n <= 1.0 ? 0.0 : se * std::sqrt(n); }

std::optional<Solution> two_groups(Numbers& x, double sd1, double sd2, const Frame& frame,
                                   const Sizes& sizes) {
  const auto diff = difference(x);
  const double sd = pooled_sd(sd1, sizes.n1, sd2, sizes.n2);
  if (!diff || !(sd > 0.0)) return std::nullopt;
  Solution solution = in_frame(frame, *diff / sd * std::sqrt(frame.n_scores));
  solution.raw_sd = sd;
  return solution;
}

// Final scores stand for themselves only where no baseline is printed.
bool plain_groups(const Numbers& x) {
  return has_difference(x) && !x.present(Col::compare) && !x.present(Col::baseline_mean1) && !pairs(x) &&
         !single(x);
}

bool sds_apply(const Numbers& x) { return plain_groups(x) && x.has_all({Col::sd1, Col::sd2}); }
bool ses_apply(const Numbers& x) {
  return plain_groups(x) && x.has_all({Col::se1, Col::se2}) && !sds_apply(x);
}

// The cells of one group, and which of them carries its spread.
struct Cells {
  Col mean, sd, se, low, high;
};
constexpr Cells group1 = {Col::mean1, Col::sd1, Col::se1, Col::ci_low1, Col::ci_high1};
constexpr Cells group2 = {Col::mean2, Col::sd2, Col::se2, Col::ci_low2, Col::ci_high2};

bool has_spread(const Numbers& x, const Cells& c) {
  return x.has(c.sd) || x.has(c.se) || x.has_all({c.low, c.high});
}

double spread(Numbers& x, const Cells& c, double n) {
  if (x.has(c.sd)) return x[c.sd];
  if (n <= 1.0) return 0.0;
  if (x.has(c.se)) return sd_from(x[c.se], n);
  return sd_from((x[c.high] - x[c.low]) / (2.0 * upper_t((1.0 - ci_level(x)) / 2.0, n - 1.0)), n);
}

bool spreads_apply(const Numbers& x) {
  return plain_groups(x) && has_spread(x, group1) && has_spread(x, group2) && !sds_apply(x) && !ses_apply(x);
}

// Of two groups, from whichever of SD, SE and interval each prints.
std::optional<Solution> solve_groups(Numbers& x) {
  const auto frame = score_frame(x);
  if (!frame) return std::nullopt;
  const auto sizes = two_group_sizes(x);
  return two_groups(x, spread(x, group1, sizes->n1), spread(x, group2, sizes->n2), *frame, *sizes);
}

bool mean_sd_applies(const Numbers& x) { return single(x) && x.has_all({Col::mean1, Col::sd1}); }
bool mean_se_applies(const Numbers& x) { return single(x) && x.has_all({Col::mean1, Col::se1}); }

std::optional<Solution> solve_single(Numbers& x, bool from_se) {
  const auto frame = score_frame(x);
  if (!frame) return std::nullopt;
  const auto diff = difference(x);
  if (!diff) return std::nullopt;
  const double root = std::sqrt(frame->n_scores);
  const double sd = from_se ? x[Col::se1] * root : x[Col::sd1];
  Solution solution = in_frame(*frame, *diff / sd * root);
  solution.raw_sd = sd;
  return solution;
}

std::optional<Solution> solve_mean_sd(Numbers& x) { return solve_single(x, false); }
std::optional<Solution> solve_mean_se(Numbers& x) { return solve_single(x, true); }

bool paired_applies(const Numbers& x) {
  return pairs(x) && has_difference(x) && x.has_all({Col::sd1, Col::sd2}) &&
         (x.has(Col::r_pair) || x.options().r_pair);
}

std::optional<Solution> solve_paired(Numbers& x) {
  const auto frame = score_frame(x);
  if (!frame) return std::nullopt;
  const auto diff = difference(x);
  if (!diff) return std::nullopt;
  const double sd = sd_of_differences(x[Col::sd1], x[Col::sd2], *pair_correlation(x));
  if (!(sd > 0.0)) return std::nullopt;
  Solution solution = in_frame(*frame, *diff / sd * std::sqrt(frame->n_scores));
  solution.raw_sd = sd / frame->ratio;
  return solution;
}

}  // namespace

Route route_means_sds() {
  return {{"means-and-sds", "mean1, sd1, mean2, sd2, n1 and n2",
           "T = (mean1 − mean2)/(s·√(1/n1 + 1/n2)), s the pooled SD", "Borenstein et al. (2009), ch. 4",
           "study,mean1,sd1,n1,mean2,sd2,n2\nA,103,5.5,50,100,4.5,50"},
          "t from means and SDs",
          {Col::mean1, Col::sd1, Col::mean2, Col::sd2},
          sds_apply,
          solve_groups};
}

Route route_means_ses() {
  return {{"means-and-ses", "mean1, se1, mean2, se2, n1 and n2", "SD = SE·√n, then as for SDs",
           "Cochrane Handbook 5.1, 7.7.3.2", "study,mean1,se1,n1,mean2,se2,n2\nA,103,0.78,50,100,0.64,50"},
          "t from means and SEs",
          {Col::mean1, Col::se1, Col::mean2, Col::se2},
          ses_apply,
          solve_groups};
}

Route route_means_spreads() {
  return {{"means-and-spreads",
           "mean1 and mean2, each with sd, se or interval (ci_low1, ci_high1, ...), n1 and n2",
           "SD = √n·(high − low)/(2·t(level; n − 1)), then as for SDs", "Cochrane Handbook 5.1, 7.7.3.2",
           "study,mean1,ci_low1,ci_high1,n1,mean2,sd2,n2\nA,32.1,30.0,34.2,25,29.4,4.8,22"},
          "t from means and their intervals, SEs or SDs",
          {Col::mean1, Col::ci_low1, Col::ci_high1, Col::mean2},
          spreads_apply,
          solve_groups};
}

Route route_mean_sd() {
  return {{"mean-and-sd", "mean1, sd1 and n of one sample (and mu0)", "T = (mean − mu0)/(SD/√n)",
           "Student (1908)", "study,design,mean1,sd1,n,mu0\nA,one-sample,103.1,14.2,40,100"},
          "t from the mean and SD of one sample",
          {Col::mean1, Col::sd1},
          mean_sd_applies,
          solve_mean_sd};
}

Route route_mean_se() {
  return {{"mean-and-se", "mean1, se1 and n of one sample (and mu0)", "T = (mean − mu0)/SE", "Student (1908)",
           "study,design,mean1,se1,n,mu0\nA,one-sample,103.1,2.25,40,100"},
          "t from the mean and SE of one sample",
          {Col::mean1, Col::se1},
          mean_se_applies,
          solve_mean_se};
}

Route route_paired_means() {
  return {{"paired-means-and-sds", "mean1, sd1, mean2, sd2, r_pair and n of pairs",
           "SD of differences = √(s1² + s2² − 2·r·s1·s2), T = (mean1 − mean2)/(SD/√n)",
           "Cochrane Handbook 5.1, 16.4.6.4",
           "study,design,mean1,sd1,mean2,sd2,r_pair,n\nA,paired,7.0,2.38,6.5,2.21,.68,10"},
          "t from paired means, SDs and their correlation",
          {Col::mean1, Col::sd1, Col::mean2, Col::sd2, Col::r_pair},
          paired_applies,
          solve_paired};
}

}  // namespace steelyard::rebuilding
