// Welch's t (unequal variances). With equal sizes it is the pooled t; with both SDs it can be turned into the
// pooled t; else the variances are unknown (two variance ratios can give one df) and only a Normal
// likelihood is left.
#include <fmt/format.h>

#include <cmath>

#include "rebuild/intervals.hpp"
#include "rebuild/p_value.hpp"
#include "rebuild/routes.hpp"
#include "rebuild/scores.hpp"
#include "rebuild/sign.hpp"
#include "rebuild/student.hpp"
#include "rebuild/welch.hpp"

namespace steelyard::rebuilding {

namespace {

struct Statistic {
  double t = 0.0;
  bool folded = false;
};

std::optional<Statistic> from_p(Numbers& x) {
  const auto kind = p_kind(x);
  if (!kind) return std::nullopt;
  const double t = t_of_p(x[Col::p], x[Col::df], *kind);
  if (!std::isfinite(t)) return std::nullopt;
  return Statistic{t, kind->sign == 0};
}

std::optional<Statistic> from_difference(Numbers& x) {
  const auto diff = difference(x);
  if (!diff) return std::nullopt;
  if (x.has(Col::se_diff)) return Statistic{*diff / x[Col::se_diff], false};
  const double half = (x[Col::ci_high] - x[Col::ci_low]) / 2.0;
  return Statistic{*diff * upper_t((1.0 - ci_level(x)) / 2.0, x[Col::df]) / half, false};
}

bool has_statistic(const Numbers& x) {
  if (x.has(Col::t) || (has_difference(x) && x.has(Col::se_diff))) return true;
  if (!x.has(Col::df)) return false;
  return x.has(Col::p) || (has_difference(x) && ci_of(x) == CiOf::difference);
}

std::optional<Statistic> statistic(Numbers& x) {
  if (x.has(Col::t)) {
    const auto t = with_sign(x, Col::t);
    return t ? std::optional(Statistic{*t, false}) : std::nullopt;
  }
  if (has_difference(x) && (x.has(Col::se_diff) || ci_of(x) == CiOf::difference)) return from_difference(x);
  return from_p(x);
}

bool equal_sizes(const Numbers& x) {
  if (!x.has_all({Col::n1, Col::n2})) return x.has(Col::n_total) || x.has(Col::n);
  return x.printed(Col::n1).value == x.printed(Col::n2).value;
}

bool equal_applies(const Numbers& x) { return is_welch(x) && has_statistic(x) && equal_sizes(x); }

std::optional<Solution> solve_equal(Numbers& x) {
  const auto frame = score_frame(x);
  if (!frame) return std::nullopt;
  const auto t = statistic(x);
  if (!t) return std::nullopt;
  return in_frame(*frame, t->t, t->folded);
}

bool sds_apply(const Numbers& x) {
  return is_welch(x) && has_statistic(x) && !equal_sizes(x) && x.has_all({Col::sd1, Col::sd2});
}

std::optional<Solution> solve_sds(Numbers& x) {
  const auto frame = score_frame(x);
  if (!frame) return std::nullopt;
  const auto sizes = two_group_sizes(x);
  const auto t = statistic(x);
  if (!t) return std::nullopt;
  const double a = x[Col::sd1];
  const double b = x[Col::sd2];
  const double se_welch = std::sqrt(a * a / sizes->n1 + b * b / sizes->n2);
  const double sd = pooled_sd(a, sizes->n1, b, sizes->n2);
  Solution solution = in_frame(*frame, t->t * se_welch / (sd / std::sqrt(frame->n_scores)), t->folded);
  solution.raw_sd = sd;
  return solution;
}

bool normal_applies(const Numbers& x) { return is_welch(x) && has_statistic(x) && !equal_sizes(x); }

std::optional<Solution> solve_normal(Numbers& x) {
  const auto frame = score_frame(x);
  if (!frame) return std::nullopt;
  const auto t = statistic(x);
  if (!t) return std::nullopt;
  const double d = t->t / std::sqrt(frame->n_scores);
  const double df = x.has(Col::df) ? x[Col::df] : frame->df;
  const Col where = x.has(Col::t) ? Col::t : Col::df;
  x.caution(where, "welch-without-sds",
            "Welch's t of unequal groups without their SDs leaves the ratio of variances open: d is "
            "approximate and its "
            "likelihood Normal.",
            "Give sd1 and sd2 if the paper prints them.");
  return Solution{NormalEstimate{d, std::sqrt(1.0 / frame->n_scores + d * d / (2.0 * df)), t->folded}, "smd",
                  Design::two_groups, frame->people, std::nullopt};
}

}  // namespace

Route route_welch_equal() {
  return {
      {"welch-equal-sizes", "Welch's t (or difference with SE or interval, or p) with its df, and n1 = n2",
       "Welch's t is the pooled t when n1 = n2; df = 2n − 2", "Welch (1938, 1947)",
       "study,t,df,n1,n2,welch\nA,2.10,51.3,30,30,yes"},
      "Welch's t with equal sizes",
      {Col::t, Col::welch},
      equal_applies,
      solve_equal};
}

Route route_welch_sds() {
  return {{"welch-and-sds",
           "Welch's t (or difference with SE or interval, or p) with its df, sd1, sd2, n1 and n2",
           "T = t·√(s1²/n1 + s2²/n2)/(s·√(1/n1 + 1/n2)), s the pooled SD", "Welch (1938, 1947)",
           "study,t,df,n1,n2,sd1,sd2,welch\nA,2.10,35.6,20,32,4.1,5.6,yes"},
          "pooled t from Welch's t and the SDs",
          {Col::t, Col::welch, Col::sd1, Col::sd2},
          sds_apply,
          solve_sds};
}

Route route_welch_normal() {
  return {{"welch-approximate", "Welch's t (or difference with SE or interval, or p) with its df, n1 and n2",
           "d = t·√(1/n1 + 1/n2), SE² = 1/n1 + 1/n2 + d²/(2·df), Normal", "common practice",
           "study,t,df,n1,n2,welch\nA,2.10,35.6,20,32,yes"},
          "approximate d from Welch's t",
          {Col::t, Col::welch},
          normal_applies,
          solve_normal};
}

}  // namespace steelyard::rebuilding
