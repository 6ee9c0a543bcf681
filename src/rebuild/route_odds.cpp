// Counts of a two-by-two table, or an odds ratio with its interval, as d on the logistic scale.
#include <fmt/format.h>

#include <cmath>
#include <numbers>

#include "rebuild/intervals.hpp"
#include "rebuild/routes.hpp"
#include "rebuild/student.hpp"

namespace steelyard::rebuilding {

namespace {

constexpr std::string_view log_odds = "log-odds-ratio";

// A logistic variable has SD π/√3: that turns a difference of log odds into SD units.
Solution as_d(Numbers& x, double log_ratio, double se) {
  if (x.facts().text(Col::metric) == log_odds) {
    x.mark(Col::metric);
    return {NormalEstimate{log_ratio, se}, std::string(log_odds), Design::two_groups, 0.0, std::nullopt};
  }
  const double scale = std::sqrt(3.0) / std::numbers::pi;
  return {NormalEstimate{log_ratio * scale, se * scale}, "smd", Design::two_groups, 0.0, std::nullopt};
}

bool counts_apply(const Numbers& x) { return x.has_all({Col::events1, Col::events2, Col::n1, Col::n2}); }

bool usable(Numbers& x, Col events, Col size) {
  const double a = x[events];
  const double n = x[size];
  if (a > n) {
    x.refuse(events, "more-events-than-people",
             fmt::format("{} is {:g}, but {} is only {:g}.", name(events), a, name(size), n),
             "Correct one of them.");
    return false;
  }
  if (a > 0.0 && a < n) return true;
  x.refuse(events, "empty-cell",
           fmt::format("{} of {:g} {} an empty cell in the two-by-two table: the odds ratio does not exist, "
                       "and nothing is "
                       "added to the counts here.",
                       name(events), a, a == 0.0 ? "leaves" : "fills its group and leaves"),
           "Give an estimate with its se from an analysis that can use empty cells, or leave the study out "
           "by name.");
  return false;
}

std::optional<Solution> solve_counts(Numbers& x) {
  if (!usable(x, Col::events1, Col::n1) || !usable(x, Col::events2, Col::n2)) return std::nullopt;
  const double a = x[Col::events1];
  const double b = x[Col::n1] - a;
  const double c = x[Col::events2];
  const double d = x[Col::n2] - c;
  return as_d(x, std::log(a) - std::log(b) - std::log(c) + std::log(d),
              std::sqrt(1.0 / a + 1.0 / b + 1.0 / c + 1.0 / d));
}

bool ratio_applies(const Numbers& x) { return x.has(Col::odds_ratio) && ci_of(x) == CiOf::odds_ratio; }

std::optional<Solution> solve_ratio(Numbers& x) {
  const double low = x[Col::ci_low];
  const double high = x[Col::ci_high];
  if (!(low > 0.0)) {
    x.refuse(Col::ci_low, "ratio-not-positive",
             fmt::format("ci_low is {}, but the interval of an odds ratio lies above 0.",
                         x.facts().text(Col::ci_low)),
             "Give more digits, or correct it; if the interval is that of the log odds ratio, use estimate "
             "and metric.");
    return std::nullopt;
  }
  return as_d(x, std::log(x[Col::odds_ratio]),
              std::log(high / low) / (2.0 * upper_z((1.0 - ci_level(x)) / 2.0)));
}

}  // namespace

Route route_counts() {
  return {{"two-by-two-counts", "events1, n1, events2, n2",
           "d = ln(OR)·√3/π, SE = √(1/a + 1/b + 1/c + 1/d)·√3/π, Normal; metric log-odds-ratio keeps ln(OR)",
           "Hasselblad & Hedges (1995)", "study,events1,n1,events2,n2\nA,15,100,30,100"},
          "d from the counts",
          {Col::events1, Col::events2},
          counts_apply,
          solve_counts};
}

Route route_odds_ratio() {
  return {{"odds-ratio-and-ci", "odds_ratio, ci_low, ci_high (and ci_level)",
           "SE = ln(high/low)/(2·z(level)), d = ln(OR)·√3/π, Normal; metric log-odds-ratio keeps ln(OR)",
           "Hasselblad & Hedges (1995)", "study,odds_ratio,ci_low,ci_high\nA,2.48,1.49,4.12"},
          "d from the odds ratio and its interval",
          {Col::odds_ratio, Col::ci_low, Col::ci_high},
          ratio_applies,
          solve_ratio};
}

}  // namespace steelyard::rebuilding
