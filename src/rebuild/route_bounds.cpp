// Bounds on t and F: "t < 1", "F < 1".
#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "rebuild/f_test.hpp"
#include "rebuild/p_value.hpp"
#include "rebuild/routes.hpp"
#include "rebuild/sign.hpp"

namespace steelyard::rebuilding {

namespace {

std::optional<Solution> band(const Frame& frame, std::vector<Interval> bands) {
  for (const Interval& piece : bands) {
    if (!(piece.low < piece.high)) return std::nullopt;
  }
  return Solution{BandT{std::move(bands), frame.df, frame.n_effective}, frame.metric, frame.design,
                  frame.people, std::nullopt};
}

bool t_applies(const Numbers& x) {
  return x.is_bound(Col::t) && x.printed(Col::t).relation == Relation::bounded;
}

// `<1` and `>2` speak of |t|, as papers do; a range, and a bound below zero, is taken with its signs.
std::vector<Interval> t_values(Numbers& x) {
  const Printed& t = x.printed(Col::t);
  const int sign = stated_sign(x);
  const bool range = std::isfinite(t.low) && std::isfinite(t.high);
  if (sign == 0 && (range || (std::isinf(t.low) && t.high <= 0.0) || (std::isinf(t.high) && t.low < 0.0))) {
    return {{t.low, t.high}};
  }
  if (range && t.high <= 0.0) return size_bands(-t.high, -t.low, sign);
  return size_bands(std::max(t.low, 0.0), t.high, sign);
}

std::optional<Solution> solve_t(Numbers& x) {
  const auto frame = frame_of(x);
  if (!frame) return std::nullopt;
  x.mark(Col::t);
  return band(*frame, t_values(x));
}

bool f_applies(const Numbers& x) {
  return x.is_bound(Col::f) && x.printed(Col::f).relation == Relation::bounded;
}

std::optional<Solution> solve_f(Numbers& x) {
  const auto frame = frame_of(x);
  if (!frame || !has_one_numerator_df(x)) return std::nullopt;
  x.mark(Col::f);
  const Printed& f = x.printed(Col::f);
  return band(*frame,
              size_bands(std::sqrt(std::max(f.low, 0.0)), std::sqrt(std::max(f.high, 0.0)), sign_of(x)));
}

}  // namespace

Route route_t_bound() {
  return {{"t-bound", "t as a bound (<1, 2.1..2.4), and n1 and n2 (or n, or df)",
           "P(T in the values that the bound allows | δ)", "Heitjan & Rubin (1991), coarsening at random",
           "study,t,n1,n2\nA,<1,20,20"},
          "band of t as printed",
          {Col::t},
          t_applies,
          solve_t};
}

Route route_f_bound() {
  return {{"f-bound", "f as a bound (<1) with df1 = 1, and n1 and n2 (or n, or df)",
           "|T| = √F at the ends of the bound", "Heitjan & Rubin (1991), coarsening at random",
           "study,f,df1,n1,n2\nA,<1,1,20,20"},
          "band of t from the bound on F",
          {Col::f},
          f_applies,
          solve_f};
}

}  // namespace steelyard::rebuilding
