// Central distributions: thin wrappers around Boost.Math, each asking for the tail it needs.
#include <boost/math/distributions/normal.hpp>
#include <boost/math/distributions/students_t.hpp>
#include <cmath>
#include <limits>

#include "steelyard/numeric.hpp"

namespace steelyard::numeric {

namespace {

using boost::math::complement;
using Policy =
    boost::math::policies::policy<boost::math::policies::promote_double<false>,
                                  boost::math::policies::overflow_error<boost::math::policies::ignore_error>>;
using StudentT = boost::math::students_t_distribution<double, Policy>;
using Normal = boost::math::normal_distribution<double, Policy>;

}  // namespace

double student_t_cdf(double t, double df) { return student_t_upper(-t, df); }

double student_t_upper(double t, double df) {
  if (std::isinf(t)) return t > 0.0 ? 0.0 : 1.0;
  return boost::math::cdf(complement(StudentT(df), t));
}

double student_t_two_sided(double t, double df) { return 2.0 * student_t_upper(std::fabs(t), df); }

double student_t_upper_quantile(double q, double df) {
  return boost::math::quantile(complement(StudentT(df), q));
}

double normal_cdf(double z) { return normal_upper(-z); }

double normal_upper(double z) { return 0.5 * std::erfc(z * 0.70710678118654752440); }

double normal_upper_quantile(double q) { return boost::math::quantile(complement(Normal(), q)); }

double log_normal_upper(double z) {
  constexpr double half_log_two_pi = 0.91893853320467274178;
  if (z < 5.0) return z < -5.0 ? std::log1p(-normal_upper(-z)) : std::log(normal_upper(z));
  // Continued fraction of the Mills ratio (Abramowitz & Stegun 26.2.14), taken from its far end.
  double ratio = z;
  for (int k = 80; k > 0; --k) ratio = z + k / ratio;
  return -0.5 * z * z - half_log_two_pi - std::log(ratio);
}

double log_add(double a, double b) {
  const double top = a > b ? a : b;
  const double rest = a > b ? b : a;
  if (std::isinf(top)) return top;
  return top + std::log1p(std::exp(rest - top));
}

double log_subtract(double a, double b) {
  if (b == -std::numeric_limits<double>::infinity()) return a;
  const double x = a - b;
  if (!(x > 0.0))
    return x == 0.0 ? -std::numeric_limits<double>::infinity() : std::numeric_limits<double>::quiet_NaN();
  return a + (x < 0.69 ? std::log(-std::expm1(-x)) : std::log1p(-std::exp(-x)));
}

}  // namespace steelyard::numeric
