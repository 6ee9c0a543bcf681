// Cohen's d, Hedges' g and its standard error, as they are usually printed. Nothing is pooled from them.
#include "rebuild/effect_size.hpp"

#include <cmath>

namespace steelyard {

namespace {

// Γ(x+½)/Γ(x), x > 0: lifted to x ≥ 16 by Γ(x+1) = x·Γ(x), then √x·exp of the asymptotic series with
// coefficients (1 − 4⁻ᵏ)·B₂ₖ/(k·(2k−1)) (Abramowitz & Stegun 6.1.40, taken at x+½ and x). A few ulp. Separate
// log gammas would cancel at large x.
double half_step_of_gamma(double x) {
  double ratio = 1.0;
  for (; x < 16.0; x += 1.0) ratio *= x / (x + 0.5);
  const double u = 1.0 / (x * x);
  const double series = 1.0 / 8 - u * (1.0 / 192 - u * (1.0 / 640 - u * (17.0 / 14336 - u * 31.0 / 18432)));
  return ratio * std::sqrt(x) * std::exp(-series / x);
}

}  // namespace

// J(ν) = Γ(ν/2)/(√(ν/2)·Γ((ν−1)/2)).
double hedges_j(double df) {
  if (!(df > 1.0)) return 0.0;
  return half_step_of_gamma((df - 1.0) / 2.0) / std::sqrt(df / 2.0);
}

namespace rebuilding {

EffectSize effect_size(const Evidence& evidence, Design design, double people) {
  EffectSize size;
  if (const auto* normal = std::get_if<NormalEstimate>(&evidence)) {
    if (!normal->folded) size.d = normal->estimate;
    size.se = normal->se;
    return size;
  }
  const auto* exact = std::get_if<ExactT>(&evidence);
  if (exact == nullptr) return size;
  const double d = exact->t / std::sqrt(exact->n_effective);
  const double n = people > 0.0 ? people : exact->df + (design == Design::two_groups ? 2.0 : 1.0);
  size.d = d;
  if (!(exact->df > 1.0)) return size;
  const double j = hedges_j(exact->df);
  size.g = j * d;
  if (exact->df > 2.0) size.se = j * std::sqrt(1.0 / exact->n_effective + d * d / (2.0 * n));
  return size;
}

}  // namespace rebuilding

}  // namespace steelyard
