// An estimate with its standard error or confidence interval, in a metric of its own: Normal likelihood.
#include <cmath>

#include "rebuild/intervals.hpp"
#include "rebuild/routes.hpp"
#include "rebuild/sign.hpp"
#include "rebuild/student.hpp"

namespace steelyard::rebuilding {

namespace {

std::string metric_of(Numbers& x) {
  const std::string_view text = x.facts().text(Col::metric);
  if (text.empty()) return "unnamed";
  x.mark(Col::metric);
  return std::string(text);
}

std::optional<Solution> normal(Numbers& x, double se) {
  const auto estimate = with_sign(x, Col::estimate);
  if (!estimate || !(se > 0.0)) return std::nullopt;
  return Solution{NormalEstimate{*estimate, se}, metric_of(x), Design::two_groups, 0.0, std::nullopt};
}

bool se_applies(const Numbers& x) { return x.has_all({Col::estimate, Col::se}); }
std::optional<Solution> solve_se(Numbers& x) { return normal(x, x[Col::se]); }

bool ci_applies(const Numbers& x) { return x.has(Col::estimate) && ci_of(x) == CiOf::estimate; }

std::optional<Solution> solve_ci(Numbers& x) {
  const double width = x[Col::ci_high] - x[Col::ci_low];
  return normal(x, width / (2.0 * upper_z((1.0 - ci_level(x)) / 2.0)));
}

}  // namespace

Route route_estimate_se() {
  return {{"estimate-and-se", "estimate, se (and metric)", "estimate | δ ~ Normal(δ, SE²)", "Rubin (1981)",
           "study,estimate,se,metric\nA,28.4,14.9,points"},
          "the estimate and its SE as printed",
          {Col::estimate, Col::se},
          se_applies,
          solve_se};
}

Route route_estimate_ci() {
  return {{"estimate-and-ci", "estimate, ci_low, ci_high (and ci_level, metric)",
           "SE = (high − low)/(2·z(level)), then as for the SE", "Cochrane Handbook 5.1, 7.7.7.2",
           "study,estimate,ci_low,ci_high,metric\nA,0.31,0.05,0.57,log-hazard-ratio"},
          "the estimate as printed, its SE from the confidence interval",
          {Col::estimate, Col::ci_low, Col::ci_high},
          ci_applies,
          solve_ci};
}

}  // namespace steelyard::rebuilding
