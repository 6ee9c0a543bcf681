// Room "rebuild": rows into studies, one file per route.
#pragma once

#include <optional>
#include <span>
#include <string_view>
#include <vector>

#include "steelyard/base.hpp"
#include "steelyard/read.hpp"
#include "steelyard/study.hpp"

namespace steelyard {

struct RebuildOptions {
  double alpha = 0.05;  ///< what `ns` means where no `alpha` cell says otherwise; 0 < alpha < 1
  /// Correlation of paired scores for the paired rows that print none: states it for all of them, so
  /// that they come onto the scale of two-group rows. −1 < r < 1.
  std::optional<double> r_pair;
};

/// One way from cells to evidence. The registry lists them in the order in which they are tried:
/// fewest rounded inputs first.
struct RouteInfo {
  std::string_view id;        ///< kebab-case, stands in every output
  std::string_view needs;     ///< the columns, for people: "t, and n1 and n2 (or n, or df)"
  std::string_view formula;   ///< one line
  std::string_view source;    ///< literature
  std::string_view example;   ///< one line of CSV with header, separated by '\n'; run by the tests
};
[[nodiscard]] std::span<const RouteInfo> routes();

/// Rebuilds one row. The best route wins, the others are kept as `Study::alternatives`.
[[nodiscard]] Outcome<Study> rebuild(const Table& table, const Row& row, const RebuildOptions& options = {});

/// Rebuilds all rows; every problem of every row is reported. The value is absent when any row
/// could not be rebuilt: nothing is dropped silently.
[[nodiscard]] Outcome<std::vector<Study>> rebuild_all(const Table& table, const RebuildOptions& options = {});

/// Exact small-sample factor J(df) of Hedges (1981); 0 at df = 1.
[[nodiscard]] double hedges_j(double df);

}  // namespace steelyard
