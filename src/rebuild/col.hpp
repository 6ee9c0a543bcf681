// The columns that routes and audit rules read, as small numbers: a row is looked up by index, never
// by name, since a file may have a million rows. Names are those of the table of columns in "base".
#pragma once

#include <array>
#include <cstddef>
#include <string_view>

namespace steelyard::rebuilding {

// clang-format off
#define STEELYARD_COLS(X)                                                                        \
  X(study) X(year) X(role) X(design)                                                             \
  X(n1) X(n2) X(n) X(n_total)                                                                         \
  X(mean1) X(sd1) X(se1) X(mean2) X(sd2) X(se2)                                                  \
  X(mean_diff) X(sd_diff) X(se_diff)                                                             \
  X(ci_low) X(ci_high) X(ci_level) X(ci_of)                                                      \
  X(t) X(df) X(f) X(df1) X(p) X(tails) X(sign) X(alpha) X(welch)                                \
  X(d) X(g) X(r) X(r_pair)                                                 \
  X(estimate) X(se) X(metric) X(as_printed)                                                      \
  X(favours) X(reverse) X(mu0) X(covariates) X(covariate_r)                                      \
  X(ci_low1) X(ci_high1) X(ci_low2) X(ci_high2)                                                  \
  X(baseline_mean1) X(baseline_sd1) X(baseline_mean2) X(baseline_sd2)                                                \
  X(median1) X(q1_1) X(q3_1) X(min1) X(max1)                                                   \
  X(median2) X(q1_2) X(q3_2) X(min2) X(max2)                                                   \
  X(events1) X(events2) X(odds_ratio) X(correlation)                                             \
  X(compare)                                                                                      \
  X(n3) X(mean3) X(sd3) X(se3) X(n4) X(mean4) X(sd4) X(se4) \
  X(n5) X(mean5) X(sd5) X(se5) X(n6) X(mean6) X(sd6) X(se6) \
  X(items) X(scale_min) X(scale_max)
// clang-format on

enum class Col : std::size_t {
#define STEELYARD_COL(name) name,
  STEELYARD_COLS(STEELYARD_COL)
#undef STEELYARD_COL
      count
};

inline constexpr std::size_t col_count = static_cast<std::size_t>(Col::count);

inline constexpr std::array<std::string_view, col_count> col_names = {
#define STEELYARD_COL(name) #name,
    STEELYARD_COLS(STEELYARD_COL)
#undef STEELYARD_COL
};

#undef STEELYARD_COLS

inline constexpr std::size_t index(Col col) { return static_cast<std::size_t>(col); }
inline constexpr std::string_view name(Col col) { return col_names[index(col)]; }

}  // namespace steelyard::rebuilding
