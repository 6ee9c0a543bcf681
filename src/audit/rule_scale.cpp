// Means outside the scale, and SDs larger than it allows.
#include <fmt/format.h>

#include <cmath>

#include "audit/rule.hpp"

namespace steelyard::auditing {

namespace {

constexpr std::string_view id = "beyond-scale";

// The largest SD with this mean: all scores at the two ends of the scale.
double largest_sd(double mean, double low, double high, double n) {
  return std::sqrt(std::max((mean - low) * (high - mean), 0.0) * n / (n - 1.0));
}

double largest_sd(const Range& mean, double low, double high, double n) {
  const double middle = (low + high) / 2.0;
  const double nearest = std::clamp(middle, mean.low, mean.high);
  return largest_sd(std::clamp(nearest, low, high), low, high, n);
}

void check_one(const RowView& row, Col mean, Col sd, Col size) {
  const double low = row.value(Col::scale_min);
  const double high = row.value(Col::scale_max);
  Range center{low, high};
  if (row.has(mean)) {
    center = row.range(mean);
    if (!meet(center, {low, high})) {
      row.report(id, Grade::impossible,
                 fmt::format("{} = {} lies outside the scale from {:g} to {:g}.", name(mean), row.text(mean),
                             low, high),
                 "Check the mean, and scale_min and scale_max.");
      return;
    }
  }
  if (!row.has(sd) || !row.has(size) || row.value(size) < 2.0) return;
  const double most = largest_sd(center, low, high, row.value(size));
  if (row.range(sd).low <= most * (1.0 + 1e-9)) return;
  row.report(
      id, Grade::impossible,
      fmt::format("{} = {} is more than {:.4g}, the largest SD that scores from {:g} to {:g}{} can have.",
                  name(sd), row.text(sd), most, low, high,
                  row.has(mean) ? fmt::format(" with a mean of {}", row.text(mean)) : ""),
      "Check the SD, and scale_min and scale_max.");
}

void check(const RowView& row) {
  if (!row.has(Col::scale_min) || !row.has(Col::scale_max)) return;
  const bool groups = row.has(Col::n1);
  check_one(row, Col::mean1, Col::sd1, groups ? Col::n1 : Col::n);
  check_one(row, Col::mean2, Col::sd2, groups ? Col::n2 : Col::n);
}

}  // namespace

Rule rule_scale() {
  return {{id, "means lie on the scale (scale_min, scale_max) and SDs are not larger than it allows",
           "Bhatia & Davis (2000), a bound on the variance"},
          check};
}

}  // namespace steelyard::auditing
