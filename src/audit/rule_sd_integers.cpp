// SDs that whole-number scores can't have, by necessary conditions only.
#include <fmt/format.h>

#include <cmath>

#include "audit/rule.hpp"

namespace steelyard::auditing {

namespace {

constexpr std::string_view id = "sd-of-integers";
// Beyond this many possible sums something always fits.
constexpr double most_sums = 1000.0;

struct Scores {
  double n, items;
  Range mean, sd;
};

// For one whole sum of n scores (each `items` times the mean score): is there a whole sum of squares of the
// same parity, not below the least that this sum can have, that gives an SD in the range? `divisor`: n − 1 or
// n.
bool some_square(const Scores& s, double sum, double divisor) {
  const double scale = s.items * s.items;
  const double base = sum * sum / s.n;
  const double each = std::floor(sum / s.n);
  const double rest = sum - each * s.n;
  const double least = (s.n - rest) * each * each + rest * (each + 1.0) * (each + 1.0);
  const double slack = 1e-9 * (1.0 + base);
  const double low = std::max(divisor * s.sd.low * s.sd.low * scale + base - slack, least);
  const double high = divisor * s.sd.high * s.sd.high * scale + base + slack;
  double first = std::ceil(low);
  // Σx² and Σx are both even or both odd, since x² − x is even.
  if (std::fmod(std::abs(first - sum), 2.0) != 0.0) first += 1.0;
  return first <= high;
}

bool possible(const Scores& s) {
  const double units = s.n * s.items;
  const double first = std::ceil(s.mean.low * units - 1e-9);
  const double last = std::floor(s.mean.high * units + 1e-9);
  // Without a fitting sum the mean itself is impossible: that is another rule's finding.
  if (last < first || last - first > most_sums) return true;
  for (double sum = first; sum <= last; sum += 1.0) {
    if (some_square(s, sum, s.n - 1.0) || some_square(s, sum, s.n)) return true;
  }
  return false;
}

void check_one(const RowView& row, Col mean, Col sd, Col size) {
  if (!row.has(mean) || !row.has(sd) || !row.has(size) || !row.has(Col::items)) return;
  const Scores scores{row.value(size), row.value(Col::items), row.range(mean), row.range(sd)};
  if (scores.n < 2.0 || !(scores.items >= 1.0) || possible(scores)) return;
  row.report(id, Grade::impossible,
             fmt::format("No {:g} whole-number scores with a mean of {} have an SD of {}.", scores.n,
                         row.text(mean), row.text(sd)),
             "Check the mean, the SD and the size.");
}

void check(const RowView& row) {
  const bool groups = row.has(Col::n1);
  check_one(row, Col::mean1, Col::sd1, groups ? Col::n1 : Col::n);
  check_one(row, Col::mean2, Col::sd2, groups ? Col::n2 : Col::n);
}

}  // namespace

Rule rule_sd_integers() {
  return {
      {id, "SDs of whole-number items: sum and sum of squares are whole, of one parity, and not too small",
       "Brown & Heathers (2017), the same reasoning for squares"},
      check};
}

}  // namespace steelyard::auditing
