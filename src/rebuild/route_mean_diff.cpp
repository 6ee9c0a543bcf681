// A difference of means with its SE, its SD, or its confidence interval.
#include <cmath>

#include "rebuild/intervals.hpp"
#include "rebuild/routes.hpp"
#include "rebuild/scores.hpp"
#include "rebuild/student.hpp"
#include "rebuild/welch.hpp"

namespace steelyard::rebuilding {

namespace {

Solution from_se(const Frame& frame, double difference, double se) {
  Solution solution = in_frame(frame, difference / se);
  solution.raw_sd = se * std::sqrt(frame.n_effective);
  return solution;
}

bool se_applies(const Numbers& x) { return has_difference(x) && x.has(Col::se_diff) && !is_welch(x); }

std::optional<Solution> solve_se(Numbers& x) {
  const auto frame = frame_of(x);
  if (!frame) return std::nullopt;
  const auto diff = difference(x);
  if (!diff) return std::nullopt;
  return from_se(*frame, *diff, x[Col::se_diff]);
}

bool sd_applies(const Numbers& x) { return has_difference(x) && x.has(Col::sd_diff); }

std::optional<Solution> solve_sd(Numbers& x) {
  const auto frame = score_frame(x);
  if (!frame) return std::nullopt;
  const auto diff = difference(x);
  if (!diff) return std::nullopt;
  if (frame->design == Design::two_groups) {
    x.caution(Col::sd_diff, "sd-taken-as-pooled", "sd_diff of two groups was taken as their pooled SD.",
              "Give sd1 and sd2 if the paper prints them, or se_diff if the number is a standard error.");
  }
  return from_se(*frame, *diff, x[Col::sd_diff] / std::sqrt(frame->n_scores));
}

bool ci_applies(const Numbers& x) {
  const CiOf of = ci_of(x);
  return (of == CiOf::difference || of == CiOf::mean) && !is_welch(x);
}

std::optional<Solution> solve_ci(Numbers& x) {
  const auto frame = frame_of(x);
  if (!frame) return std::nullopt;
  const double low = x[Col::ci_low];
  const double high = x[Col::ci_high];
  const double mu0 = ci_of(x) == CiOf::mean && x.has(Col::mu0) ? x[Col::mu0] : 0.0;
  const auto diff = has_difference(x) ? difference(x) : std::optional((low + high) / 2.0 - mu0);
  if (!diff || !(high > low)) return std::nullopt;
  return from_se(*frame, *diff, (high - low) / (2.0 * upper_t((1.0 - ci_level(x)) / 2.0, frame->df)));
}

}  // namespace

Route route_mean_diff_se() {
  return {{"mean-difference-and-se", "mean_diff (or mean1 and mean2), se_diff, and n1 and n2 (or n, or df)",
           "T = difference/SE", "Cochrane Handbook 5.1, 7.7.3.3",
           "study,mean_diff,se_diff,n1,n2\nA,3.8,1.37,25,22"},
          "t from the mean difference and its SE",
          {Col::mean_diff, Col::se_diff},
          se_applies,
          solve_se};
}

Route route_mean_diff_sd() {
  return {{"mean-difference-and-sd", "mean_diff (or mean1 and mean2), sd_diff, and n (pairs) or n1 and n2",
           "T = difference/(SD/√n)", "Borenstein et al. (2009), ch. 4",
           "study,design,mean_diff,sd_diff,n,r_pair\nA,paired,3,5.5,50,0.7"},
          "t from the mean difference and its SD",
          {Col::mean_diff, Col::sd_diff},
          sd_applies,
          solve_sd};
}

Route route_mean_diff_ci() {
  return {{"mean-difference-and-ci",
           "ci_low, ci_high (and ci_level) of the difference, and n1 and n2 (or n, or df)",
           "SE = (high − low)/(2·t(level; df)), T = difference/SE", "Cochrane Handbook 5.1, 7.7.3.3",
           "study,mean_diff,ci_low,ci_high,n1,n2\nA,3.8,1.04,6.56,25,22"},
          "t from the confidence interval of the difference",
          {Col::ci_low, Col::ci_high},
          ci_applies,
          solve_ci};
}

}  // namespace steelyard::rebuilding
