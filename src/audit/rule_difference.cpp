// The printed difference against the printed means.
#include <fmt/format.h>

#include "audit/statistic.hpp"

namespace steelyard::auditing {

namespace {

constexpr std::string_view id = "difference-against-means";

void check(const RowView& row) {
  if (!row.has(Col::mean_diff) || !row.has(Col::mean1) || !row.has(Col::mean2)) return;
  const auto means = difference(row);
  if (!means || meet(size(row.range(Col::mean_diff)), size(*means))) return;
  row.report(
      id,
      row.x.present(Col::covariates) || row.x.present(Col::covariate_r) ? Grade::worth_a_look
                                                                        : Grade::impossible,
      fmt::format("The means differ by {:.4g} to {:.4g}, but mean_diff is printed as {}.", means->low,
                  means->high, row.text(Col::mean_diff)),
      "Check the means and the difference; an adjusted difference belongs to a row with `covariates`.");
}

}  // namespace

Rule rule_difference() { return {{id, "mean_diff is mean1 − mean2", "arithmetic"}, check}; }

}  // namespace steelyard::auditing
