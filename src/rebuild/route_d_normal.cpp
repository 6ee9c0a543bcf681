// d or g with its standard error or interval when no sizes are printed: Normal on the d scale.
#include <fmt/format.h>

#include "rebuild/intervals.hpp"
#include "rebuild/routes.hpp"
#include "rebuild/sign.hpp"
#include "rebuild/student.hpp"

namespace steelyard::rebuilding {

namespace {

// `se` belongs to the estimate where there is one.
bool se_is_free(const Numbers& x) { return x.has(Col::se) && !x.has(Col::estimate); }

std::string metric_of(Numbers& x) {
  const bool pairs = x.facts().word(Col::design) == "paired";
  return pairs && !pair_correlation(x) ? "smd-paired" : "smd";
}

std::optional<Solution> normal(Numbers& x, Col col, double se) {
  const auto d = with_sign(x, col);
  if (!d || !(se > 0.0)) return std::nullopt;
  x.caution(col, "normal-likelihood",
            fmt::format("{} with its uncertainty but no sizes is taken as Normal on the d scale.", name(col)),
            "Give the sizes if the paper prints them: the exact likelihood needs them.");
  return Solution{NormalEstimate{*d, se}, metric_of(x), Design::two_groups, 0.0, std::nullopt};
}

double se_of_interval(Numbers& x) {
  return (x[Col::ci_high] - x[Col::ci_low]) / (2.0 * upper_z((1.0 - ci_level(x)) / 2.0));
}

bool d_se_applies(const Numbers& x) { return x.has(Col::d) && se_is_free(x); }
bool g_se_applies(const Numbers& x) { return x.has(Col::g) && !x.has(Col::d) && se_is_free(x); }
bool d_ci_applies(const Numbers& x) { return x.has(Col::d) && ci_of(x) == CiOf::d; }
bool g_ci_applies(const Numbers& x) { return x.has(Col::g) && ci_of(x) == CiOf::g; }

std::optional<Solution> solve_d_se(Numbers& x) { return normal(x, Col::d, x[Col::se]); }
std::optional<Solution> solve_g_se(Numbers& x) { return normal(x, Col::g, x[Col::se]); }
std::optional<Solution> solve_d_ci(Numbers& x) { return normal(x, Col::d, se_of_interval(x)); }
std::optional<Solution> solve_g_ci(Numbers& x) { return normal(x, Col::g, se_of_interval(x)); }

constexpr std::string_view formula_se = "d | δ ~ Normal(δ, SE²)";
constexpr std::string_view formula_ci = "SE = (high − low)/(2·z(level)), d | δ ~ Normal(δ, SE²)";
constexpr std::string_view source = "Hedges & Olkin (1985), ch. 5 (large samples)";

}  // namespace

Route route_d_se() {
  return {{"d-and-se", "d and se, without sizes", formula_se, source, "study,d,se\nA,0.61,0.28"},
          "d and its SE as printed",
          {Col::d, Col::se},
          d_se_applies,
          solve_d_se};
}
Route route_g_se() {
  return {{"g-and-se", "g and se, without sizes", formula_se, source, "study,g,se\nA,0.60,0.28"},
          "g and its SE as printed",
          {Col::g, Col::se},
          g_se_applies,
          solve_g_se};
}
Route route_d_ci() {
  return {{"d-and-ci", "d, ci_low, ci_high (and ci_level), without sizes", formula_ci, source,
           "study,d,ci_low,ci_high\nA,0.61,0.06,1.16"},
          "d as printed, its SE from the confidence interval",
          {Col::d, Col::ci_low, Col::ci_high},
          d_ci_applies,
          solve_d_ci};
}
Route route_g_ci() {
  return {{"g-and-ci", "g, ci_low, ci_high (and ci_level), without sizes", formula_ci, source,
           "study,g,ci_low,ci_high\nA,0.60,0.05,1.15"},
          "g as printed, its SE from the confidence interval",
          {Col::g, Col::ci_low, Col::ci_high},
          g_ci_applies,
          solve_g_ci};
}

}  // namespace steelyard::rebuilding
