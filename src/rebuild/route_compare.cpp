// Two of several groups, or groups merged, from means and SDs.
#include <cmath>

#include "rebuild/groups.hpp"
#include "rebuild/routes.hpp"
#include "rebuild/scores.hpp"

namespace steelyard::rebuilding {

namespace {

bool applies(const Numbers& x) { return x.present(Col::compare) && x.has(Col::mean1); }

std::optional<Solution> solve(Numbers& x) {
  const auto frame = score_frame(x);
  if (!frame) return std::nullopt;
  const auto sides = comparison_of(x);
  const auto a = merged(x, sides->first);
  const auto b = merged(x, sides->second);
  if (!a || !b) return std::nullopt;
  const double sd = pooled_sd(a->sd, a->n, b->sd, b->n);
  Solution solution = in_frame(*frame, (a->mean - b->mean) / sd * std::sqrt(frame->n_scores));
  solution.raw_sd = sd;
  return solution;
}

}  // namespace

Route route_compare() {
  return {
      {"groups-compared", "compare, and mean, sd (or se) and n of every group that it names",
       "merged SD² = ((nA−1)·sA² + (nB−1)·sB² + nA·nB/(nA+nB)·(mA−mB)²)/(nA+nB−1), then as for two groups",
       "Cochrane Handbook 5.1, table 7.7.a",
       "study,compare,mean1,sd1,n1,mean2,sd2,n2,mean3,sd3,n3\nA,1+2-3,5.1,1.2,20,5.4,1.1,22,4.2,1.3,21"},
      "t from means and SDs of the groups compared",
      {Col::compare, Col::mean1},
      applies,
      solve};
}

}  // namespace steelyard::rebuilding
