// Change from a baseline in two groups, with the correlation of the scores before and after.
#include <cmath>

#include "rebuild/routes.hpp"
#include "rebuild/scores.hpp"

namespace steelyard::rebuilding {

namespace {

bool applies(const Numbers& x) {
  return x.has_all({Col::baseline_mean1, Col::baseline_sd1, Col::baseline_mean2, Col::baseline_sd2,
                    Col::mean1, Col::sd1, Col::mean2, Col::sd2});
}

double mean_square(double a, double b) { return (a * a + b * b) / 2.0; }

std::optional<Solution> solve(Numbers& x) {
  const auto r = pair_correlation(x);
  if (!r) {
    x.refuse(Col::baseline_mean1, "baseline-without-correlation",
             "A change from baseline needs the correlation of the scores before and after.",
             "Fill r_pair (or state one for all rows), or leave the baseline columns out to compare the "
             "final scores.");
    return std::nullopt;
  }
  auto frame = score_frame(x);
  const auto sizes = two_group_sizes(x);
  if (!frame || !sizes) return std::nullopt;
  const double before1 = x[Col::baseline_sd1];
  const double before2 = x[Col::baseline_sd2];
  const double after1 = x[Col::sd1];
  const double after2 = x[Col::sd2];
  const double sd = pooled_sd(sd_of_differences(before1, after1, *r), sizes->n1,
                              sd_of_differences(before2, after2, *r), sizes->n2);
  // δ is in SD units of the scores (before and after pooled), not of the changes.
  const double raw = std::sqrt(mean_square(pooled_sd(before1, sizes->n1, before2, sizes->n2),
                                           pooled_sd(after1, sizes->n1, after2, sizes->n2)));
  frame->ratio = sd / raw;
  frame->n_effective = frame->n_scores / (frame->ratio * frame->ratio);
  const double change = (x[Col::mean1] - x[Col::baseline_mean1]) - (x[Col::mean2] - x[Col::baseline_mean2]);
  Solution solution = in_frame(*frame, change / sd * std::sqrt(frame->n_scores));
  solution.raw_sd = raw;
  return solution;
}

}  // namespace

Route route_change() {
  return {{"change-from-baseline",
           "baseline_mean1, baseline_sd1, mean1, sd1, n1, the same of group 2, and r_pair",
           "SD of change = √(before² + after² − 2·r·before·after), T of the changes; δ in SDs of the scores",
           "Cochrane Handbook 5.1, 16.1.3.2",
           "study,baseline_mean1,baseline_sd1,mean1,sd1,n1,baseline_mean2,baseline_sd2,mean2,sd2,n2,r_pair\n"
           "A,20.1,4.2,15.3,4.6,25,19.8,4.4,18.0,4.5,27,.6"},
          "t from the changes from baseline",
          {Col::baseline_mean1, Col::baseline_sd1, Col::mean1, Col::sd1, Col::baseline_mean2,
           Col::baseline_sd2, Col::mean2, Col::sd2},
          applies,
          solve};
}

}  // namespace steelyard::rebuilding
