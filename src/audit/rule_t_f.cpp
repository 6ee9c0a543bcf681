// t against F with one numerator df.
#include <fmt/format.h>

#include "audit/statistic.hpp"

namespace steelyard::auditing {

namespace {

constexpr std::string_view id = "t-against-f";

void check(const RowView& row) {
  if (!row.has(Col::t) || !row.has(Col::f) || (row.has(Col::df1) && row.value(Col::df1) != 1.0)) return;
  const Range t = size(row.range(Col::t));
  const Range square{t.low * t.low, t.high * t.high};
  if (meet(square, row.range(Col::f))) return;
  row.report(id, Grade::impossible,
             fmt::format("t = {} squared is {:.3g} to {:.3g}, but F is printed as {}.", row.text(Col::t),
                         square.low, square.high, row.text(Col::f)),
             "Check both; with one numerator df F is the square of t.");
}

}  // namespace

Rule rule_t_f() { return {{id, "F(1, df) is the square of t", "Fisher (1925)"}, check}; }

}  // namespace steelyard::auditing
