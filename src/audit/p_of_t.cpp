#include "audit/p_of_t.hpp"

#include <fmt/format.h>

#include "rebuild/sign.hpp"
#include "rebuild/student.hpp"

namespace steelyard::auditing {

namespace {

Range p_of(const Range& t, const Range& df, bool normal_too, double (*p)(double, double),
           double (*normal)(double)) {
  Range result =
      over(std::array<Range, 2>{t, df}, [p](const std::array<double, 2>& v) { return p(v[0], v[1]); });
  if (normal_too) result = join(result, {normal(t.high), normal(t.low)});
  return result;
}

double normal_one(double z) {
  return z >= 0.0 ? rebuilding::two_sided_p_normal(z) / 2.0 : 1.0 - rebuilding::two_sided_p_normal(z) / 2.0;
}

std::optional<Source> source(const RowView& row) {
  if (auto test = printed_test(row)) return test;
  if (row.x.present(Col::t) || row.x.present(Col::f)) return std::nullopt;
  if (auto se = from_se(row)) return se;
  if (auto means = from_means(row)) return means;
  return from_interval(row);
}

std::string with_df(const RowView& row, const Dfs& df) {
  if (df.firm) return fmt::format(" with {} df", row.text(Col::df));
  if (df.range.low == df.range.high) return fmt::format(" with {:g} df", df.range.high);
  return "";
}

// An F with several numerator df has a p of its own; one-tailed it isn't.
std::optional<ImpliedP> of_omnibus_f(const RowView& row) {
  if (!row.has(Col::f) || !row.has(Col::df)) return std::nullopt;
  const double df1 = row.value(Col::df1);
  const Range p =
      over(std::array<Range, 2>{row.range(Col::f), row.range(Col::df)},
           [df1](const std::array<double, 2>& v) { return rebuilding::upper_f(v[0], df1, v[1]); });
  return ImpliedP{fmt::format("F({:g}, {}) = {}", df1, row.text(Col::df), row.text(Col::f)), p, p};
}

}  // namespace

std::optional<ImpliedP> implied_p(const RowView& row) {
  if (row.has(Col::df1) && row.value(Col::df1) != 1.0) return of_omnibus_f(row);
  const auto from = source(row);
  const auto df = dfs(row);
  if (!from || !df) return std::nullopt;
  const bool normal_too = !df->firm;
  const Range absolute = size(from->t);
  ImpliedP implied;
  implied.words = from->words + with_df(row, *df);
  implied.two_tailed =
      p_of(absolute, df->range, normal_too, rebuilding::two_sided_p, rebuilding::two_sided_p_normal);
  const int direction = rebuilding::stated_sign(row.x);
  const bool directed = direction != 0 && !from->is_sized && says_one_tailed(row);
  implied.one_tailed = times(implied.two_tailed, 0.5);
  if (directed) {
    const Range t = direction > 0 ? from->t : negate(from->t);
    implied.one_tailed = p_of(t, df->range, normal_too, rebuilding::upper_p, normal_one);
  }
  return implied;
}

std::optional<Range> printed_p(const RowView& row) {
  if (!row.x.present(Col::p)) return std::nullopt;
  const Printed& p = row.x.printed(Col::p);
  if (p.relation == Relation::not_significant) {
    return Range{row.has(Col::alpha) ? row.value(Col::alpha) : row.x.options().alpha, 1.0};
  }
  const Range range = honest(p);
  return Range{std::max(range.low, 0.0), std::min(range.high, 1.0)};
}

bool says_one_tailed(const RowView& row) { return rebuilding::one_tailed(row.x); }

std::string short_p(double p) {
  if (p != 0.0 && p < 0.0001) return fmt::format("{:.1e}", p);
  std::string text = fmt::format("{:.4f}", p);
  while (text.size() > 4 && text.back() == '0') text.pop_back();
  return text.front() == '0' ? text.substr(1) : text;
}

std::string words_of_p(const RowView& row) {
  const Printed& p = row.x.printed(Col::p);
  if (p.relation == Relation::not_significant) return fmt::format("{} (not significant)", row.text(Col::p));
  return std::string(row.text(Col::p));
}

}  // namespace steelyard::auditing
