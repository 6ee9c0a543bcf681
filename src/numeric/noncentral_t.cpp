// Density of the noncentral t distribution in log space.
#include <boost/math/special_functions/gamma.hpp>
#include <cmath>
#include <limits>

#include "numeric/density.hpp"
#include "numeric/kernel.hpp"
#include "steelyard/numeric.hpp"

namespace steelyard::numeric {

namespace {

constexpr double largest_ncp = 1e6;
constexpr double largest_t = 1e6;

/// log of Γ((df+1)/2)/(Γ(df/2)·√(df/2)); goes to 0 as −1/(4 df).
double log_central_ratio(double df) {
  if (df < 20.0) return -std::log(boost::math::tgamma_delta_ratio(0.5 * df, 0.5) * std::sqrt(0.5 * df));
  const double x = 1.0 / df;
  return 0.5 * df * vector_log_minus(1.0 + x, x).log_minus + stirling_remainder(0.5 * (df + 1.0)) -
         stirling_remainder(0.5 * df);
}

/// The central density has a form of its own, right to a few ulp.
double log_central(double t, double df) {
  constexpr double half_log_two_pi = 0.91893853320467274178;
  return (log_central_ratio(df) - half_log_two_pi) - 0.5 * (df + 1.0) * std::log1p(t * t / df);
}

}  // namespace

double log_noncentral_t_density(double t, double df, double ncp) {
  if (!(df >= 1.0) || !(std::fabs(ncp) <= largest_ncp) || !(std::fabs(t) <= largest_t))
    return std::numeric_limits<double>::quiet_NaN();
  if (ncp == 0.0) return log_central(t, df);
  return DensityKernel(df).at(t, ncp);
}

void add_log_noncentral_t(double t, double df, double ncp_per_mean, std::span<const double> means,
                          std::span<double> out) {
  DensityKernel(df).add(t, ncp_per_mean, means, out);
}

}  // namespace steelyard::numeric
