#include "rebuild/check_cells.hpp"

#include <fmt/format.h>

#include <cmath>

namespace steelyard::rebuilding {

namespace {

class Checker {
 public:
  explicit Checker(const Facts& facts) : facts_(facts) {}

  void error(Col col, std::string_view code, std::string what, std::string remedy) {
    found_.push_back(
        {Severity::error, std::string(code), facts_.place(col), std::move(what), std::move(remedy)});
  }

  // The printed number of a column, or null when it is empty or a bound.
  const Printed* number(Col col) const {
    const Cell* cell = facts_.cell(col);
    return cell != nullptr && cell->printed.has_value() ? &cell->printed : nullptr;
  }

  std::string quoted(Col col) const { return fmt::format("{} is {}", name(col), facts_.text(col)); }

  void positive_spread(Col col) {
    const Printed* x = number(col);
    if (x == nullptr || x->value > 0.0) return;
    error(col, "spread-not-positive", fmt::format("{}, but an SD or SE must be above 0.", quoted(col)),
          x->value == 0.0 ? "Give more digits, or leave the cell empty and give t, F or p instead."
                          : "Correct the sign or the number.");
  }

  void whole_size(Col col) {
    const Printed* x = number(col);
    if (x == nullptr) return;
    if (x->value != std::floor(x->value)) {
      error(col, "size-not-whole", fmt::format("{}, but a number of people or scores is whole.", quoted(col)),
            "Correct it; if it is a mean size per group, give the total as n.");
    } else if (x->value < 1.0) {
      error(col, "size-not-positive", fmt::format("{}, but a size must be at least 1.", quoted(col)),
            "Correct it, or leave the cell empty if the size is not known.");
    }
  }

  void at_least_one_df(Col col) {
    const Printed* x = number(col);
    if (x == nullptr || x->value >= 1.0) return;
    error(col, "no-df-left", fmt::format("{}, and at least 1 degree of freedom is needed.", quoted(col)),
          "Correct it; a test needs at least one more score than it estimates means.");
  }

  void within(Col col, double low, double high, bool closed, std::string_view code, std::string_view rule) {
    const Printed* x = number(col);
    if (x == nullptr) return;
    const bool inside = closed ? x->value >= low && x->value <= high : x->value > low && x->value < high;
    if (inside) return;
    error(col, code, fmt::format("{}, but {}.", quoted(col), rule), "Correct it.");
  }

  void ordered(Col low, Col high) {
    const Printed* a = number(low);
    const Printed* b = number(high);
    if (a == nullptr || b == nullptr || a->value < b->value) return;
    const bool equal = a->value == b->value;
    error(low, equal ? "interval-without-width" : "interval-reversed",
          fmt::format("{} and {}: the interval {}.", quoted(low), quoted(high),
                      equal ? "has no width" : "is the wrong way round"),
          equal ? "Give more digits, or another column instead."
                : "Swap the two, or correct the one that is wrong.");
  }

  void not_a_bound(Col col) {
    const Cell* cell = facts_.cell(col);
    if (cell == nullptr || !cell->printed.is_bound()) return;
    error(col, "bound-not-usable", fmt::format("{}: only p, t and f can be given as bounds.", quoted(col)),
          "Give the number itself, or leave the cell empty.");
  }

  void not_ns(Col col) {
    const Cell* cell = facts_.cell(col);
    if (cell == nullptr || cell->printed.relation != Relation::not_significant) return;
    error(col, "ns-not-usable", fmt::format("{}: only a p can be \"not significant\".", quoted(col)),
          "Put it into the column p.");
  }

  std::vector<Diagnostic> take() { return std::move(found_); }

 private:
  const Facts& facts_;
  std::vector<Diagnostic> found_;
};

bool may_be_bound(Col col) { return col == Col::p || col == Col::t || col == Col::f; }

bool carries_no_number(Col col) {
  switch (col) {
    case Col::study:
    case Col::role:
    case Col::design:
    case Col::sign:
    case Col::favours:
    case Col::reverse:
    case Col::welch:
    case Col::metric:
    case Col::ci_of:
    case Col::as_printed:
    case Col::compare:
      return true;
    default:
      return false;
  }
}

void check_p(Checker& checker, const Facts& facts) {
  checker.within(Col::p, 0.0, 1.0, true, "p-out-of-range", "a p value lies between 0 and 1");
  const Printed* p = checker.number(Col::p);
  if (p == nullptr || p->relation != Relation::exact || p->value > 0.0) return;
  checker.error(Col::p, "p-out-of-range",
                fmt::format("p is {}, and no test has a p of exactly 0.", facts.text(Col::p)),
                "Give it as it is printed (.000), or as a bound (<.001).");
}

}  // namespace

std::vector<Diagnostic> check_cells(const Facts& facts) {
  Checker check(facts);
  for (std::size_t i = 0; i < col_count; ++i) {
    const Col col = static_cast<Col>(i);
    if (facts.present(col) && !carries_no_number(col) && !may_be_bound(col)) check.not_a_bound(col);
  }
  for (const Col col : {Col::t, Col::f}) check.not_ns(col);
  for (const Col col : {Col::sd1, Col::se1, Col::sd2, Col::se2, Col::sd_diff, Col::se_diff, Col::se,
                        Col::baseline_sd1, Col::baseline_sd2, Col::sd3, Col::se3, Col::sd4, Col::se4,
                        Col::sd5, Col::se5, Col::sd6, Col::se6, Col::odds_ratio}) {
    check.positive_spread(col);
  }
  for (const Col col : {Col::n1, Col::n2, Col::n, Col::n_total, Col::n3, Col::n4, Col::n5, Col::n6})
    check.whole_size(col);
  for (const Col col : {Col::df, Col::df1}) check.at_least_one_df(col);
  check.within(Col::f, 0.0, INFINITY, true, "f-negative",
               "an F is a ratio of variances and can't be negative");
  check_p(check, facts);
  for (const Col col : {Col::r, Col::correlation, Col::covariate_r}) {
    check.within(col, -1.0, 1.0, false, "correlation-out-of-range", "a correlation lies between −1 and 1");
  }
  check.within(Col::r_pair, -1.0, 1.0, false, "correlation-out-of-range",
               "the correlation of paired scores must lie between −1 and 1");
  check.within(Col::ci_level, 0.0, 100.0, false, "level-out-of-range",
               "a confidence level lies between 0 and 1 (or between 1 and 100 %)");
  check.within(Col::alpha, 0.0, 1.0, false, "alpha-out-of-range", "alpha lies between 0 and 1");
  check.ordered(Col::ci_low, Col::ci_high);
  check.ordered(Col::ci_low1, Col::ci_high1);
  check.ordered(Col::ci_low2, Col::ci_high2);
  return check.take();
}

}  // namespace steelyard::rebuilding
