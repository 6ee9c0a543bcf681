#include "rebuild/p_value.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <limits>

#include "rebuild/sign.hpp"
#include "rebuild/student.hpp"

namespace steelyard::rebuilding {

namespace {

double alpha_of(Numbers& x) { return x.has(Col::alpha) ? x[Col::alpha] : x.options().alpha; }

}  // namespace

std::optional<PBand> p_band(Numbers& x) {
  x.mark(Col::p);
  const Printed& p = x.printed(Col::p);
  PBand band;
  if (p.relation == Relation::not_significant) {
    band.low = alpha_of(x);
  } else {
    band.low = std::max(p.low, 0.0);
    band.high = std::min(p.high, 1.0);
  }
  if (band.low <= band.high && band.low < 1.0 && band.high > 0.0) return band;
  x.refuse(Col::p, "p-out-of-range",
           fmt::format("p is {}, but a p value lies between 0 and 1.", x.facts().text(Col::p)),
           "Correct it.");
  return std::nullopt;
}

std::optional<PKind> p_kind(Numbers& x) {
  PKind kind;
  kind.one_tailed = one_tailed(x);
  if (kind.one_tailed) x.mark(Col::tails);
  kind.sign = kind.one_tailed ? stated_sign(x) : sign_of(x);
  if (!kind.one_tailed || kind.sign != 0) return kind;
  x.refuse(Col::p, "one-tailed-without-direction",
           "The p is one-tailed, but the row does not say which direction was hypothesised.",
           "Fill `sign` with + or − (the hypothesised direction), or set `tails` to 2.");
  return std::nullopt;
}

double t_of_p(double p, double df, const PKind& kind) {
  const double t = kind.one_tailed ? upper_t(p, df) : two_sided_t(p, df);
  return kind.sign < 0 ? -t : t;
}

std::vector<Interval> size_bands(double low, double high, int sign) {
  if (sign > 0) return {{low, high}};
  if (sign < 0) return {{-high, -low}};
  if (low <= 0.0) return {{-high, high}};
  return {{-high, -low}, {low, high}};
}

std::vector<Interval> t_bands(const PBand& p, double df, const PKind& kind) {
  const PKind upward{kind.one_tailed, 1};
  const double low = t_of_p(p.high, df, upward);
  const double high = t_of_p(p.low, df, upward);
  return size_bands(low, high, kind.sign);
}

}  // namespace steelyard::rebuilding
