// Medians with quartiles or with the range. The t rebuilt from them is not a noncentral t with n − 2 df: both
// the mean and the SD are guessed from a few order statistics. Effective n and df are lowered so that the
// error rate is right, by the table that tests/oracle/medians.py makes.
#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cmath>
#include <iterator>

#include "rebuild/routes.hpp"
#include "rebuild/scores.hpp"
#include "rebuild/student.hpp"

namespace steelyard::rebuilding {

namespace {

// tests/reference/medians.csv: variance of the t ÷ that of a t, and share of the df, by group size.
struct Loss {
  double n, inflation, df_share;
};
constexpr std::array<Loss, 10> quartile_loss = {{{5, 0.816, 0.397},
                                                 {7, 0.874, 0.505},
                                                 {10, 0.975, 0.441},
                                                 {15, 1.012, 0.429},
                                                 {20, 1.050, 0.401},
                                                 {30, 1.089, 0.390},
                                                 {50, 1.120, 0.381},
                                                 {100, 1.140, 0.374},
                                                 {200, 1.156, 0.371},
                                                 {500, 1.160, 0.368}}};
constexpr std::array<Loss, 5> range_loss = {
    {{5, 0.924, 0.945}, {7, 0.988, 0.888}, {10, 1.032, 0.827}, {15, 1.126, 0.744}, {20, 1.143, 0.679}}};
constexpr double least_n = 5.0;
constexpr double most_n_of_range = 20.0;

// Between the sizes of the table by log n; never better than the scores themselves would be.
template <std::size_t N>
Loss loss_at(const std::array<Loss, N>& table, double n) {
  const auto next = std::find_if(table.begin(), table.end(), [n](const Loss& row) { return row.n >= n; });
  Loss loss = table.back();
  if (next == table.begin()) {
    loss = table.front();
  } else if (next != table.end()) {
    const Loss& before = *std::prev(next);
    const double share = std::log(n / before.n) / std::log(next->n / before.n);
    loss.inflation = before.inflation + share * (next->inflation - before.inflation);
    loss.df_share = before.df_share + share * (next->df_share - before.df_share);
  }
  return {n, std::max(loss.inflation, 1.0), std::min(loss.df_share, 1.0)};
}

struct Cells {
  Col median, q1, q3, least, most;
};
constexpr Cells group1 = {Col::median1, Col::q1_1, Col::q3_1, Col::min1, Col::max1};
constexpr Cells group2 = {Col::median2, Col::q1_2, Col::q3_2, Col::min2, Col::max2};

struct Guess {
  double mean, sd;
};

// Luo et al. (2018), eqs. 15 and 11; Wan et al. (2014), eqs. 16 and 9.
Guess from_quartiles(Numbers& x, const Cells& c, double n) {
  const double share = 0.7 + 0.39 / n;
  const double q1 = x[c.q1];
  const double q3 = x[c.q3];
  return {share * (q1 + q3) / 2.0 + (1.0 - share) * x[c.median],
          (q3 - q1) / (2.0 * upper_z((0.25 * n + 0.375) / (n + 0.25)))};
}

Guess from_range(Numbers& x, const Cells& c, double n) {
  const double share = 4.0 / (4.0 + std::pow(n, 0.75));
  const double low = x[c.least];
  const double high = x[c.most];
  return {share * (low + high) / 2.0 + (1.0 - share) * x[c.median],
          (high - low) / (2.0 * upper_z(0.625 / (n + 0.25)))};
}

bool in_order(Numbers& x, std::initializer_list<Col> cols) {
  const Col* before = nullptr;
  for (const Col& col : cols) {
    if (!x.has(col)) continue;
    if (before != nullptr && x.printed(*before).value > x.printed(col).value) {
      x.refuse(col, "quantiles-out-of-order",
               fmt::format("{} = {} lies below {} = {}.", name(col), x.facts().text(col), name(*before),
                           x.facts().text(*before)),
               "Correct one of them.");
      return false;
    }
    before = &col;
  }
  return true;
}

bool in_order(Numbers& x) {
  return in_order(x, {Col::min1, Col::q1_1, Col::median1, Col::q3_1, Col::max1}) &&
         in_order(x, {Col::min2, Col::q1_2, Col::median2, Col::q3_2, Col::max2});
}

bool large_enough(Numbers& x, const Sizes& sizes) {
  if (std::min(sizes.n1, sizes.n2) >= least_n) return true;
  x.refuse(Col::median1, "medians-of-few",
           fmt::format("With fewer than {:g} scores in a group, mean and SD can't be told from a median.",
                       least_n),
           "Give means and SDs, t, F or p.");
  return false;
}

std::optional<Solution> combine(Numbers& x, const Sizes& sizes, const Guess& a, const Guess& b,
                                const Loss& la, const Loss& lb) {
  const double sd = pooled_sd(a.sd, sizes.n1, b.sd, sizes.n2);
  const double df = la.df_share * (sizes.n1 - 1.0) + lb.df_share * (sizes.n2 - 1.0);
  const double n_effective = 1.0 / (la.inflation / sizes.n1 + lb.inflation / sizes.n2);
  if (!(sd > 0.0) || !(df >= 1.0)) return std::nullopt;
  x.caution(Col::median1, "from-medians",
            fmt::format("Means and SDs were guessed from medians as if scores were Normal; the effective n "
                        "was lowered to {:.3g} and "
                        "the df to {:.3g} so that the error rate is right.",
                        n_effective, df),
            "Prefer means and SDs, t, F or p if the paper has them; authors report medians when scores are "
            "skewed.");
  const double t = (a.mean - b.mean) / sd * std::sqrt(n_effective);
  return Solution{ExactT{t, df, n_effective}, "smd", Design::two_groups, sizes.n1 + sizes.n2, sd};
}

bool quartiles_apply(const Numbers& x) {
  return x.has_all({Col::median1, Col::q1_1, Col::q3_1, Col::median2, Col::q1_2, Col::q3_2});
}

std::optional<Solution> solve_quartiles(Numbers& x) {
  const auto sizes = two_group_sizes(x);
  if (!sizes || !large_enough(x, *sizes) || !in_order(x)) return std::nullopt;
  return combine(x, *sizes, from_quartiles(x, group1, sizes->n1), from_quartiles(x, group2, sizes->n2),
                 loss_at(quartile_loss, sizes->n1), loss_at(quartile_loss, sizes->n2));
}

bool range_applies(const Numbers& x) {
  return x.has_all({Col::median1, Col::min1, Col::max1, Col::median2, Col::min2, Col::max2}) &&
         !quartiles_apply(x);
}

std::optional<Solution> solve_range(Numbers& x) {
  const auto sizes = two_group_sizes(x);
  if (!sizes || !large_enough(x, *sizes) || !in_order(x)) return std::nullopt;
  if (std::max(sizes->n1, sizes->n2) > most_n_of_range) {
    x.refuse(
        Col::min1, "range-of-many",
        fmt::format(
            "With more than {:g} scores in a group the range says more about outliers than about the SD.",
            most_n_of_range),
        "Give quartiles, means and SDs, t, F or p.");
    return std::nullopt;
  }
  return combine(x, *sizes, from_range(x, group1, sizes->n1), from_range(x, group2, sizes->n2),
                 loss_at(range_loss, sizes->n1), loss_at(range_loss, sizes->n2));
}

}  // namespace

Route route_medians_quartiles() {
  return {{"medians-and-quartiles", "median1, q1_1, q3_1, median2, q1_2, q3_2, n1 and n2 (5 or more)",
           "mean ≈ w·(q1+q3)/2 + (1−w)·median, SD ≈ (q3−q1)/(2·z); effective n and df lowered",
           "Luo et al. (2018); Wan et al. (2014); tests/oracle/medians.py",
           "study,median1,q1_1,q3_1,n1,median2,q1_2,q3_2,n2\nA,12,9,16,40,10,7,13,42"},
          "t from medians and quartiles",
          {Col::median1, Col::q1_1, Col::q3_1, Col::median2, Col::q1_2, Col::q3_2},
          quartiles_apply,
          solve_quartiles};
}

Route route_medians_range() {
  return {{"medians-and-range", "median1, min1, max1, median2, min2, max2, n1 and n2 (5 to 20)",
           "mean ≈ w·(min+max)/2 + (1−w)·median, SD ≈ (max−min)/(2·z); effective n and df lowered",
           "Luo et al. (2018); Wan et al. (2014); tests/oracle/medians.py",
           "study,median1,min1,max1,n1,median2,min2,max2,n2\nA,12,5,21,15,10,2,17,14"},
          "t from medians and ranges",
          {Col::median1, Col::min1, Col::max1, Col::median2, Col::min2, Col::max2},
          range_applies,
          solve_range};
}

}  // namespace steelyard::rebuilding
