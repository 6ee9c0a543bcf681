// Signed numbers of a row that point in different directions.
#include <fmt/format.h>

#include "audit/statistic.hpp"
#include "rebuild/intervals.hpp"
#include "rebuild/sign.hpp"

namespace steelyard::auditing {

namespace {

constexpr std::string_view id = "signs-disagree";

struct Signed {
  std::string words;
  int sign;
  bool often_unsigned = false;  // papers print sizes of d, g and r without their sign
};

int sign_of(const Range& range) { return range.low > 0.0 ? 1 : range.high < 0.0 ? -1 : 0; }

void add(std::vector<Signed>& to, std::string words, const Range& range) {
  if (const int sign = sign_of(range); sign != 0) to.push_back({std::move(words), sign});
}

std::vector<Signed> all_signs(const RowView& row) {
  std::vector<Signed> found;
  if (const auto diff = difference(row); diff && !row.has(Col::mean_diff)) add(found, "the means", *diff);
  if (row.has(Col::mean_diff) && row.has(Col::mean1) && row.has(Col::mean2)) {
    if (const auto diff = difference(row)) add(found, "the means", *diff);
  }
  for (const Col col : {Col::mean_diff, Col::t, Col::d, Col::g, Col::r}) {
    if (!row.has(col)) continue;
    const std::size_t before = found.size();
    add(found, fmt::format("{} = {}", name(col), row.text(col)), row.range(col));
    const bool size = col == Col::d || col == Col::g || col == Col::r;
    if (found.size() > before) found.back().often_unsigned = size;
  }
  if (rebuilding::ci_of(row.x) == rebuilding::CiOf::difference) {
    const Range low = row.range(Col::ci_low);
    const Range high = row.range(Col::ci_high);
    add(found, fmt::format("the middle of {} to {}", row.text(Col::ci_low), row.text(Col::ci_high)),
        {(low.low + high.low) / 2.0, (low.high + high.high) / 2.0});
  }
  return found;
}

void check(const RowView& row) {
  const std::vector<Signed> signs = all_signs(row);
  for (std::size_t i = 1; i < signs.size(); ++i) {
    if (signs[i].sign == signs[0].sign) continue;
    // Papers that print every size without its sign name the direction in words.
    if (rebuilding::stated_sign(row.x) < 0 && signs[i].sign > 0 && signs[0].sign < 0) continue;
    const bool only_size = signs[i].often_unsigned && signs[i].sign > 0;
    row.report(id, only_size ? Grade::worth_a_look : Grade::changes_the_verdict,
               fmt::format("{} {} positive, but {} {} negative.", signs[signs[0].sign > 0 ? 0 : i].words,
                           signs[signs[0].sign > 0 ? 0 : i].words == "the means" ? "are" : "is",
                           signs[signs[0].sign > 0 ? i : 0].words,
                           signs[signs[0].sign > 0 ? i : 0].words == "the means" ? "are" : "is"),
               "Check which group is group 1, and the sign of each number.");
    return;
  }
}

}  // namespace

Rule rule_sign() {
  return {{id, "means, difference, interval, t, d, g and r point the same way", "common practice"}, check};
}

}  // namespace steelyard::auditing
