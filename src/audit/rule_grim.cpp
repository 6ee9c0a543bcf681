// Means that whole-number scores can't have at that n.
#include <fmt/format.h>

#include <cmath>

#include "audit/rule.hpp"

namespace steelyard::auditing {

namespace {

constexpr std::string_view id = "grim";

// Whether some whole total over `units` lies in the range of means; the far end of a cut-off number is open.
bool some_total(const Range& mean, double units) {
  const double first = std::ceil(mean.low * units - 1e-9 * (1.0 + std::abs(mean.low * units)));
  return first / units <= mean.high - 1e-12 * (1.0 + std::abs(mean.high));
}

std::string nearest(double value, double units, int decimals) {
  const double below = std::floor(value * units) / units;
  const double above = std::ceil(value * units) / units;
  const int digits = std::clamp(decimals, 0, 9) + 2;
  return fmt::format("{:.{}f} and {:.{}f}", below, digits, above, digits);
}

void check_one(const RowView& row, Col mean, Col size) {
  if (!row.has(mean) || !row.has(size) || !row.has(Col::items)) return;
  const double items = row.value(Col::items);
  const double units = row.value(size) * items;
  if (!(units >= 1.0) || some_total(row.range(mean), units)) return;
  row.report(
      id, Grade::impossible,
      fmt::format(
          "{} = {} can't be the mean of {:g} people with {:g} whole-number item{}: the nearest means are {}.",
          name(mean), row.text(mean), row.value(size), items, items == 1.0 ? "" : "s",
          nearest(row.value(mean), units, row.x.printed(mean).decimals)),
      "Check the mean and the size; scores left out would change the size behind this mean.");
}

void check(const RowView& row) {
  const bool groups = row.has(Col::n1);
  check_one(row, Col::mean1, groups ? Col::n1 : Col::n);
  check_one(row, Col::mean2, groups ? Col::n2 : Col::n);
  check_one(row, Col::mean3, Col::n3);
  check_one(row, Col::mean4, Col::n4);
  check_one(row, Col::mean5, Col::n5);
  check_one(row, Col::mean6, Col::n6);
}

}  // namespace

Rule rule_grim() {
  return {
      {id, "means of whole-number items (column `items`) are possible at their n", "Brown & Heathers (2017)"},
      check};
}

}  // namespace steelyard::auditing
