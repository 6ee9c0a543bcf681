// Cohen's d, Hedges' g and its standard error, as they are usually printed. Nothing is pooled from them.
#include "rebuild/effect_size.hpp"

#include <boost/math/special_functions/gamma.hpp>
#include <cmath>

namespace steelyard {

// J(ν) = Γ(ν/2)/(√(ν/2)·Γ((ν−1)/2)). The ratio of gammas is taken at once: separate log gammas lose
// digits at large ν.
double hedges_j(double df) {
  if (!(df > 1.0)) return 0.0;
  return boost::math::tgamma_delta_ratio((df - 1.0) / 2.0, 0.5) > 0.0
             ? 1.0 / (boost::math::tgamma_delta_ratio((df - 1.0) / 2.0, 0.5) * std::sqrt(df / 2.0))
             : 1.0;
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
