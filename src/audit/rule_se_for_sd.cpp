// Standard errors printed as SDs.
#include <fmt/format.h>

#include <cmath>

#include "audit/statistic.hpp"
#include "rebuild/scores.hpp"

namespace steelyard::auditing {

namespace {

constexpr std::string_view id = "se-printed-as-sd";
// A difference of more than three SDs that would be ordinary if they were SEs.
constexpr double huge = 3.0;

struct Groups {
  double n1, n2;
  Range diff, a, b;
};

std::optional<Groups> groups_of(const RowView& row) {
  const auto diff = difference(row);
  if (!diff || !is_two_groups(row)) return std::nullopt;
  for (const Col col : {Col::sd1, Col::sd2, Col::n1, Col::n2}) {
    if (!row.has(col)) return std::nullopt;
  }
  const Groups g{row.value(Col::n1), row.value(Col::n2), *diff, row.range(Col::sd1), row.range(Col::sd2)};
  return g.n1 >= 2.0 && g.n2 >= 2.0 ? std::optional(g) : std::nullopt;
}

// |t| if the printed SDs are SEs.
Range t_if_se(const Groups& g) {
  const double f = std::sqrt(1.0 / g.n1 + 1.0 / g.n2);
  const std::array<Range, 3> box = {g.diff, times(g.a, std::sqrt(g.n1)), times(g.b, std::sqrt(g.n2))};
  const Range student = over(box, [&](const std::array<double, 3>& v) {
    return v[0] / (rebuilding::pooled_sd(v[1], g.n1, v[2], g.n2) * f);
  });
  const Range welch = over(box, [&](const std::array<double, 3>& v) {
    return v[0] / std::sqrt(v[1] * v[1] / g.n1 + v[2] * v[2] / g.n2);
  });
  return size(join(student, welch));
}

void check(const RowView& row) {
  const auto g = groups_of(row);
  if (!g) return;
  const Range as_se = t_if_se(*g);
  const auto test = printed_test(row);
  const auto means = from_means(row);
  const std::string_view remedy = "If they are standard errors, put them into se1 and se2.";
  if (test && means) {
    if (meet(size(test->t), size(means->t)) || !meet(size(test->t), as_se)) return;
    row.report(id, Grade::worth_a_look,
               fmt::format("sd1 = {} and sd2 = {} fit {} only as standard errors.", row.text(Col::sd1),
                           row.text(Col::sd2), test->words),
               std::string(remedy));
    return;
  }
  const double d = size(g->diff).low / rebuilding::pooled_sd(g->a.high, g->n1, g->b.high, g->n2);
  if (test || d < huge || as_se.high * std::sqrt(1.0 / g->n1 + 1.0 / g->n2) > huge / 2.0) return;
  row.report(id, Grade::worth_a_look,
             fmt::format("The means lie more than {:.2g} SDs apart; with sd1 = {} and sd2 = {} as standard "
                         "errors it would be {:.2g}.",
                         d, row.text(Col::sd1), row.text(Col::sd2),
                         as_se.high * std::sqrt(1.0 / g->n1 + 1.0 / g->n2)),
             std::string(remedy));
}

}  // namespace

Rule rule_se_for_sd() {
  return {{id, "SDs that fit the test, or an ordinary effect, only as standard errors",
           "Cochrane Handbook 5.1, 7.7.3.2"},
          check};
}

}  // namespace steelyard::auditing
